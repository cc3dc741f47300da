/** Which version of a period is in force: what was known by a day, in one scope, best basis and latest version. */
import { reportingMonthEnd } from '../calendar/fiscalYear.ts';
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

/** Versions of one period, one at least. */
export type Versions = readonly [Statement, ...Statement[]];

/**
 * Every version of each period, by length in months and month end; a period end within six days of a month end
 * belongs to that month.
 *
 * @example versionsByPeriod(statements).get(9)?.get('2026-09-30')?.length // => 1
 */
export function versionsByPeriod(
  statements: readonly Statement[],
): ReadonlyMap<number, ReadonlyMap<PlainDate, Versions>> {
  const byMonths = new Map<number, Map<PlainDate, [Statement, ...Statement[]]>>();
  for (const statement of statements) {
    const byEnd = byMonths.get(statement.months) ?? new Map<PlainDate, [Statement, ...Statement[]]>();
    byMonths.set(statement.months, byEnd);
    const end = reportingMonthEnd(statement.periodEnd);
    const versions = byEnd.get(end);
    if (versions) versions.push(statement);
    else byEnd.set(end, [statement]);
  }
  return byMonths;
}

/**
 * One statement per period end and length, in order of period end: audited over reviewed over management where
 * the same period exists on several bases, then the latest version.
 *
 * Source: desk practice; unaudited interim figures are superseded by audited ones (methods.md A7).
 *
 * @example currentStatements(statements, { scope: 'group', asOf: '2026-11-30' }).at(-1)?.months // => 9
 */
export const currentStatements = (
  statements: readonly Statement[],
  selection: StatementSelection,
): readonly Statement[] => inForceByPeriodEnd(versionsByPeriod(knownStatements(statements, selection)));

/**
 * The same out of versions that are laid out already.
 *
 * @example inForceByPeriodEnd(versionsByPeriod(statements)).at(-1)?.months // => 9
 */
export const inForceByPeriodEnd = (versions: ReturnType<typeof versionsByPeriod>): readonly Statement[] =>
  [...versions.values()]
    .flatMap((byEnd) => [...byEnd.values()].map(inForce))
    .sort((a, b) => compareText(a.periodEnd, b.periodEnd) || a.months - b.months);

/** The statement in force among versions of one period. */
const inForce = ([first, ...others]: Versions): Statement => others.reduce(better, first);

function better(one: Statement, other: Statement): Statement {
  const order =
    basisRank(one.basis) - basisRank(other.basis) || one.version - other.version || one.id - other.id;
  return order >= 0 ? one : other;
}

const compareText = (a: string, b: string): number => (a < b ? -1 : a > b ? 1 : 0);
