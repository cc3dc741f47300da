import type { MeasureCode } from '../measures/measure.ts';
import { groupedBy } from './groupedBy.ts';
import { NEAR_LINE, type NearLine } from './headroomGrid.ts';
import type { HeadroomRow } from './headroomRow.ts';
import { headroomsOf } from './nearLimit.ts';
import { rankNearLine, type HeadroomSeries, type NearLineRanking } from './nearLineRanking.ts';
import { patternGates, type PatternGates } from './patternGate.ts';

/** One covenant of one borrower. */
export interface SeriesId {
  readonly borrowerId: number;
  readonly covenantId: number;
}

export interface PatternLists extends PatternGates {
  /** Every series of every type, whether its gate is open or not. */
  readonly rankings: readonly {
    readonly measure: MeasureCode;
    readonly ranking: NearLineRanking<SeriesId>;
  }[];
  /** Only of types whose gate is open; empty where none is. */
  readonly published: readonly { readonly measure: MeasureCode; readonly series: readonly SeriesId[] }[];
}

/**
 * The near-line evidence of every covenant, and the lists that may be shown: a type's list is published only where the
 * book's own test of that type rejects. What is listed is a pattern and nothing stronger.
 *
 * Source: methods.md Part C 5.4.
 *
 * @example patternLists([]).published // => []
 */
export function patternLists(rows: readonly HeadroomRow[], near: NearLine = NEAR_LINE): PatternLists {
  const gates = patternGates(rows);
  const rankings = [...groupedBy(rows, ({ measure }) => measure)].map(([measure, ofMeasure]) => ({
    measure,
    ranking: rankNearLine(seriesOf(ofMeasure), near),
  }));
  const open = new Set(gates.gates.filter(({ isOpen }) => isOpen).map(({ measure }) => measure));
  const published = rankings
    .filter(({ measure }) => open.has(measure))
    .map(({ measure, ranking }) => ({
      measure,
      series: ranking.series.filter(({ listed }) => listed).map(({ id }) => id),
    }));
  return { ...gates, rankings, published };
}

function seriesOf(rows: readonly HeadroomRow[]): readonly HeadroomSeries<SeriesId>[] {
  const kept = rows.filter(({ removal, headroom }) => removal === null && headroom !== null);
  return [...groupedBy(kept, ({ covenantId }) => covenantId).values()].map((own) => ({
    id: { borrowerId: own[0]!.borrowerId, covenantId: own[0]!.covenantId },
    sector: own[0]!.sector,
    headrooms: headroomsOf(own),
  }));
}
