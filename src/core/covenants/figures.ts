import type { PlainDate } from '../calendar/plainDate.ts';
import { monthsOfFlow } from '../measures/annualised.ts';
import type { CurrencyRate, MeasureDefinition, MeasureRequest } from '../measures/definition.ts';
import { MEASURES } from '../measures/index.ts';
import type { InputUsed, MissingLine, Reading } from '../measures/measure.ts';
import type { Measured } from '../measures/measured.ts';
import { rateLines, translationInto } from '../measures/translation.ts';
import type { Statement } from '../statements/statement.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { agreedLevelOf } from './agreedAmounts.ts';
import type { Covenant } from './covenant.ts';
import type { Sides } from './headroom.ts';
import { levelInForce } from './levels.ts';

/** What a covenant's measure found on a test date. */
export interface Figures extends Pick<Measured, 'addBacksTaken' | 'bridge' | 'remarks'> {
  readonly readings: readonly Reading[];
  readonly inputs: readonly InputUsed[];
  /** Each gap once. */
  readonly missing: readonly MissingLine[];
  /** The statements behind the inputs. */
  readonly statements: readonly Statement[];
  /** Null where a side has no value. */
  readonly sides: Sides | null;
  /** The sides by the accounting rules of today, where the covenant goes by those at signing. */
  readonly otherSides: Sides | null;
  /** The level of the day, as far as the agreement computes it itself; null where none is in force. */
  readonly level: Sides['numerator'] | null;
  /** What that level was computed from. */
  readonly levelInputs: readonly InputUsed[];
}

/**
 * Measures a covenant on a day, out of the book of its scope: on the accounts that it asks for, over its months, in
 * its currency by the rates that are recorded.
 *
 * @example figuresOf(covenant, book, '2026-09-30').sides // => { numerator: 39000000, denominator: 13000000, earnings: 13000000 }
 */
export function figuresOf(
  covenant: Covenant,
  book: StatementBook,
  date: PlainDate,
  rates: readonly CurrencyRate[] = [],
): Figures {
  const request: MeasureRequest = {
    book: covenant.basis === null ? book : book.onBasis(covenant.basis),
    date,
    definition: covenant.definition,
    addBacks: covenant.addBacks,
    months: monthsOfFlow(covenant.definition, covenant, date),
    translation: translationInto(covenant.currency, rates),
  };
  const { measure } = MEASURES[covenant.measure];
  const measured = measure(request);
  const { numerator, denominator, addBacksTaken, bridge, remarks } = measured;
  const inForce = levelInForce(covenant.levels, date);
  const agreed = inForce.kind === 'level' ? agreedLevelOf(covenant, request, inForce) : null;
  const sides = denominator ? [numerator, denominator] : [numerator];
  const readings = [...sides, ...(agreed?.behind ?? [])];
  const inputs = inputsOf(sides);
  return {
    addBacksTaken,
    bridge: [...bridge, ...(agreed?.bridge ?? []), ...rateLines(request.translation)],
    remarks,
    readings,
    inputs,
    missing: missingOf(readings),
    statements: statementsBehind(book, inputs),
    sides: sidesOf(measured),
    otherSides:
      covenant.definition.accounting === 'frozen'
        ? sidesOf(measure({ ...request, definition: byTodaysRules(covenant.definition) }))
        : null,
    level: agreed?.level ?? null,
    levelInputs: inputsOf(agreed?.behind ?? []),
  };
}

/** Each figure once: what stands on both sides (rent, debt in capital) is one figure of the accounts. */
function inputsOf(readings: readonly Reading[]): readonly InputUsed[] {
  const inputs = readings.flatMap((reading) => (reading.kind === 'missing' ? [] : reading.inputs));
  if (!mayRepeat(inputs)) return inputs;
  const byKey = new Map(inputs.map((input) => [keyOf(input), input]));
  return byKey.size === inputs.length ? inputs : [...byKey.values()];
}

/** Whether two stand for one cell, whatever their rates: in nearly every test none do, and no keys need be written. */
function mayRepeat(inputs: readonly InputUsed[]): boolean {
  for (let place = 1; place < inputs.length; place += 1) {
    const { statementId, line } = inputs[place]!;
    for (let before = 0; before < place; before += 1) {
      const other = inputs[before]!;
      if (other.statementId === statementId && other.line === line) return true;
    }
  }
  return false;
}

const keyOf = ({ statementId, line, sign, rate }: InputUsed): string =>
  `${statementId} ${line} ${sign} ${rate?.toFixed() ?? ''}`;

/** Today's rules count lease liabilities as debt and keep their rent out of EBITDA. */
const byTodaysRules = (definition: MeasureDefinition): MeasureDefinition => ({
  ...definition,
  accounting: 'current',
  leasesInDebt: true,
});

function missingOf(readings: readonly Reading[]): readonly MissingLine[] {
  const gaps = readings.flatMap((reading) => (reading.kind === 'missing' ? reading.missing : []));
  const byKey = new Map(gaps.map((gap) => [`${gap.line} ${gap.periodEnd} ${gap.months}`, gap]));
  return [...byKey.values()];
}

function sidesOf({ numerator, denominator, earnings }: Measured): Sides | null {
  if (numerator.kind !== 'value' || (denominator && denominator.kind !== 'value')) return null;
  return {
    numerator: numerator.value,
    denominator: denominator ? denominator.value : null,
    ...(earnings?.kind === 'value' ? { earnings: earnings.value } : {}),
  };
}

function statementsBehind(book: StatementBook, inputs: readonly InputUsed[]): readonly Statement[] {
  const ids = new Set(inputs.map(({ statementId }) => statementId));
  return book.statements.filter(({ id }) => ids.has(id));
}
