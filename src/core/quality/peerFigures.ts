import type { PlainDate } from '../calendar/plainDate.ts';
import type { StatementBasis, Tie } from '../statements/statement.ts';

/** LTM flows and balances, paid items positive; `prior` is the same quarter a year ago. */
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
  'ppeNet',
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
  'workingCapitalAccruals',
  'netIncomePrior',
  'revenueBefore',
  'productionCosts',
  'discretionaryExpenses',
  'mScore',
  'fScore',
  'accrualNoise',
] as const;
export type PeerFigure = (typeof PEER_FIGURES)[number];

/** What one borrower brings to the comparison at one quarter end; every amount in its own currency units. */
export interface PeerInputs {
  readonly borrowerId: number;
  readonly sector: string;
  readonly quarterEnd: PlainDate;
  /** No statement behind the figures fails its identities. */
  readonly ties: boolean;
  /** The worst tie of the statements behind the figures. */
  readonly tie: Tie;
  /** Of the balance sheet at the quarter end. */
  readonly basis: StatementBasis;
  readonly derivedCashFlow: boolean;
  /** The twelve months mix two presentations of the cash flow statement. */
  readonly cashFlowPresentationChanged: boolean;
  /** No quarterly income statements: days are counted on the year's flows. */
  readonly daysOnYear: boolean;
  readonly figures: Readonly<Partial<Record<PeerFigure, number>>>;
  /** Of figures that are computed out of many lines: why one is not there. */
  readonly whyMissing?: Readonly<Partial<Record<PeerFigure, string>>>;
  /** Which published form the M-score is; eight variables where nothing is said. */
  readonly mScoreForm?: 'M8' | 'M5';
  readonly acquisitionInYear: boolean;
  readonly acquisitionThisQuarter: boolean;
}
