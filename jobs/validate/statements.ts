/** What the three statements of a simulated quarter hold, and their sums. Whole currency units. */

/** Closing balances. */
export interface Balances {
  readonly cash: number;
  readonly receivables: number;
  readonly inventory: number;
  readonly otherAssets: number;
  readonly ppeGross: number;
  readonly ppeNet: number;
  readonly intangibles: number;
  readonly goodwill: number;
  readonly payables: number;
  readonly accrued: number;
  readonly taxPayable: number;
  readonly shortTermDebt: number;
  readonly seniorDebt: number;
  readonly paidInCapital: number;
  readonly retainedEarnings: number;
}

/** Flows of one quarter, paid items positive. */
export interface Flows {
  readonly revenue: number;
  readonly costOfSales: number;
  readonly overheads: number;
  readonly depreciation: number;
  readonly amortisation: number;
  readonly impairment: number;
  readonly interest: number;
  readonly tax: number;
  readonly netIncome: number;
  readonly cfo: number;
  readonly taxPaid: number;
  readonly capex: number;
  readonly capitalisedCosts: number;
  readonly acquisitionsPaid: number;
  readonly debtDrawn: number;
  readonly debtRepaid: number;
  readonly dividends: number;
  readonly equityIssued: number;
}

export interface QuarterAccounts {
  readonly flows: Flows;
  readonly balances: Balances;
}

export const currentAssetsOf = (at: Balances): number =>
  at.cash + at.receivables + at.inventory + at.otherAssets;
export const totalAssetsOf = (at: Balances): number =>
  currentAssetsOf(at) + at.ppeNet + at.intangibles + at.goodwill;
export const currentLiabilitiesOf = (at: Balances): number =>
  at.payables + at.accrued + at.taxPayable + at.shortTermDebt;
export const totalLiabilitiesOf = (at: Balances): number => currentLiabilitiesOf(at) + at.seniorDebt;
export const equityOf = (at: Balances): number => at.paidInCapital + at.retainedEarnings;

type WorkingCapital = Pick<
  Balances,
  'receivables' | 'inventory' | 'otherAssets' | 'payables' | 'accrued' | 'taxPayable'
>;
export const workingCapitalOf = (at: WorkingCapital): number =>
  at.receivables + at.inventory + at.otherAssets - at.payables - at.accrued - at.taxPayable;
