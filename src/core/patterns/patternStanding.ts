/** What the night keeps of the patterns for every borrower's assessment: plain JSON, small for ten thousand borrowers. */
import type { PlainDate } from '../calendar/plainDate.ts';
import type { MeasureCode } from '../measures/measure.ts';
import { NEAR_LINE, type NearLine } from './headroomGrid.ts';
import type { HeadroomRow } from './headroomRow.ts';
import type { RankedSeries } from './nearLineRanking.ts';
import type { PatternGates } from './patternGate.ts';
import { patternLists, type SeriesId } from './patternLists.ts';
import { edge } from './windows.ts';

/**
 * One covenant's tests near its limit, as the whole book lets them be read. Only covenants with three or more of them
 * have one: of the others nothing can be said.
 */
export interface NearLineStanding
  extends
    SeriesId,
    Pick<
      RankedSeries<SeriesId>,
      'near' | 'passing' | 'expectedPassing' | 'share' | 'pAtLeast' | 'localFdr' | 'peers' | 'peerCount'
    > {
  readonly measure: MeasureCode;
  /** Its type's gate is open and it belongs to the list: the strongest that may be said is "pattern". */
  readonly isPublished: boolean;
  /** The latest of the tests near the limit. */
  readonly latestNear: PlainDate;
}

/** What a type of covenant's evidence rests on. */
export interface TypeStanding {
  readonly measure: MeasureCode;
  /** Covenants with at least one test that counts. */
  readonly covenants: number;
  /** Share of them that the fit takes for lifting before looking at one. */
  readonly priorShare: number;
}

export interface PatternStanding extends PatternGates {
  readonly window: NearLine;
  readonly types: readonly TypeStanding[];
  readonly nearLine: readonly NearLineStanding[];
}

/** More digits than are ever printed. */
const KEPT_DIGITS = 6;
const kept = (value: number): number => Number(value.toPrecision(KEPT_DIGITS));

/**
 * The gates by type of covenant, and every covenant's evidence near its line, figures to six digits.
 *
 * Source: methods.md Part C 5.
 *
 * @example patternStanding([]).nearLine // => []
 */
export function patternStanding(rows: readonly HeadroomRow[]): PatternStanding {
  const { gates, refused, rankings, published } = patternLists(rows);
  const listed = new Set(published.flatMap(({ series }) => series.map(({ covenantId }) => covenantId)));
  const latest = latestNearOf(rows);
  return {
    window: NEAR_LINE,
    gates,
    refused,
    types: rankings.map(({ measure, ranking: { n, priorShare } }) => ({
      measure,
      covenants: n,
      priorShare: kept(priorShare),
    })),
    nearLine: rankings.flatMap(({ measure, ranking }) =>
      ranking.series
        .filter(({ hasEnoughNear }) => hasEnoughNear)
        .map(({ id, near, passing, peers, peerCount, ...figures }) => ({
          ...id,
          measure,
          near,
          passing,
          expectedPassing: kept(figures.expectedPassing),
          share: kept(figures.share),
          pAtLeast: kept(figures.pAtLeast),
          localFdr: kept(figures.localFdr),
          peers,
          peerCount,
          isPublished: listed.has(id.covenantId),
          latestNear: latest.get(id.covenantId)!,
        })),
    ),
  };
}

function latestNearOf(rows: readonly HeadroomRow[]): ReadonlyMap<number, PlainDate> {
  const latest = new Map<number, PlainDate>();
  const [low, high] = [edge(-1, NEAR_LINE.gap), edge(1, NEAR_LINE.band)];
  for (const { covenantId, testDate, headroom, removal } of rows) {
    if (removal !== null || headroom === null || headroom < low || headroom >= high) continue;
    const before = latest.get(covenantId);
    if (before === undefined || before < testDate) latest.set(covenantId, testDate);
  }
  return latest;
}
