import { binOf } from './windows.ts';

/** How many tests end in each interval of headroom, as a share of the level. */
export interface HeadroomHistogram {
  readonly width: number;
  /** Lower end of the first interval; every interval is closed on its left, one begins at the limit. */
  readonly from: number;
  readonly counts: readonly number[];
  /** Tests that end further out on either side. */
  readonly below: number;
  readonly above: number;
}

/** Shown from 30 % of the level on the failing side to 60 % on the passing side. */
const SHOWN = { failing: 0.3, passing: 0.6 };

/**
 * The histogram of headroom around the limit: no interval straddles it, and exactly at the level is met.
 *
 * @example headroomHistogram([-0.01, 0, 0.019, 0.7], 0.02).counts.slice(14, 17) // => [1, 2, 0]
 */
export function headroomHistogram(headrooms: readonly number[], width: number): HeadroomHistogram {
  const first = -Math.round(SHOWN.failing / width);
  const counts = new Array<number>(Math.round(SHOWN.passing / width) - first).fill(0);
  let below = 0;
  let above = 0;
  for (const headroom of headrooms) {
    const bin = binOf(headroom, width) - first;
    if (bin < 0) below += 1;
    else if (bin >= counts.length) above += 1;
    else counts[bin]! += 1;
  }
  return { width, from: Number((first * width).toFixed(12)), counts, below, above };
}
