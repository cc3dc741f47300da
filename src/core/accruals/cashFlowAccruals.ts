export interface CashFlowAccruals {
  readonly accruals: number;
  readonly scaledAverage: number | null;
  readonly scaledOpening: number | null;
  /** Over the size of net income; null where net income is zero. */
  readonly percent: number | null;
}

/**
 * Accruals by the cash flow statement: net income less cash from operations over the same twelve months.
 *
 * Hribar & Collins (2002), Journal of Accounting Research 40. Scaling by |net income| as Hafzalla, Lundholm & Van
 * Winkle (2011), from memory. A scale that is not positive gives null.
 *
 * @example cashFlowAccruals({ netIncome: 5.5, cashFromOperations: 1.7, openingAssets: 96, closingAssets: 110 }).accruals // => 3.8
 */
export function cashFlowAccruals(year: {
  readonly netIncome: number;
  readonly cashFromOperations: number;
  readonly openingAssets: number;
  readonly closingAssets: number;
}): CashFlowAccruals {
  const accruals = year.netIncome - year.cashFromOperations;
  const over = (scale: number): number | null => (scale > 0 ? accruals / scale : null);
  return {
    accruals,
    scaledAverage: over((year.openingAssets + year.closingAssets) / 2),
    scaledOpening: over(year.openingAssets),
    percent: over(Math.abs(year.netIncome)),
  };
}
