/** Published measures that a firm's own accounts suffice for, turned so that more is more suspicious. */
import { accrualNoise, type NoiseSeries } from '#core/accruals/accrualNoise.ts';
import { balanceSheetAccruals } from '#core/accruals/balanceSheetAccruals.ts';
import { beneishIndices, mScore } from '#core/accruals/beneish.ts';
import { cashConversion } from '#core/accruals/cashConversion.ts';
import { cashFlowAccruals } from '#core/accruals/cashFlowAccruals.ts';
import { altmanZ, ohlsonO, zmijewskiX } from '#core/accruals/distressScores.ts';
import { fScore } from '#core/accruals/fScore.ts';
import { totalAccruals } from '#core/accruals/netOperatingAssets.ts';
import { smoothing } from '#core/accruals/smoothing.ts';
import {
  currentAssetsOf,
  currentLiabilitiesOf,
  equityOf,
  totalAssetsOf,
  totalLiabilitiesOf,
  workingCapitalOf,
  type Balances,
  type Flows,
  type QuarterAccounts,
} from './statements.ts';
import {
  averageAssets,
  beneishYear,
  ebitdaOf,
  ebitOf,
  firmYear,
  operatingSheet,
  type FirmYear,
} from './firmYear.ts';

/** Null where the measure has no meaning for the firm. */
export type Measured = Readonly<Record<string, number | null>>;

const negated = (value: number | null | undefined): number | null =>
  value === null || value === undefined ? null : -value;

export function ownMeasures(quarters: readonly QuarterAccounts[], quarter: number): Measured {
  const year = firmYear(quarters, quarter);
  const before = firmYear(quarters, quarter - 4);
  return {
    ...accrualMeasures(year),
    ...screens(year, before),
    ...seriesMeasures(quarters, quarter),
    ...distressMeasures(year, before),
  };
}

function accrualMeasures(year: FirmYear): Measured {
  const { flows, closing, opening } = year;
  const sloan = balanceSheetAccruals(
    operatingBalances(opening),
    operatingBalances(closing),
    flows.depreciation + flows.amortisation,
  );
  const cash = cashFlowAccruals({
    netIncome: flows.netIncome,
    cashFromOperations: flows.cfo,
    openingAssets: totalAssetsOf(opening),
    closingAssets: totalAssetsOf(closing),
  });
  const total = totalAccruals(operatingSheet(opening), operatingSheet(closing));
  const average = averageAssets(year);
  return {
    'Sloan accruals': sloan.scaled,
    'net income less cash from operations': cash.scaledAverage,
    'percent accruals': cash.percent,
    'change in net operating assets': average > 0 ? total.netOperatingAssetsChange / average : null,
    'total accruals (Richardson et al.)': total.scaled,
    'cash conversion, low': negated(plainConversion(year)),
  };
}

function plainConversion({ flows, opening }: FirmYear): number | undefined {
  return cashConversion({
    ebitda: ebitdaOf(flows),
    cashFromOperations: flows.cfo,
    interestPaid: flows.interest,
    taxPaid: flows.taxPaid,
    openingWorkingCapital: workingCapitalOf(opening),
    revenue: flows.revenue,
    // Plain conversion makes no use of it.
    priorRevenue: flows.revenue,
  })?.conversion;
}

const operatingBalances = (at: Balances) => ({
  currentAssets: currentAssetsOf(at),
  cash: at.cash,
  currentLiabilities: currentLiabilitiesOf(at),
  shortTermDebt: at.shortTermDebt,
  taxPayable: at.taxPayable,
  totalAssets: totalAssetsOf(at),
});

function screens(year: FirmYear, before: FirmYear): Measured {
  const indices = beneishIndices(beneishYear(year), beneishYear(before));
  const { m8, m5 } = mScore(indices);
  return {
    'M-score, eight variables': m8,
    'M-score, five variables': m5,
    'receivables index (DSRI)': indices.dsri,
    'F-score': fScoreOf(year, before),
  };
}

function fScoreOf(year: FirmYear, before: FirmYear): number | null {
  const { flows, closing, opening } = year;
  const [average, averageBefore] = [averageAssets(year), averageAssets(before)];
  const accruals = totalAccruals(operatingSheet(opening), operatingSheet(closing)).scaled;
  const cashSales = flows.revenue - (closing.receivables - opening.receivables);
  const cashSalesBefore = before.flows.revenue - (before.closing.receivables - before.opening.receivables);
  if (accruals === null || average <= 0 || averageBefore <= 0 || cashSalesBefore <= 0) return null;
  return fScore({
    totalAccruals: accruals,
    receivablesChange: (closing.receivables - opening.receivables) / average,
    inventoryChange: (closing.inventory - opening.inventory) / average,
    softAssets: (totalAssetsOf(closing) - closing.ppeNet - closing.cash) / totalAssetsOf(closing),
    cashSalesGrowth: cashSales / cashSalesBefore - 1,
    returnOnAssetsChange: flows.netIncome / average - before.flows.netIncome / averageBefore,
    // Net of repayments, which is kinder to the measure: a revolver is drawn somewhere in most years.
    hasIssued: flows.equityIssued > 0 || debtOf(closing) > debtOf(opening),
  }).f;
}

const debtOf = (at: Balances): number => at.shortTermDebt + at.seniorDebt;

/** Quarters with one before and one after that noise and smoothing are taken over. */
const HISTORY = 16;

function seriesMeasures(quarters: readonly QuarterAccounts[], quarter: number): Measured {
  const series = seasonalSeries(quarters, quarter);
  const noise = accrualNoise({
    cashFlow: series.cashFlow,
    workingCapitalChange: series.workingCapitalChange,
  });
  const withControls = accrualNoise(series);
  const recent = quarters.slice(quarter + 1 - HISTORY, quarter + 1).map(({ flows }) => flows);
  const smooth = smoothing(
    recent.map(ebitOf),
    recent.map(({ cfo }) => cfo),
  );
  const described = smooth.ok ? smooth.value : null;
  return {
    'accrual noise (Dechow and Dichev)': noise.ok ? noise.value.residualStandardDeviation : null,
    'accrual noise (McNichols)': withControls.ok ? withControls.value.residualStandardDeviation : null,
    'smoothing: spread of income over that of cash, low': negated(described?.spreadRatio),
    'smoothing: correlation of changes, low': negated(described?.changeCorrelation),
    'smoothing: size of accruals over that of cash': described?.meanSizeRatio ?? null,
  };
}

/** Each quarter less the same one a year before, over average assets: seasons cancel. Oldest first. */
function seasonalSeries(
  quarters: readonly QuarterAccounts[],
  quarter: number,
): NoiseSeries & { readonly controls: NonNullable<NoiseSeries['controls']> } {
  const first = Math.max(4, quarter - HISTORY - 1);
  const places = Array.from({ length: quarter - first + 1 }, (_, k) => first + k);
  const change = (read: (flows: Flows) => number) =>
    places.map((place) => {
      const [now, yearAgo] = [quarters[place]!, quarters[place - 4]!];
      const average = (totalAssetsOf(now.balances) + totalAssetsOf(yearAgo.balances)) / 2;
      return (read(now.flows) - read(yearAgo.flows)) / average;
    });
  return {
    cashFlow: change(({ cfo }) => cfo),
    workingCapitalChange: change(
      (flows) => flows.netIncome + flows.depreciation + flows.amortisation + flows.impairment - flows.cfo,
    ),
    controls: {
      revenueChange: change(({ revenue }) => revenue),
      ppe: places.map(
        (place) => quarters[place]!.balances.ppeGross / totalAssetsOf(quarters[place]!.balances),
      ),
    },
  };
}

/** Price level over that of 1968, for Ohlson's size term: a constant, so that ranks do not depend on it. */
const PRICE_LEVEL = 7;

/** They say how near to failure a firm looks; measured here because half of those that lift are in trouble. */
function distressMeasures({ flows, closing }: FirmYear, before: FirmYear): Measured {
  const assets = totalAssetsOf(closing);
  const liabilities = totalLiabilitiesOf(closing);
  const ratios = {
    workingCapitalOverAssets: (currentAssetsOf(closing) - currentLiabilitiesOf(closing)) / assets,
    retainedEarningsOverAssets: closing.retainedEarnings / assets,
    ebitOverAssets: ebitOf(flows) / assets,
    equityOverLiabilities: equityOf(closing) / liabilities,
    salesOverAssets: flows.revenue / assets,
  };
  const balance = {
    netIncome: flows.netIncome,
    totalAssets: assets,
    totalLiabilities: liabilities,
    currentAssets: currentAssetsOf(closing),
    currentLiabilities: currentLiabilitiesOf(closing),
  };
  return {
    "Altman Z', low": -altmanZ('private', ratios).z,
    "Altman Z'', low": -altmanZ('anyTrade', ratios).z,
    'Ohlson O': ohlsonO({
      ...balance,
      realAssets: assets / PRICE_LEVEL,
      netIncomePrior: before.flows.netIncome,
      fundsFromOperations: flows.netIncome + flows.depreciation + flows.amortisation + flows.impairment,
      hasTwoLosses: flows.netIncome < 0 && before.flows.netIncome < 0,
    }).score,
    'Zmijewski X': zmijewskiX(balance).score,
  };
}
