/** A balance sheet cut into working capital, other operating assets and finance; one date, one unit. */
export interface OperatingBalanceSheet {
  readonly currentAssets: number;
  readonly cash: number;
  readonly totalAssets: number;
  /** Zero where the accounts show none (methods.md B2). */
  readonly longTermInvestments: number;
  readonly currentLiabilities: number;
  readonly shortTermDebt: number;
  readonly longTermDebt: number;
  readonly totalLiabilities: number;
}

export interface TotalAccruals {
  readonly workingCapitalChange: number;
  readonly nonCurrentOperatingChange: number;
  readonly financialChange: number;
  readonly netOperatingAssetsChange: number;
  /** The three changes over average assets; null where those are not positive. */
  readonly scaled: number | null;
}

/**
 * Total accruals out of two balance sheets a year apart: the changes of working capital, non-current operating assets
 * and financial assets less debt. Cash is left out of finance, as there are no short-term investments in our lines.
 *
 * Richardson, Sloan, Soliman & Tuna (2005), Journal of Accounting and Economics 39; definitions from memory, matching
 * a public notebook.
 *
 * @example totalAccruals(openingSheet, closingSheet).netOperatingAssetsChange // => 13.3
 */
export function totalAccruals(prior: OperatingBalanceSheet, closing: OperatingBalanceSheet): TotalAccruals {
  const change = (read: (sheet: OperatingBalanceSheet) => number): number => read(closing) - read(prior);
  const workingCapitalChange = change(workingCapital);
  const nonCurrentOperatingChange = change(nonCurrentOperating);
  const financialChange = change(
    (sheet) => sheet.longTermInvestments - sheet.longTermDebt - sheet.shortTermDebt,
  );
  const average = (prior.totalAssets + closing.totalAssets) / 2;
  const sum = workingCapitalChange + nonCurrentOperatingChange + financialChange;
  return {
    workingCapitalChange,
    nonCurrentOperatingChange,
    financialChange,
    netOperatingAssetsChange: workingCapitalChange + nonCurrentOperatingChange,
    scaled: average > 0 ? sum / average : null,
  };
}

const workingCapital = (sheet: OperatingBalanceSheet): number =>
  sheet.currentAssets - sheet.cash - (sheet.currentLiabilities - sheet.shortTermDebt);

const nonCurrentOperating = (sheet: OperatingBalanceSheet): number =>
  sheet.totalAssets -
  sheet.currentAssets -
  sheet.longTermInvestments -
  (sheet.totalLiabilities - sheet.currentLiabilities - sheet.longTermDebt);
