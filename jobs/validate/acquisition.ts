import type { FirmPlan } from './firmPlan.ts';
import type { TradingQuarter } from './trading.ts';

/** What comes with a business that is bought: its balances pass no cash flow from operations. */
export interface Acquired {
  readonly price: number;
  readonly receivables: number;
  readonly inventory: number;
  readonly otherAssets: number;
  readonly payables: number;
  readonly accrued: number;
  readonly taxPayable: number;
  readonly ppe: number;
  readonly goodwill: number;
}

const NONE: Acquired = {
  price: 0,
  receivables: 0,
  inventory: 0,
  otherAssets: 0,
  payables: 0,
  accrued: 0,
  taxPayable: 0,
  ppe: 0,
  goodwill: 0,
};

const PRICE_IN_EBITDA = 7;

/** The bought business in the quarter in which it comes, seven years of its EBITDA paid, at least its net assets. */
export function acquiredIn(
  { acquisition }: FirmPlan,
  quarter: number,
  trading: TradingQuarter,
  ppeNet: number,
): Acquired {
  if (acquisition?.quarter !== quarter) return NONE;
  const share = acquisition.size / (1 + acquisition.size);
  const part = (value: number): number => Math.round(share * value);
  const balances = {
    receivables: part(trading.receivables),
    inventory: part(trading.inventory),
    otherAssets: part(trading.otherAssets),
    payables: part(trading.payables),
    accrued: part(trading.accrued),
    ppe: Math.round(acquisition.size * ppeNet),
  };
  const netAssets =
    balances.receivables +
    balances.inventory +
    balances.otherAssets +
    balances.ppe -
    balances.payables -
    balances.accrued;
  const price = Math.max(netAssets, part(PRICE_IN_EBITDA * 4 * trading.ordinaryEbitda));
  return { ...balances, price, taxPayable: 0, goodwill: price - netAssets };
}
