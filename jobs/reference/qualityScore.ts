/** Reads the reporting-quality vectors into the core's own functions. */
import { z } from 'zod';
import { balanceSheetAccruals } from '#core/accruals/balanceSheetAccruals.ts';
import { cashConversion } from '#core/accruals/cashConversion.ts';
import { cashFlowAccruals } from '#core/accruals/cashFlowAccruals.ts';
import { daysOutstanding } from '#core/accruals/daysOutstanding.ts';
import { gated } from '#core/quality/blockParts.ts';
import { bandAfter, bandOf, headlineOf } from '#core/quality/headline.ts';
import { compositeScore } from '#core/quality/quarterScore.ts';
import { QUALITY_TABLE } from '#core/quality/qualityTable.ts';
import { QUALITY_BANDS, QUALITY_BLOCKS, type QualityBlockName } from '#core/quality/score.ts';
import { fScoreRisk, mScoreRisk } from '#core/quality/screens.ts';
import { mixedPercentile } from '#core/quality/standing.ts';
import { stretchOf } from '#core/quality/stretch.ts';
import { rankCounts } from '#core/statistics/percentile.ts';
import type { Topic } from './topic.ts';

const numbers = z.array(z.number());
const share = z.number().nullable();

const balances = z.object({
  current_assets: z.number(),
  cash: z.number(),
  current_liabilities: z.number(),
  short_term_debt: z.number(),
  tax_payable: z.number(),
  total_assets: z.number(),
});
const twoYears = z.object({
  p: balances,
  c: balances,
  flow: z.object({ net_income: z.number(), cfo: z.number(), depreciation: z.number() }),
});

const operatingBalances = (given: z.infer<typeof balances>) => ({
  currentAssets: given.current_assets,
  cash: given.cash,
  currentLiabilities: given.current_liabilities,
  shortTermDebt: given.short_term_debt,
  taxPayable: given.tax_payable,
  totalAssets: given.total_assets,
});

const sloan: Topic = (inputs) => {
  const { p, c, flow } = twoYears.parse(inputs);
  return { ...balanceSheetAccruals(operatingBalances(p), operatingBalances(c), flow.depreciation) };
};

const cash_flow_accruals: Topic = (inputs) => {
  const { p, c, flow } = twoYears.parse(inputs);
  const accruals = cashFlowAccruals({
    netIncome: flow.net_income,
    cashFromOperations: flow.cfo,
    openingAssets: p.total_assets,
    closingAssets: c.total_assets,
  });
  return {
    accruals: accruals.accruals,
    scaled_average: accruals.scaledAverage,
    scaled_opening: accruals.scaledOpening,
    percent_accruals: accruals.percent,
  };
};

const cash_conversion: Topic = (inputs) => {
  const given = z
    .object({
      ebitda: z.number(),
      cfo: z.number(),
      interest_paid: z.number(),
      tax_paid: z.number(),
      opening_nwc: z.number(),
      sales: z.number(),
      sales_prior: z.number(),
    })
    .parse(inputs);
  const conversion = cashConversion({
    ebitda: given.ebitda,
    cashFromOperations: given.cfo,
    interestPaid: given.interest_paid,
    taxPaid: given.tax_paid,
    openingWorkingCapital: given.opening_nwc,
    revenue: given.sales,
    priorRevenue: given.sales_prior,
  });
  return {
    cash_before_finance_and_tax: conversion?.cashBeforeFinanceAndTax ?? null,
    conversion: conversion?.conversion ?? null,
    growth_absorption: conversion?.growthAbsorption ?? null,
    conversion_growth_neutral: conversion?.growthNeutral ?? null,
  };
};

const days: Topic = (inputs) => {
  const given = z
    .object({
      receivables: z.number(),
      revenue_quarter: z.number(),
      receivables_ly: z.number(),
      revenue_quarter_ly: z.number(),
      inventory: z.number(),
      cogs_two_quarters: z.number(),
      inventory_ly: z.number(),
      cogs_two_quarters_ly: z.number(),
    })
    .parse(inputs);
  const receivables = daysOutstanding({
    balance: given.receivables,
    flow: given.revenue_quarter,
    balanceYearAgo: given.receivables_ly,
    flowYearAgo: given.revenue_quarter_ly,
    quarters: 1,
  });
  const inventory = daysOutstanding({
    balance: given.inventory,
    flow: given.cogs_two_quarters,
    balanceYearAgo: given.inventory_ly,
    flowYearAgo: given.cogs_two_quarters_ly,
    quarters: 2,
  });
  return {
    dso: receivables?.days ?? null,
    dso_ly: receivables?.daysYearAgo ?? null,
    dso_change: receivables?.change ?? null,
    dio: inventory?.days ?? null,
    dio_ly: inventory?.daysYearAgo ?? null,
    dio_change: inventory?.change ?? null,
  };
};

const peer_percentile: Topic = (inputs) => {
  const given = z
    .object({
      own: z.number(),
      peers: numbers,
      book: numbers,
      k_full: z.literal(QUALITY_TABLE.peers.fullSectorPeers),
    })
    .parse(inputs);
  const mixed = mixedPercentile(
    rankCounts(ascending(given.peers), given.own),
    rankCounts(ascending(given.book), given.own),
  );
  return {
    sector: mixed?.sectorPercentile ?? null,
    book: mixed?.bookPercentile ?? null,
    weight_sector: mixed?.sectorWeight ?? null,
    percentile: mixed?.percentile ?? null,
  };
};

const stretch: Topic = (inputs) => {
  const plain = z.object({ receivables: share, inventory: share, capitalised: share });
  const withGate = z.object({
    receivables_percentile: z.number(),
    receivables_change: z.number(),
    gate: z.literal(QUALITY_TABLE.gates.daysUp),
    inventory: share,
    capitalised: share,
  });
  const given = z.union([plain, withGate]).parse(inputs);
  const receivables =
    'receivables' in given
      ? given.receivables
      : gated(given.receivables_percentile, given.receivables_change < QUALITY_TABLE.gates.daysUp);
  const { inventory, capitalised } = given;
  return { receivables, stretch: stretchOf({ receivables, inventory, capitalised })?.risk ?? null };
};

const BLOCK_KEYS: Readonly<Record<QualityBlockName, string>> = {
  'unexplained accruals': 'unexplained',
  'sharpest stretch': 'stretch',
  'cash conversion': 'conversion',
  'published screens': 'screens',
  'accrual noise': 'noise',
};

const composite: Topic = (inputs) => {
  const risks = z.record(z.string(), share).parse(inputs);
  const { coverage, score } = compositeScore(
    QUALITY_BLOCKS.map((name) => ({
      weight: QUALITY_TABLE.weights[name],
      risk: risks[BLOCK_KEYS[name]] ?? null,
    })),
  );
  return { coverage: coverage / 100, score, band: score === null ? null : bandOf(score) };
};

const screens: Topic = (inputs) => {
  const given = z.object({ m: numbers, f: numbers }).parse(inputs);
  return { m_risk: given.m.map(mScoreRisk), f_risk: given.f.map(fScoreRisk) };
};

const headline: Topic = (inputs) => {
  const given = z.object({ quarter_scores: z.array(share) }).parse(inputs);
  const { headline: mean, quarters, provisional } = headlineOf(given.quarter_scores);
  return {
    headline: mean,
    band: mean === null ? null : bandOf(mean),
    provisional,
    note: quarters === 2 ? 'two quarters' : '',
  };
};

const band_change: Topic = (inputs) => {
  const given = z.object({ previous: z.enum(QUALITY_BANDS), headline: z.number() }).parse(inputs);
  return { band: bandAfter(given.previous, given.headline) };
};

/** By the names of the vector file. */
export const topics: Record<string, Topic> = {
  band_change,
  cash_conversion,
  cash_flow_accruals,
  composite,
  days,
  headline,
  peer_percentile,
  screens,
  sloan,
  stretch,
};

const ascending = (values: readonly number[]): number[] => [...values].sort((a, b) => a - b);
