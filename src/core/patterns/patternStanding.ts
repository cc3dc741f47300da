/** What the night keeps of the book's patterns: plain JSON, read by day and by every borrower's assessment. */
import type { Result } from '../result.ts';
import { BOOK_PATTERN_SETTINGS, bookPattern, type BookPattern } from './bookPattern.ts';
import type { HeadroomRow } from './headroomRow.ts';
import type { TooFewNearLimit } from './nearLimit.ts';
import type { RankedSeries } from './nearLineRanking.ts';
import type { PatternGates } from './patternGate.ts';
import { patternLists, type SeriesId } from './patternLists.ts';

/** One covenant's tests near its limit, as the whole book lets them be read. */
export interface NearLineStanding extends RankedSeries<SeriesId> {
  /** Its type's gate is open and it belongs to the list: the strongest that may be said is "pattern". */
  readonly isPublished: boolean;
  /** Share of the book that the fit takes for lifting, which the local false-discovery rate rests on. */
  readonly priorShare: number;
}

export interface PatternStanding extends PatternGates {
  readonly nearLine: readonly NearLineStanding[];
  readonly book: Result<BookPattern, TooFewNearLimit>;
}

/**
 * The book's own test, the gates by type, and every covenant's evidence near its line. `seed` draws the bootstrap.
 *
 * Source: methods.md Part C.
 *
 * @example patternStanding([], 1).nearLine // => []
 */
export function patternStanding(rows: readonly HeadroomRow[], seed: number): PatternStanding {
  const { gates, refused, rankings, published } = patternLists(rows);
  const listed = new Set(published.flatMap(({ series }) => series.map(({ covenantId }) => covenantId)));
  return {
    gates,
    refused,
    nearLine: rankings.flatMap(({ ranking: { series, priorShare } }) =>
      series.map((each) => ({ ...each, isPublished: listed.has(each.id.covenantId), priorShare })),
    ),
    book: bookPattern(rows, { ...BOOK_PATTERN_SETTINGS, seed }),
  };
}
