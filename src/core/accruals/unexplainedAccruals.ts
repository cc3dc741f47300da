/**
 * The wide accrual model of the reporting-quality score (methods.md B6):
 *
 *   (NI + after-tax impairment - CFO + capex + capitalised costs)/A = b0 + b1 (1/A) + b2 (dREV/A) + b3 (PPE/A)
 *                                                                    + b4 (CFO/A) + e,   A = assets a year before
 *
 * The Jones terms with Kothari's constant and the cash-flow control of Dechow & Dichev and McNichols. Wide, because
 * costs moved onto the balance sheet leave cash from operations untouched and would be missed otherwise.
 */
export interface AccrualInputs {
  readonly assetsPrior: number;
  readonly netIncome: number;
  readonly impairmentAfterTax: number;
  readonly cfo: number;
  readonly capex: number;
  readonly capitalisedCosts: number;
  readonly revenue: number;
  readonly revenuePrior: number;
}

/** The terms of one firm; shares of last year's assets but for the reciprocal of those assets. */
export interface AccrualTerms {
  readonly accruals: number;
  readonly reciprocalAssets: number;
  readonly revenueChange: number;
  readonly cashFlow: number;
}

/**
 * The model's terms but for property, plant and equipment, which is gross or net for a whole group of firms.
 * Null where assets a year before are not positive.
 *
 * @example accrualTerms({ assetsPrior: 100, netIncome: 4, impairmentAfterTax: 0, cfo: 7, capex: 5, capitalisedCosts: 0, revenue: 132, revenuePrior: 120 })?.accruals // => 0.02
 */
export function accrualTerms(inputs: AccrualInputs): AccrualTerms | null {
  const { assetsPrior: scale } = inputs;
  if (scale <= 0) return null;
  const accruals =
    inputs.netIncome + inputs.impairmentAfterTax - inputs.cfo + inputs.capex + inputs.capitalisedCosts;
  return {
    accruals: accruals / scale,
    reciprocalAssets: 1 / scale,
    revenueChange: (inputs.revenue - inputs.revenuePrior) / scale,
    cashFlow: inputs.cfo / scale,
  };
}
