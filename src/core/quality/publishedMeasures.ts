/** Every published measure of one borrower at one quarter end, or why it cannot be given. */
import { accountsAt } from './accountsAt.ts';
import { balanceSheetMeasures, cashFlowMeasures } from './publishedAccruals.ts';
import type { PublishedContext } from './publishedContext.ts';
import { distressMeasures } from './publishedDistress.ts';
import {
  PUBLISHED_MEASURES,
  type Given,
  type Measures,
  type PublishedMeasure,
  type PublishedMeasureKey,
} from './publishedMeasure.ts';
import { modelMeasures } from './publishedResiduals.ts';
import { screenMeasures } from './publishedScreens.ts';
import { seriesMeasures } from './publishedSeries.ts';

/**
 * In the order of the register. Flows are twelve months, balances closing, comparisons with the same quarter a year
 * before; never one quarter times four. Source: methods.md B1 and B2.
 *
 * @example publishedMeasures({ book, quarterEnd: '2026-09-30', peer, section: null, currency: 'EUR' }).length // => 26
 */
export function publishedMeasures(given: Omit<PublishedContext, 'accounts'>): readonly PublishedMeasure[] {
  const context = { ...given, accounts: () => accountsAt(given.book, given.quarterEnd) };
  const measures: Measures = {
    ...balanceSheetMeasures(context),
    ...cashFlowMeasures(context),
    ...modelMeasures(context),
    ...seriesMeasures(context),
    ...screenMeasures(context),
    ...distressMeasures(context),
  };
  return PUBLISHED_MEASURES.map((key) => shownAs(key, measures[key]));
}

function shownAs(key: PublishedMeasureKey, measure: Given | undefined): PublishedMeasure {
  if (!measure) throw new Error(`${key} is in the register and nobody computes it`);
  if ('missing' in measure) return { key, value: null, reason: measure.missing, remarks: [] };
  return { key, value: measure.value, reason: null, remarks: measure.remarks ?? [] };
}
