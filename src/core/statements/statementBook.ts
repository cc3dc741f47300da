/** A borrower's statements laid out by period, so that a figure is found without searching for it. */
import type { PlainDate } from '../calendar/plainDate.ts';
import { reportingMonthEnd } from '../calendar/fiscalYear.ts';
import {
  basisRank,
  inForceByPeriodEnd,
  knownStatements,
  versionsByPeriod,
  type StatementSelection,
} from './currentStatements.ts';
import type { LineItemCode } from './lineItems.ts';
import type { Reading } from './reading.ts';
import type { Statement, StatementBasis, StatementScope } from './statement.ts';

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
  /** The currency of all of them; null where there are several, or no statement. */
  readonly currency: string | null;
  /** One a period, in order of period end. */
  readonly current: readonly Statement[];
  readonly statementById: (id: number) => Statement | undefined;
  /** Every version of one period; 0 months is a balance sheet. */
  readonly versionsOf: (periodEnd: PlainDate, months: number) => readonly Statement[];
  /** The version of one period that is in force; null where there is none. */
  readonly statementOf: (periodEnd: PlainDate, months: number) => Statement | null;
  /** Whether a statement of that period end or an earlier one carries the line with an amount other than nought. */
  readonly isCarriedBy: (line: LineItemCode, periodEnd: PlainDate) => boolean;
  /** Whether a later period was out already when this version came: then it restates, before that it closes the books. */
  readonly isRestating: (version: Statement) => boolean;
  /** The same book with only the accounts that are founded at least as well: audited, or reviewed and audited. */
  readonly onBasis: (basis: StatementBasis) => StatementBook;
  /** What `read` gives for a line on a day by one route, kept. */
  readonly kept: (route: string, line: LineItemCode, date: PlainDate, read: () => Reading) => Reading;
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
  {
    statements,
    fiscalYearEndMonth,
  }: { readonly statements: readonly Statement[]; readonly fiscalYearEndMonth: number },
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
  const versionsOf = (periodEnd: PlainDate, months: number) =>
    versions.get(months)?.get(reportingMonthEnd(periodEnd));
  const current = inForceByPeriodEnd(versions);
  const ofMonths = byMonths(current);
  const firstCarried = remembering((line: LineItemCode) => earliestWith(statements, line));
  return {
    fiscalYearEndMonth,
    statements,
    currency: onlyCurrency(statements),
    current,
    statementById: (id) => byId.get(id),
    versionsOf: (periodEnd, months) => versionsOf(periodEnd, months) ?? [],
    statementOf: (periodEnd, months) => ofMonths.get(months)?.get(reportingMonthEnd(periodEnd)) ?? null,
    isCarriedBy: (line, periodEnd) => {
      const first = firstCarried(line);
      return first !== null && first <= reportingMonthEnd(periodEnd);
    },
    isRestating: remembering((version: Statement) =>
      statements.some((other) => isLaterPeriodKnownWith(version, other)),
    ),
    onBasis: remembering((basis: StatementBasis) =>
      bookOf(
        statements.filter((statement) => basisRank(statement.basis) >= basisRank(basis)),
        fiscalYearEndMonth,
      ),
    ),
    kept: keptReadings(),
  };
}

/** Every figure that is read asks which version is in force. */
function byMonths(current: readonly Statement[]): ReadonlyMap<number, ReadonlyMap<PlainDate, Statement>> {
  const laidOut = new Map<number, Map<PlainDate, Statement>>();
  for (const statement of current) {
    const byEnd = laidOut.get(statement.months) ?? new Map<PlainDate, Statement>();
    laidOut.set(statement.months, byEnd);
    byEnd.set(reportingMonthEnd(statement.periodEnd), statement);
  }
  return laidOut;
}

function onlyCurrency(statements: readonly Statement[]): string | null {
  const [first] = statements;
  return first && statements.every(({ currency }) => currency === first.currency) ? first.currency : null;
}

function keptReadings(): StatementBook['kept'] {
  const routes = new Map<string, Map<LineItemCode, Map<PlainDate, Reading>>>();
  return (route, line, date, read) => {
    let lines = routes.get(route);
    if (!lines) routes.set(route, (lines = new Map<LineItemCode, Map<PlainDate, Reading>>()));
    let readings = lines.get(line);
    if (!readings) lines.set(line, (readings = new Map<PlainDate, Reading>()));
    const known = readings.get(date);
    if (known) return known;
    const reading = read();
    readings.set(date, reading);
    return reading;
  };
}

function earliestWith(statements: readonly Statement[], line: LineItemCode): PlainDate | null {
  let earliest: PlainDate | null = null;
  for (const { amounts, periodEnd } of statements) {
    if (amounts[line]?.isZero() ?? true) continue;
    const end = reportingMonthEnd(periodEnd);
    if (earliest === null || end < earliest) earliest = end;
  }
  return earliest;
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
