/** Which version of a period is in force: what was known by a day, in one scope, best basis and latest version. */
import { isSamePeriodEnd, reportingMonthEnd } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import type { Statement, StatementBasis, StatementScope } from './statement.ts';

export interface StatementSelection {
  readonly scope: StatementScope;
  /** Statements received after this day are not there. */
  readonly asOf: PlainDate;
}

/** The higher the better founded. A forecast is never a figure. */
const BASIS_RANK: Readonly<Record<StatementBasis, number>> = {
  audited: 3,
  reviewed: 2,
  management: 1,
  forecast: 0,
};

/**
 * How well founded a basis is: the higher, the better.
 *
 * @example basisRank('audited') > basisRank('management') // => true
 */
export const basisRank = (basis: StatementBasis): number => BASIS_RANK[basis];

/**
 * Every version known by the day in the scope, forecasts left out. Flows over several versions need the earlier
 * ones too, to see whether a restatement touched a line.
 *
 * @example knownStatements(statements, { scope: 'group', asOf: '2026-03-01' }).length // => 2
 */
export const knownStatements = (
  statements: readonly Statement[],
  { scope, asOf }: StatementSelection,
): readonly Statement[] =>
  statements.filter(
    (statement) =>
      statement.scope === scope && statement.basis !== 'forecast' && statement.receivedOn <= asOf,
  );

/**
 * One statement per period end and length, in order of period end: audited over reviewed over management where
 * the same period exists on several bases, then the latest version.
 *
 * Source: desk practice; unaudited interim figures are superseded by audited ones (methods.md A7).
 *
 * @example currentStatements(statements, { scope: 'group', asOf: '2026-11-30' }).at(-1)?.months // => 9
 */
export function currentStatements(
  statements: readonly Statement[],
  selection: StatementSelection,
): readonly Statement[] {
  const byPeriod = new Map<string, Statement[]>();
  for (const statement of knownStatements(statements, selection)) {
    const key = `${reportingMonthEnd(statement.periodEnd)} ${statement.months}`;
    byPeriod.set(key, [...(byPeriod.get(key) ?? []), statement]);
  }
  return [...byPeriod.values()]
    .map((versions) => versions.reduce(better))
    .sort((a, b) => compareText(a.periodEnd, b.periodEnd) || a.months - b.months);
}

/**
 * The statement in force among versions of one period; null where there is none.
 *
 * @example inForce([]) // => null
 */
export const inForce = (versions: readonly Statement[]): Statement | null =>
  versions.length === 0 ? null : versions.reduce(better);

/**
 * Every version of one period that is given.
 *
 * @example versionsOf(statements, '2026-09-30', 9).length // => 1
 */
export const versionsOf = (
  statements: readonly Statement[],
  periodEnd: PlainDate,
  months: number,
): Statement[] =>
  statements.filter(
    (statement) => statement.months === months && isSamePeriodEnd(statement.periodEnd, periodEnd),
  );

/**
 * The statement in force for one period end and length; null where there is none.
 *
 * @example statementOf(statements, '2026-09-30', 3) // => null
 */
export const statementOf = (
  statements: readonly Statement[],
  periodEnd: PlainDate,
  months: number,
): Statement | null => inForce(versionsOf(statements, periodEnd, months));

function better(one: Statement, other: Statement): Statement {
  const order =
    basisRank(one.basis) - basisRank(other.basis) || one.version - other.version || one.id - other.id;
  return order >= 0 ? one : other;
}

const compareText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);
