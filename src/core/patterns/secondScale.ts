import { linearPercentile } from '../statistics/percentile.ts';
import { groupedBy } from './groupedBy.ts';
import type { HeadroomRow } from './headroomRow.ts';

/** Beyond this many standard deviations of its measure a distance is left out, as in sd slack. */
const MOST_DEVIATIONS = 2;

/**
 * Distances from the level on a scale that does not divide by each test's own level: over the median level of the
 * measure. That is the distance in standard deviations of the measure with the bin width matched to the first scale;
 * beyond two deviations it is left out. What shows on one scale only depends on the scale.
 *
 * Source: methods.md C0 (sd slack) and Part C 1.5.
 *
 * @example onSecondScale([]) // => []
 */
export function onSecondScale(rows: readonly HeadroomRow[]): readonly number[] {
  return [...groupedBy(rows, ({ measure }) => measure).values()].flatMap(ofMeasure);
}

function ofMeasure(rows: readonly HeadroomRow[]): readonly number[] {
  const usable = rows.flatMap(({ headroom, distance, tested }) =>
    headroom === null || headroom === 0 || distance === null || tested === null
      ? []
      : [{ distance, tested, level: Math.abs(distance / headroom) }],
  );
  // At the limit itself both scales are nought; such a test only lacks a level of its own.
  const atLimit = rows.filter(({ headroom, distance }) => headroom === 0 && distance === 0).map(() => 0);
  if (usable.length < 2) return atLimit;
  const mean = usable.reduce((sum, { tested }) => sum + tested, 0) / usable.length;
  const squares = usable.reduce((sum, { tested }) => sum + (tested - mean) ** 2, 0);
  const deviation = Math.sqrt(squares / (usable.length - 1));
  const level = linearPercentile(Float64Array.from(usable, (each) => each.level).sort(), 0.5);
  return [
    ...atLimit,
    ...usable
      .filter(({ distance }) => Math.abs(distance) <= MOST_DEVIATIONS * deviation)
      .map(({ distance }) => distance / level),
  ];
}
