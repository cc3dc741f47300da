import type { PlainDate } from '../calendar/plainDate.ts';

/** What one borrower brings to the comparison at one quarter end; every amount in its own currency units. */
export interface PeerInputs {
  readonly borrowerId: number;
  readonly sector: string;
  readonly quarterEnd: PlainDate;
  readonly ties: boolean;
  readonly derivedCashFlow: boolean;
  readonly figures: Readonly<Partial<Record<PeerFigure, number>>>;
  readonly acquisitionInYear: boolean;
  readonly acquisitionThisQuarter: boolean;
}

/** LTM flows and balances as in the quality book of the reference files; `prior` is the same quarter a year ago. */
export const PEER_FIGURES = [
  'assets',
  'assetsPrior',
  'netIncome',
  'impairmentAfterTax',
  'cfo',
  'capex',
  'capitalisedCosts',
  'capitalisedCostsPrior',
  'revenue',
  'revenuePrior',
  'ppeGross',
  'ebitda',
  'interestPaid',
  'taxPaid',
  'receivables',
  'receivablesPrior',
  'inventory',
  'inventoryPrior',
  'revenueQuarter',
  'revenueQuarterPrior',
  'cogsTwoQuarters',
  'cogsTwoQuartersPrior',
  'nwcPrior',
] as const;
export type PeerFigure = (typeof PEER_FIGURES)[number];

/** The peers' standing at each quarter end: plain JSON, so that it can be stored and read back. */
export interface CrossSection {
  readonly version: number;
  readonly quarters: readonly QuarterCrossSection[];
}

/** One quarter end: fitted models and the sorted figures that percentiles are read from. Refined in crossSection building. */
export interface QuarterCrossSection {
  readonly quarterEnd: PlainDate;
}
