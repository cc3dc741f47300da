/** Every published measure of one borrower at one quarter end, or why it cannot be given. */
import type { PlainDate } from '../calendar/plainDate.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import type { QuarterCrossSection } from './crossSection.ts';
import { accountsAt, type AccountsAt } from './accountsAt.ts';
import { balanceSheetMeasures, cashFlowMeasures } from './publishedAccruals.ts';
import { distressMeasures } from './publishedDistress.ts';
import { modelMeasures } from './publishedResiduals.ts';
import { screenMeasures } from './publishedScreens.ts';
import { seriesMeasures } from './publishedSeries.ts';
import type { PeerInputs } from './peerFigures.ts';
import { PUBLISHED_MEASURES, type PublishedMeasureKey } from './publishedRegister.ts';

/** A value with what has to be said beside it, or the reason why there is none. */
export type Given =
  { readonly value: number; readonly remarks?: readonly string[] } | { readonly missing: string };

export interface PublishedMeasure {
  readonly key: PublishedMeasureKey;
  readonly value: number | null;
  readonly reason: string | null;
  /** What was filled or derived, and how many firms a model rests on. */
  readonly remarks: readonly string[];
}

export interface PublishedContext {
  readonly book: StatementBook;
  readonly quarterEnd: PlainDate;
  readonly peer: PeerInputs;
  /** Null where nobody's accounts of the quarter end are in the book. */
  readonly section: QuarterCrossSection | null;
  readonly currency: string;
  /** Accounts of its own for every measure, so that one that does not tie costs only what rests on it. */
  readonly accounts: () => AccountsAt;
}

export type Measures = Readonly<Partial<Record<PublishedMeasureKey, Given>>>;

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
