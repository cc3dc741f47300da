import type { PlainDate } from '../calendar/plainDate.ts';
import { MEASURES } from '../measures/index.ts';
import type { InputUsed, MissingLine, Reading } from '../measures/measure.ts';
import type { Measured } from '../measures/measured.ts';
import type { Statement } from '../statements/statement.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import type { Covenant } from './covenant.ts';
import type { Sides } from './headroom.ts';

/** What a covenant's measure found on a test date. */
export interface Figures extends Pick<Measured, 'addBacksTaken' | 'bridge'> {
  readonly readings: readonly Reading[];
  readonly inputs: readonly InputUsed[];
  /** Each gap once. */
  readonly missing: readonly MissingLine[];
  /** The statements behind the inputs. */
  readonly statements: readonly Statement[];
  /** Null where a side has no value. */
  readonly sides: Sides | null;
}

/**
 * Measures a covenant on a day, out of the book of its scope.
 *
 * @example figuresOf(covenant, book, '2026-09-30').sides // => { numerator: 39000000, denominator: 13000000 }
 */
export function figuresOf(
  { measure, definition, addBacks }: Covenant,
  book: StatementBook,
  date: PlainDate,
): Figures {
  const measured = MEASURES[measure].measure({ book, date, definition, addBacks });
  const { numerator, denominator, addBacksTaken, bridge } = measured;
  const readings = denominator ? [numerator, denominator] : [numerator];
  const inputs = readings.flatMap((reading) => (reading.kind === 'missing' ? [] : reading.inputs));
  return {
    addBacksTaken,
    bridge,
    readings,
    inputs,
    missing: missingOf(readings),
    statements: statementsBehind(book, inputs),
    sides: sidesOf(measured),
  };
}

function missingOf(readings: readonly Reading[]): readonly MissingLine[] {
  const gaps = readings.flatMap((reading) => (reading.kind === 'missing' ? reading.missing : []));
  const byKey = new Map(gaps.map((gap) => [`${gap.line} ${gap.periodEnd} ${gap.months}`, gap]));
  return [...byKey.values()];
}

function sidesOf({ numerator, denominator }: Measured): Sides | null {
  if (numerator.kind !== 'value' || (denominator && denominator.kind !== 'value')) return null;
  return { numerator: numerator.value, denominator: denominator ? denominator.value : null };
}

function statementsBehind(book: StatementBook, inputs: readonly InputUsed[]): readonly Statement[] {
  const ids = new Set(inputs.map(({ statementId }) => statementId));
  return book.statements.filter(({ id }) => ids.has(id));
}
