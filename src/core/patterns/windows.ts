import type { FourBins } from '../statistics/standardizedDifference.ts';

/**
 * A bound of a window, free of the binary rounding of its product: three times 0.1 is 0.3, so that a headroom of
 * exactly 30 % falls to the right of it.
 *
 * @example edge(3, 0.1) // => 0.3
 */
export const edge = (bins: number, width: number, from = 0): number =>
  Number((from + bins * width).toFixed(12));

/**
 * Counts of the four bins around a cut-off, each closed on its left: a ratio exactly at its level is met.
 *
 * @example binsAround([-0.03, -0.01, 0, 0.019, 0.02], 0.02, 0) // => { farLeft: 1, left: 1, right: 2, farRight: 1 }
 */
export function binsAround(values: readonly number[], width: number, cutoff: number): FourBins {
  const edges = [-2, -1, 0, 1, 2].map((bins) => edge(bins, width, cutoff));
  const counts = [0, 0, 0, 0];
  for (const value of values) {
    if (value < edges[0]! || value >= edges[4]!) continue;
    const bin = value < edges[2]! ? (value < edges[1]! ? 0 : 1) : value < edges[3]! ? 2 : 3;
    counts[bin]! += 1;
  }
  const [farLeft = 0, left = 0, right = 0, farRight = 0] = counts;
  return { farLeft, left, right, farRight };
}

/** Nearer to an edge than this share of an interval the edge itself decides, free of binary rounding. */
const AT_AN_EDGE = 1e-6;

/**
 * In which interval of a width a value lies, counted from the limit: 0 is the first on the passing side. By the same
 * edges as the bins around a cut-off.
 *
 * @example [-0.001, 0, 0.06].map((value) => binOf(value, 0.02)) // => [-1, 0, 3]
 */
export function binOf(value: number, width: number): number {
  const intervals = value / width;
  const near = Math.floor(intervals);
  const within = intervals - near;
  if (within > AT_AN_EDGE && within < 1 - AT_AN_EDGE) return near;
  if (value < edge(near, width)) return near - 1;
  return value >= edge(near + 1, width) ? near + 1 : near;
}
