import type { PeerFigure, PeerInputs } from './peerFigures.ts';

const NAMES: Readonly<Record<PeerFigure, string>> = {
  assets: 'total assets',
  assetsPrior: 'total assets a year ago',
  netIncome: 'net income over twelve months',
  impairmentAfterTax: 'impairment over twelve months',
  cfo: 'cash from operations over twelve months',
  capex: 'capital expenditure over twelve months',
  capitalisedCosts: 'capitalised costs over twelve months',
  capitalisedCostsPrior: 'capitalised costs of the year before',
  revenue: 'revenue over twelve months',
  revenuePrior: 'revenue of the year before',
  ppeGross: 'property, plant and equipment',
  ppeNet: 'property, plant and equipment, net',
  ebitda: 'EBITDA over twelve months',
  interestPaid: 'interest paid over twelve months',
  taxPaid: 'tax paid over twelve months',
  receivables: 'trade receivables',
  receivablesPrior: 'trade receivables a year ago',
  inventory: 'inventories',
  inventoryPrior: 'inventories a year ago',
  revenueQuarter: "the quarter's revenue",
  revenueQuarterPrior: "the same quarter's revenue a year ago",
  cogsTwoQuarters: 'cost of sales of the last two quarters',
  cogsTwoQuartersPrior: 'cost of sales of the same two quarters a year ago',
  nwcPrior: 'working capital a year ago',
  workingCapitalAccruals: 'net income before depreciation less cash from operations over twelve months',
  netIncomePrior: 'net income of the year before',
  revenueBefore: 'revenue of two years before',
  productionCosts: 'cost of sales or inventories',
  discretionaryExpenses: 'selling, general and administrative expense',
  mScore: 'M-score',
  fScore: 'F-score',
  accrualNoise: 'accrual noise',
};

/**
 * What a figure is called.
 *
 * @example figureName('nwcPrior') // => 'working capital a year ago'
 */
export const figureName = (figure: PeerFigure): string => NAMES[figure];

/**
 * "missing: cash from operations over twelve months, …"; null where all of them are there.
 *
 * @example missingFigures({ ...peer, figures: {} }, ['cfo']) // => 'missing: cash from operations over twelve months'
 */
export function missingFigures(peer: PeerInputs, needed: readonly PeerFigure[]): string | null {
  const missing = needed.filter((figure) => peer.figures[figure] === undefined);
  return missing.length === 0 ? null : `missing: ${missing.map((figure) => NAMES[figure]).join(', ')}`;
}

/**
 * IFRS 18: nothing that uses cash from operations until the year before is restated; null where one rule holds.
 *
 * @example brokenSeries(peer) // => null
 */
export const brokenSeries = (peer: PeerInputs): string | null =>
  peer.cashFlowPresentationChanged
    ? 'the presentation of cash flows changed within the two years compared and the year before is not restated'
    : null;
