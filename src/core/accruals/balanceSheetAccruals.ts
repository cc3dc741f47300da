/** The balances that working-capital accruals are drawn from, one date, one unit. */
export interface OperatingBalances {
  readonly currentAssets: number;
  readonly cash: number;
  readonly currentLiabilities: number;
  readonly shortTermDebt: number;
  /** Zero where the accounts show none (methods.md B2). */
  readonly taxPayable: number;
  readonly totalAssets: number;
}

export interface ScaledAccruals {
  readonly accruals: number;
  /** Over the average of opening and closing assets; null where that is not positive. */
  readonly scaled: number | null;
}

/**
 * Accruals out of two balance sheets a year apart: the change in non-cash current assets less the change in current
 * liabilities other than debt and income tax, less depreciation.
 *
 * Sloan (1996), The Accounting Review 71, equation 1. Acquisitions and currency disturb it; the cash flow statement
 * does not (see cashFlowAccruals).
 *
 * @example balanceSheetAccruals(openingSheet, closingSheet, 6) // => { accruals: 4, scaled: 0.0388… }
 */
export function balanceSheetAccruals(
  prior: OperatingBalances,
  closing: OperatingBalances,
  depreciation: number,
): ScaledAccruals {
  const operating = (balances: OperatingBalances): number =>
    balances.currentAssets -
    balances.cash -
    (balances.currentLiabilities - balances.shortTermDebt - balances.taxPayable);
  const accruals = operating(closing) - operating(prior) - depreciation;
  const average = (prior.totalAssets + closing.totalAssets) / 2;
  return { accruals, scaled: average > 0 ? accruals / average : null };
}
