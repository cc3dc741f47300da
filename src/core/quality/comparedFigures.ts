import { cashConversion, type CashConversion } from '../accruals/cashConversion.ts';
import { daysOutstanding, type DaysChange } from '../accruals/daysOutstanding.ts';
import type { PeerFigure, PeerInputs } from './peerFigures.ts';

/** What borrowers are ranked by, and the two levels that are shown beside the changes. */
export const COMPARED_FIGURES = [
  'unexplainedAccruals',
  'receivableDays',
  'receivableDaysChange',
  'inventoryDays',
  'inventoryDaysChange',
  'capitalisedShare',
  'capitalisedShareChange',
  'cashConversion',
  'accrualNoise',
] as const;
export type ComparedFigure = (typeof COMPARED_FIGURES)[number];

/** Beyond these bounds conversion says the same thing louder. */
const CONVERSION_BOUNDS = { low: -1, high: 3 };

export interface CapitalisedShare {
  /** Capitalised costs over revenue, twelve months. */
  readonly share: number;
  readonly shareYearAgo: number;
  readonly change: number;
}

type Figures = PeerInputs['figures'];

/**
 * The named figures if every one is there.
 *
 * @example figuresOf({ revenue: 90 }, ['revenue', 'cfo']) // => null
 */
export function figuresOf<Name extends PeerFigure>(
  figures: Figures,
  names: readonly Name[],
): Record<Name, number> | null {
  return names.every((name) => figures[name] !== undefined) ? (figures as Record<Name, number>) : null;
}

/**
 * Growth of twelve months' revenue over the year before; null without a positive base.
 *
 * @example revenueGrowth({ revenue: 90, revenuePrior: 80 }) // => 0.125
 */
export function revenueGrowth(figures: Figures): number | null {
  const { revenue, revenuePrior } = figures;
  if (revenue === undefined || revenuePrior === undefined || revenuePrior <= 0) return null;
  return revenue / revenuePrior - 1;
}

/**
 * Receivable days on the latest quarter's sales.
 *
 * @example receivableDays({ receivables: 15, receivablesPrior: 10, revenueQuarter: 30, revenueQuarterPrior: 25 })?.change // => 0.25
 */
export function receivableDays(figures: Figures): DaysChange | null {
  const given = figuresOf(figures, [
    'receivables',
    'receivablesPrior',
    'revenueQuarter',
    'revenueQuarterPrior',
  ]);
  return (
    given &&
    daysOutstanding({
      balance: given.receivables,
      flow: given.revenueQuarter,
      balanceYearAgo: given.receivablesPrior,
      flowYearAgo: given.revenueQuarterPrior,
      quarters: 1,
    })
  );
}

/**
 * Inventory days on the cost of sales of the last two quarters.
 *
 * @example inventoryDays({ inventory: 15, inventoryPrior: 10, cogsTwoQuarters: 30, cogsTwoQuartersPrior: 25 })?.change // => 0.25
 */
export function inventoryDays(figures: Figures): DaysChange | null {
  const given = figuresOf(figures, [
    'inventory',
    'inventoryPrior',
    'cogsTwoQuarters',
    'cogsTwoQuartersPrior',
  ]);
  return (
    given &&
    daysOutstanding({
      balance: given.inventory,
      flow: given.cogsTwoQuarters,
      balanceYearAgo: given.inventoryPrior,
      flowYearAgo: given.cogsTwoQuartersPrior,
      quarters: 2,
    })
  );
}

/**
 * Null for a borrower that capitalised nothing in either year: none is not zero.
 *
 * @example capitalisedShare({ capitalisedCosts: 3, capitalisedCostsPrior: 0, revenue: 100, revenuePrior: 90 }) // => { share: 0.03, shareYearAgo: 0, change: 0.03 }
 */
export function capitalisedShare(figures: Figures): CapitalisedShare | null {
  const given = figuresOf(figures, ['capitalisedCosts', 'capitalisedCostsPrior', 'revenue', 'revenuePrior']);
  if (!given || given.revenue <= 0 || given.revenuePrior <= 0) return null;
  if (given.capitalisedCosts === 0 && given.capitalisedCostsPrior === 0) return null;
  const share = given.capitalisedCosts / given.revenue;
  const shareYearAgo = given.capitalisedCostsPrior / given.revenuePrior;
  return { share, shareYearAgo, change: share - shareYearAgo };
}

/**
 * Cash conversion of twelve months; null where a figure is missing or the ratio has no meaning.
 *
 * @example conversionOf({ ebitda: 10, cfo: 6, interestPaid: 1, taxPaid: 1, nwcPrior: 20, revenue: 90, revenuePrior: 90 })?.conversion // => 0.8
 */
export function conversionOf(figures: Figures): CashConversion | null {
  const given = figuresOf(figures, [
    'ebitda',
    'cfo',
    'interestPaid',
    'taxPaid',
    'nwcPrior',
    'revenue',
    'revenuePrior',
  ]);
  return (
    given &&
    cashConversion({
      ebitda: given.ebitda,
      cashFromOperations: given.cfo,
      interestPaid: given.interestPaid,
      taxPaid: given.taxPaid,
      openingWorkingCapital: given.nwcPrior,
      revenue: given.revenue,
      priorRevenue: given.revenuePrior,
    })
  );
}

/**
 * Everything one borrower is ranked by at one quarter end; null where a figure cannot be given.
 *
 * @example comparedFigures(peer, 0.02).unexplainedAccruals // => 0.02
 */
export function comparedFigures(
  peer: PeerInputs,
  unexplained: number | null,
): Record<ComparedFigure, number | null> {
  const receivables = receivableDays(peer.figures);
  const inventory = inventoryDays(peer.figures);
  const capitalised = capitalisedShare(peer.figures);
  const conversion = conversionOf(peer.figures)?.growthNeutral;
  const bounded =
    conversion === undefined
      ? null
      : Math.min(CONVERSION_BOUNDS.high, Math.max(CONVERSION_BOUNDS.low, conversion));
  return {
    unexplainedAccruals: stored(unexplained),
    receivableDays: stored(receivables?.days),
    receivableDaysChange: stored(receivables?.change),
    inventoryDays: stored(inventory?.days),
    inventoryDaysChange: stored(inventory?.change),
    capitalisedShare: stored(capitalised?.share),
    capitalisedShareChange: stored(capitalised?.change),
    cashConversion: stored(bounded),
    accrualNoise: stored(peer.figures.accrualNoise),
  };
}

/** Eight digits: finer than any accounts, and short where ten thousand borrowers are stored. */
const stored = (value: number | null | undefined): number | null =>
  value === null || value === undefined ? null : Number(value.toPrecision(8));
