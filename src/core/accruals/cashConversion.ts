/** Twelve months' flows and the working capital they started from, one unit; paid items positive. */
export interface CashConversionInputs {
  readonly ebitda: number;
  readonly cashFromOperations: number;
  readonly interestPaid: number;
  readonly taxPaid: number;
  readonly openingWorkingCapital: number;
  readonly revenue: number;
  readonly priorRevenue: number;
}

export interface CashConversion {
  readonly cashBeforeFinanceAndTax: number;
  readonly conversion: number;
  /** Working capital that the year's growth takes at last year's ratio to revenue. */
  readonly growthAbsorption: number;
  readonly growthNeutral: number;
}

/** EBITDA up to this share of revenue is too thin to divide by. */
const THINNEST_MARGIN = 0.01;

/**
 * How much of EBITDA came in as cash before interest and tax, plain and after allowing for the working capital that
 * growth takes.
 *
 * Own measure (methods.md B1 item 10). Null where EBITDA is not above 1 % of revenue or revenue a year before was
 * not positive: the ratio has no meaning there.
 *
 * @example cashConversion({ ebitda: 14, cashFromOperations: 1.7, interestPaid: 2.6, taxPaid: 1.6, openingWorkingCapital: 17, revenue: 132, priorRevenue: 118 })?.growthNeutral // => 0.565…
 */
export function cashConversion(year: CashConversionInputs): CashConversion | null {
  if (year.ebitda <= THINNEST_MARGIN * year.revenue || year.ebitda <= 0 || year.priorRevenue <= 0)
    return null;
  const cashBeforeFinanceAndTax = year.cashFromOperations + year.interestPaid + year.taxPaid;
  const growthAbsorption = year.openingWorkingCapital * (year.revenue / year.priorRevenue - 1);
  return {
    cashBeforeFinanceAndTax,
    conversion: cashBeforeFinanceAndTax / year.ebitda,
    growthAbsorption,
    growthNeutral: (cashBeforeFinanceAndTax + growthAbsorption) / year.ebitda,
  };
}
