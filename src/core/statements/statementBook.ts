/** A borrower's statements laid out by period, so that a figure is found without searching for it. */
import type { BorrowerInputs } from '../borrowerInputs.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import {
  byPeriodEnd,
  inForce,
  knownStatements,
  periodKey,
  versionsByPeriod,
  type StatementSelection,
} from './currentStatements.ts';
import type { LineItemCode } from './lineItems.ts';
import type { Reading } from './reading.ts';
import type { Statement, StatementScope } from './statement.ts';

/**
 * Statements of one scope, every version of a period: flows over several versions need the superseded ones too, to
 * see whether a restatement touched a line.
 *
 * A book never changes. What was read out of it is kept in it, so that a figure that many tests rest on is computed
 * once; the same question has the same answer either way.
 */
export interface StatementBook {
  /** Month in which the financial year ends, 1 to 12. */
  readonly fiscalYearEndMonth: number;
  readonly statements: readonly Statement[];
  /** One a period, in order of period end. */
  readonly current: readonly Statement[];
  readonly statementById: (id: number) => Statement | undefined;
  /** Every version of one period; 0 months is a balance sheet. */
  readonly versionsOf: (periodEnd: PlainDate, months: number) => readonly Statement[];
  /** The version of one period that is in force; null where there is none. */
  readonly statementOf: (periodEnd: PlainDate, months: number) => Statement | null;
  /** Whether any statement carries the line with an amount other than nought. */
  readonly carries: (line: LineItemCode) => boolean;
  /** Whether a later period was out already when this version came: then it restates, before that it closes the books. */
  readonly isRestating: (version: Statement) => boolean;
  /** What `read` gives, kept under its question. */
  readonly kept: (question: string, read: () => Reading) => Reading;
}

/**
 * The book of the statements received by a day in one scope, forecasts left out.
 *
 * @example openBook(statements, { scope: 'group', asOf: '2026-11-30' }, 12).statementOf('2026-09-30', 9)?.months // => 9
 */
export const openBook = (
  statements: readonly Statement[],
  selection: StatementSelection,
  fiscalYearEndMonth: number,
): StatementBook => bookOf(knownStatements(statements, selection), fiscalYearEndMonth);

/** A borrower's books: one for each scope of accounts. */
export type Books = Readonly<Record<StatementScope, StatementBook>>;

/**
 * The books of the statements received by a day.
 *
 * @example openBooks({ statements, fiscalYearEndMonth: 12 }, '2026-11-30')['stand-alone'].statements // => []
 */
export function openBooks(
  { statements, fiscalYearEndMonth }: Pick<BorrowerInputs, 'statements' | 'fiscalYearEndMonth'>,
  asOf: PlainDate,
): Books {
  const bookFor = (scope: StatementScope): StatementBook =>
    openBook(statements, { scope, asOf }, fiscalYearEndMonth);
  return { group: bookFor('group'), 'stand-alone': bookFor('stand-alone') };
}

/**
 * The book of exactly these statements. Laying it out takes time in proportion to their number.
 *
 * @example bookOf(statements, 12).versionsOf('2026-09-30', 9).length // => 1
 */
export function bookOf(statements: readonly Statement[], fiscalYearEndMonth: number): StatementBook {
  const byId = new Map(statements.map((statement) => [statement.id, statement]));
  const versions = versionsByPeriod(statements);
  const current = new Map([...versions].map(([key, ofPeriod]) => [key, inForce(ofPeriod)]));
  const readings = new Map<string, Reading>();
  return {
    fiscalYearEndMonth,
    statements,
    current: [...current.values()].sort(byPeriodEnd),
    statementById: (id) => byId.get(id),
    versionsOf: (periodEnd, months) => versions.get(periodKey(periodEnd, months)) ?? [],
    statementOf: (periodEnd, months) => current.get(periodKey(periodEnd, months)) ?? null,
    carries: remembering((line: LineItemCode) =>
      statements.some(({ amounts }) => {
        const amount = amounts[line];
        return amount !== undefined && !amount.isZero();
      }),
    ),
    isRestating: remembering((version: Statement) =>
      statements.some((other) => isLaterPeriodKnownWith(version, other)),
    ),
    kept: (question, read) => {
      const known = readings.get(question);
      if (known) return known;
      const found = read();
      readings.set(question, found);
      return found;
    },
  };
}

const isLaterPeriodKnownWith = (version: Statement, other: Statement): boolean =>
  other.months > 0 && other.periodEnd > version.periodEnd && other.receivedOn <= version.receivedOn;

function remembering<Argument, Answer>(ask: (argument: Argument) => Answer): (argument: Argument) => Answer {
  const answers = new Map<Argument, Answer>();
  return (argument) => {
    const known = answers.get(argument);
    if (known !== undefined) return known;
    const answer = ask(argument);
    answers.set(argument, answer);
    return answer;
  };
}
