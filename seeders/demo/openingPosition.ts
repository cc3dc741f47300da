import type { TradingPlan } from './tradingPlan.ts';

/** What a quarter hands to the next, in thousands. */
export interface Position {
  readonly cash: number;
  readonly receivables: number;
  readonly inventory: number;
  readonly otherCurrentAssets: number;
  readonly ppeGross: number;
  readonly ppeNet: number;
  readonly intangibles: number;
  readonly goodwill: number;
  readonly payables: number;
  readonly accruedLiabilities: number;
  readonly taxPayable: number;
  readonly revolver: number;
  readonly termLoan: number;
  readonly junior: number;
  readonly leases: number;
  readonly capital: number;
  readonly retainedEarnings: number;
  /** Net income since the last year end, from which the dividend is paid. */
  readonly incomeOfYear: number;
  readonly incomeOfLastYear: number;
}

/** Goodwill fills up to this share of equity, as where a lender financed a purchase. */
const LEAST_EQUITY_SHARE = 0.22;
const CAPITAL_SHARE = 0.35;

export function openingPosition(plan: TradingPlan): Position {
  const { profile } = plan;
  const year = plan.revenue * 4;
  const junior = Math.round(plan.termDebt * plan.juniorShare);
  const parts = {
    cash: Math.round(year * plan.openingCashShare),
    receivables: Math.round((plan.revenue * profile.receivableDays) / 91),
    inventory: Math.round((plan.revenue * profile.cogsShare * profile.inventoryDays) / 91),
    otherCurrentAssets: Math.round(year * 0.015),
    ppeGross: Math.round(year * profile.ppeShare),
    ppeNet: Math.round(year * profile.ppeShare * 0.56),
    intangibles: Math.round(year * profile.capitalisedShare * 3 + year * 0.01),
    payables: Math.round((plan.revenue * profile.cogsShare * profile.payableDays) / 91),
    accruedLiabilities: Math.round(year * 0.03),
    taxPayable: Math.round(year * 0.003),
    revolver: 0,
    termLoan: Math.round(plan.termDebt) - junior,
    junior,
    leases: Math.round(year * profile.leaseShare),
  };
  const assets =
    parts.cash +
    parts.receivables +
    parts.inventory +
    parts.otherCurrentAssets +
    parts.ppeNet +
    parts.intangibles;
  const liabilities =
    parts.payables +
    parts.accruedLiabilities +
    parts.taxPayable +
    parts.termLoan +
    parts.junior +
    parts.leases;
  const ordinaryGoodwill = Math.round(year * profile.goodwillShare);
  const goodwill = Math.max(ordinaryGoodwill, Math.ceil(liabilities / (1 - LEAST_EQUITY_SHARE)) - assets);
  const equity = assets + goodwill - liabilities;
  const capital = Math.round(equity * CAPITAL_SHARE);
  return {
    ...parts,
    goodwill,
    capital,
    retainedEarnings: equity - capital,
    incomeOfYear: 0,
    incomeOfLastYear: 0,
  };
}
