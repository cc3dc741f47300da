/** Reads the vectors of published scores and models into the core's own functions. */
import { z } from 'zod';
import { accrualNoise } from '#core/accruals/accrualNoise.ts';
import { beneishIndices, BENEISH_INDICES, mProbability, mScore } from '#core/accruals/beneish.ts';
import { fScore, fScoreAt, predictedAt } from '#core/accruals/fScore.ts';
import { totalAccruals } from '#core/accruals/netOperatingAssets.ts';
import { realActivities } from '#core/accruals/realActivities.ts';
import { smoothing as smoothingOf } from '#core/accruals/smoothing.ts';
import type { LeastSquares } from '#core/statistics/leastSquares.ts';
import { valueOf, type Topic } from './topic.ts';

const numbers = z.array(z.number());

const beneishYear = z
  .object({
    receivables: z.number(),
    current_assets: z.number(),
    ppe_net: z.number(),
    total_assets: z.number(),
    current_liabilities: z.number(),
    long_term_debt: z.number(),
    sales: z.number(),
    cogs: z.number(),
    sga: z.number(),
    income_cont_ops: z.number(),
    cfo: z.number(),
    depreciation: z.number(),
  })
  .transform((year) => ({
    receivables: year.receivables,
    currentAssets: year.current_assets,
    ppeNet: year.ppe_net,
    totalAssets: year.total_assets,
    currentLiabilities: year.current_liabilities,
    longTermDebt: year.long_term_debt,
    sales: year.sales,
    costOfSales: year.cogs,
    sellingAndAdministrative: year.sga,
    incomeFromContinuingOperations: year.income_cont_ops,
    cashFromOperations: year.cfo,
    depreciation: year.depreciation,
  }));

const beneish: Topic = (inputs) => {
  const given = z
    .union([
      z.object({ current: beneishYear, prior: beneishYear }),
      z.object({ m: numbers }),
      z.record(z.enum(BENEISH_INDICES), z.number().nullable()),
    ])
    .parse(inputs);
  if ('m' in given) return { probability: given.m.map(mProbability) };
  const indices = 'current' in given ? beneishIndices(given.current, given.prior) : given;
  const { m8, m5, probability, filled } = mScore(indices);
  return { ...indices, m8, m5, probability_m8: probability, filled };
};

const operatingSheet = z
  .object({
    current_assets: z.number(),
    cash: z.number(),
    total_assets: z.number(),
    lt_investments: z.number(),
    current_liabilities: z.number(),
    short_term_debt: z.number(),
    long_term_debt: z.number(),
    total_liabilities: z.number(),
  })
  .transform((sheet) => ({
    currentAssets: sheet.current_assets,
    cash: sheet.cash,
    totalAssets: sheet.total_assets,
    longTermInvestments: sheet.lt_investments,
    currentLiabilities: sheet.current_liabilities,
    shortTermDebt: sheet.short_term_debt,
    longTermDebt: sheet.long_term_debt,
    totalLiabilities: sheet.total_liabilities,
  }));

const rsst: Topic = (inputs) => {
  const { p, c, flow } = z
    .object({
      p: operatingSheet,
      c: operatingSheet,
      flow: z.object({ net_income: z.number(), cfo: z.number(), cfi: z.number() }),
    })
    .parse(inputs);
  const accruals = totalAccruals(p, c);
  const netOperatingAssets = (sheet: typeof c): number =>
    sheet.totalAssets -
    sheet.cash -
    sheet.longTermInvestments -
    (sheet.totalLiabilities - sheet.shortTermDebt - sheet.longTermDebt);
  const change = netOperatingAssets(c) - netOperatingAssets(p);
  return {
    d_wc: accruals.workingCapitalChange,
    d_nco: accruals.nonCurrentOperatingChange,
    d_fin: accruals.financialChange,
    rsst: accruals.scaled,
    d_noa: accruals.netOperatingAssetsChange,
    check_d_noa_equals_wc_plus_nco: Math.abs(change - accruals.netOperatingAssetsChange) < 1e-9,
    cash_flow_version: flow.net_income - flow.cfo - flow.cfi,
  };
};

const f_score: Topic = (inputs) => {
  const given = z
    .union([
      z.object({ unconditional: z.number() }),
      z.object({
        rsst_acc: z.number(),
        ch_rec: z.number(),
        ch_inv: z.number(),
        soft_assets: z.number(),
        ch_cs: z.number(),
        ch_roa: z.number(),
        issue: z.number(),
      }),
    ])
    .parse(inputs);
  if ('unconditional' in given) return { ...fScoreAt(predictedAt(given.unconditional)) };
  return {
    ...fScore({
      totalAccruals: given.rsst_acc,
      receivablesChange: given.ch_rec,
      inventoryChange: given.ch_inv,
      softAssets: given.soft_assets,
      cashSalesGrowth: given.ch_cs,
      returnOnAssetsChange: given.ch_roa,
      hasIssued: given.issue === 1,
    }),
  };
};

const dechow_dichev: Topic = (inputs) => {
  const given = z.object({ cfo: numbers, d_wc: numbers, d_revenue: numbers, ppe: numbers }).parse(inputs);
  const series = { cashFlow: given.cfo, workingCapitalChange: given.d_wc };
  const plain = valueOf(accrualNoise(series));
  const controls = { revenueChange: given.d_revenue, ppe: given.ppe };
  const controlled = valueOf(accrualNoise({ ...series, controls }));
  return {
    dd_coef: plain.coefficients,
    dd_resid_sd: plain.residualSpread,
    dd_resid_sd_df: plain.residualStandardDeviation,
    mcnichols_coef: controlled.coefficients,
    mcnichols_resid_sd_df: controlled.residualStandardDeviation,
    n: plain.n,
  };
};

const roychowdhury: Topic = (inputs) => {
  const given = z
    .object({
      lag_assets: numbers,
      sales: numbers,
      d_sales: numbers,
      d_sales_prior: numbers,
      cfo: numbers,
      production_costs: numbers,
      discretionary_expenses: numbers,
    })
    .parse(inputs);
  const fits = valueOf(
    realActivities(
      given.lag_assets.map((lagAssets, k) => ({
        lagAssets,
        sales: given.sales[k]!,
        salesChange: given.d_sales[k]!,
        salesChangePrior: given.d_sales_prior[k]!,
        cashFromOperations: given.cfo[k]!,
        productionCosts: given.production_costs[k]!,
        discretionaryExpenses: given.discretionary_expenses[k]!,
      })),
    ),
  );
  const shown = ({ coefficients, residuals }: LeastSquares) => ({ coef: coefficients, residuals });
  return {
    cfo: shown(fits.cashFlow),
    production: shown(fits.production),
    discretionary: shown(fits.discretionary),
  };
};

const smoothing: Topic = (inputs) => {
  const given = z.object({ operating_income: numbers, cfo: numbers }).parse(inputs);
  const smooth = valueOf(smoothingOf(given.operating_income, given.cfo));
  return {
    em1_sd_ratio: smooth.spreadRatio,
    em2_spearman: smooth.changeCorrelation,
    em3_mean_abs_ratio: smooth.meanSizeRatio,
    em3_median_abs_ratio: smooth.medianSizeRatio,
  };
};

/** By the names of the vector file. */
export const topics: Record<string, Topic> = {
  beneish,
  dechow_dichev,
  f_score,
  roychowdhury,
  rsst,
  smoothing,
};
