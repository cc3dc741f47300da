import { discreteCutoff, type DiscreteCutoff } from '../statistics/discreteCutoff.ts';
import type { HeadroomRow } from './headroomRow.ts';

/** Ratios that agreements round before comparing, counted in their own steps around the level. */
export interface CoarseRatios extends DiscreteCutoff {
  /** Ratios that round to the level itself, to the step before it (failing) and to the step after it. */
  readonly counts: { readonly previous: number; readonly at: number; readonly next: number };
  /** Tests under agreements that round, wherever they end. */
  readonly rounded: number;
}

/** Second differences of a density over such steps stay within this share of it. Source: methods.md Part C 3.3. */
const CURVATURE_BOUND = 0.05;
/** A level that lies between two steps has no cell of its own. */
const ON_STEP = 1e-6;

/**
 * Frandsen's test where agreements round the ratio: whether more round exactly to their level than its neighbours
 * allow. The step is each agreement's own. Null where no agreement rounds. Source: methods.md Part C 3.3.
 *
 * @example coarseRatios([{ tested: 3.497, distance: 0.003, ratioStep: 0.01 }]).counts // => { previous: 0, at: 1, next: 0 }
 * @example coarseRatios([{ tested: 3.497, distance: 0.003, ratioStep: null }]) // => null
 */
export function coarseRatios(
  rows: readonly Pick<HeadroomRow, 'tested' | 'distance' | 'ratioStep'>[],
): CoarseRatios | null {
  const counts = { previous: 0, at: 0, next: 0 };
  let rounded = 0;
  for (const { tested, distance, ratioStep } of rows) {
    if (ratioStep === null || tested === null || distance === null) continue;
    rounded += 1;
    const cell = cellOf(tested, distance, ratioStep);
    if (cell === -1) counts.previous += 1;
    else if (cell === 0) counts.at += 1;
    else if (cell === 1) counts.next += 1;
  }
  return rounded === 0 ? null : { ...discreteCutoff(counts, CURVATURE_BOUND), counts, rounded };
}

/** Steps from the level after rounding, positive on the passing side; null where the level lies on no step. */
function cellOf(tested: number, distance: number, step: number): number | null {
  const level = [(tested + distance) / step, (tested - distance) / step].find(
    (steps) => Math.abs(steps - Math.round(steps)) < ON_STEP,
  );
  if (level === undefined) return null;
  const steps = Math.abs(Math.round(level) - Math.round(tested / step));
  return distance < 0 ? -steps : steps;
}
