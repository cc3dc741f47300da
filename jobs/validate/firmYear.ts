/** Twelve months of a simulated firm up to a quarter, and the year before: what published measures are drawn from. */
import type { BeneishYear } from '#core/accruals/beneish.ts';
import type { OperatingBalanceSheet } from '#core/accruals/netOperatingAssets.ts';
import {
  currentAssetsOf,
  currentLiabilitiesOf,
  totalAssetsOf,
  totalLiabilitiesOf,
  type Balances,
  type Flows,
  type QuarterAccounts,
} from './statements.ts';

export interface FirmYear {
  readonly flows: Flows;
  readonly closing: Balances;
  readonly opening: Balances;
}

/** `quarters` are a firm's accounts, oldest first; `last` is the place of the year's fourth quarter, 4 at least. */
export function firmYear(quarters: readonly QuarterAccounts[], last: number): FirmYear {
  const year = quarters.slice(last - 3, last + 1).map(({ flows }) => flows);
  const sums = Object.fromEntries(
    Object.keys(year[0]!).map((name) => [
      name,
      year.reduce((sum, flows) => sum + flows[name as keyof Flows], 0),
    ]),
  ) as unknown as Flows;
  return { flows: sums, closing: quarters[last]!.balances, opening: quarters[last - 4]!.balances };
}

export const averageAssets = ({ closing, opening }: FirmYear): number =>
  (totalAssetsOf(closing) + totalAssetsOf(opening)) / 2;

export const ebitdaOf = ({ revenue, costOfSales, overheads }: Flows): number =>
  revenue - costOfSales - overheads;
export const ebitOf = (flows: Flows): number =>
  ebitdaOf(flows) - flows.depreciation - flows.amortisation - flows.impairment;

export const operatingSheet = (at: Balances): OperatingBalanceSheet => ({
  currentAssets: currentAssetsOf(at),
  cash: at.cash,
  totalAssets: totalAssetsOf(at),
  longTermInvestments: 0,
  currentLiabilities: currentLiabilitiesOf(at),
  shortTermDebt: at.shortTermDebt,
  longTermDebt: at.seniorDebt,
  totalLiabilities: totalLiabilitiesOf(at),
});

export const beneishYear = ({ flows, closing }: FirmYear): BeneishYear => ({
  receivables: closing.receivables,
  currentAssets: currentAssetsOf(closing),
  ppeNet: closing.ppeNet,
  totalAssets: totalAssetsOf(closing),
  currentLiabilities: currentLiabilitiesOf(closing),
  longTermDebt: closing.seniorDebt,
  sales: flows.revenue,
  costOfSales: flows.costOfSales,
  sellingAndAdministrative: flows.overheads,
  incomeFromContinuingOperations: flows.netIncome,
  cashFromOperations: flows.cfo,
  depreciation: flows.depreciation,
});
