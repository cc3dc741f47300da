/** The ratios of the whole book on one calendar of quarter ends, so that changes can be taken across it. */
import { monthCount, type PlainDate } from '../calendar/plainDate.ts';
import type { MeasureCode } from '../measures/measure.ts';
import { groupedBy } from '../patterns/groupedBy.ts';
import { comparisonQuarterEnd } from '../quality/comparisonQuarterEnd.ts';
import { QUARTERS_OF_CHANGES, type RatioHistory } from './peerChanges.ts';
import type { RatioAt, RatioSeries } from './ratioSeries.ts';

/** Tests ahead are projected over so many quarters. */
export const HORIZONS = [1, 2, 3, 4] as const;
export type Horizon = (typeof HORIZONS)[number];

export interface RatioGrid {
  readonly measure: MeasureCode;
  /** Oldest first, without gaps. */
  readonly quarterEnds: readonly PlainDate[];
  /** One a borrower; `points` stand under `quarterEnds`, null where the borrower has none. */
  readonly rows: readonly RatioRow[];
}

export interface RatioRow extends Pick<RatioSeries, 'borrowerId' | 'sector' | 'bound'> {
  readonly points: readonly (RatioAt | null)[];
}

/**
 * The series of each measure side by side. Of several covenants of one borrower on one measure the one with the most
 * tests speaks, so that nobody counts twice; of two tests in one calendar quarter the later one.
 *
 * @example ratioGrids([]).size // => 0
 */
export const ratioGrids = (series: readonly RatioSeries[]): ReadonlyMap<MeasureCode, RatioGrid> =>
  new Map(
    [...groupedBy(series, ({ measure }) => measure)].map(([measure, all]) => [measure, gridOf(measure, all)]),
  );

function gridOf(measure: MeasureCode, all: readonly RatioSeries[]): RatioGrid {
  const quarterOf = quartersOf(all);
  const series = [...groupedBy(all, ({ borrowerId }) => borrowerId).values()].map(longest);
  const places = series.flatMap(({ points }) => points.map(({ testDate }) => quarterOf(testDate).place));
  const first = places.reduce((least, place) => Math.min(least, place), Infinity);
  const last = places.reduce((most, place) => Math.max(most, place), -Infinity);
  const quarterEnds = new Map<number, PlainDate>();
  const rows = series.map(({ borrowerId, sector, bound, points }): RatioRow => {
    const placed: (RatioAt | null)[] = Array.from({ length: last - first + 1 }, () => null);
    for (const point of points) {
      const { place, quarterEnd } = quarterOf(point.testDate);
      placed[place - first] = point;
      quarterEnds.set(place, quarterEnd);
    }
    return { borrowerId, sector, bound, points: placed };
  });
  return { measure, quarterEnds: filled(quarterEnds), rows };
}

const longest = (series: readonly RatioSeries[]): RatioSeries =>
  series.reduce((most, one) => (one.points.length > most.points.length ? one : most));

interface Quarter {
  /** Quarters since the beginning of the calendar. */
  readonly place: number;
  readonly quarterEnd: PlainDate;
}

/** Days are few and asked for often. */
function quartersOf(all: readonly RatioSeries[]): (testDate: PlainDate) => Quarter {
  const known = new Map<PlainDate, Quarter>();
  for (const { points } of all)
    for (const { testDate } of points) {
      if (known.has(testDate)) continue;
      const quarterEnd = comparisonQuarterEnd(testDate);
      known.set(testDate, { quarterEnd, place: Math.floor(monthCount(quarterEnd) / 3) });
    }
  return (testDate) => known.get(testDate)!;
}

/** In order; quarters in which nobody was tested are named too. */
function filled(quarterEnds: ReadonlyMap<number, PlainDate>): readonly PlainDate[] {
  const places = [...quarterEnds.keys()].sort((a, b) => a - b);
  const [first, last] = [places[0], places.at(-1)];
  if (first === undefined || last === undefined) return [];
  return Array.from(
    { length: last - first + 1 },
    (_, k) => quarterEnds.get(first + k) ?? quarterEndAt(first + k),
  );
}

const quarterEndAt = (place: number): PlainDate =>
  comparisonQuarterEnd(
    `${String(Math.floor(place / 4)).padStart(4, '0')}-${String((place % 4) * 3 + 3).padStart(2, '0')}-28` as PlainDate,
  );

/**
 * The grid as it stood at one of its quarter ends, as peers' changes are taken from it: nothing that came later, and
 * the leverage of that quarter end.
 *
 * @example historiesAt({ measure: 'net-leverage', quarterEnds: [], rows: [] }, 0) // => []
 */
export const historiesAt = ({ rows }: RatioGrid, place: number): readonly RatioHistory[] =>
  rows.map(({ borrowerId, sector, points }) => ({
    borrowerId,
    sector,
    leverage: latestLeverage(points, place),
    points: points.slice(Math.max(0, place + 1 - QUARTERS_OF_CHANGES - HORIZONS.length), place + 1),
  }));

/** Of the latest test up to the quarter end. */
function latestLeverage(points: RatioRow['points'], place: number): number | null {
  for (let at = place; at >= 0; at -= 1) {
    const point = points[at];
    if (point) return point.leverage ?? null;
  }
  return null;
}
