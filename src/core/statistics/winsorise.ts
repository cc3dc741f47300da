import { linearPercentile } from './percentile.ts';

export interface WinsorLimits {
  readonly low: number;
  readonly high: number;
}

/**
 * The values at the two tail shares of a sample, by linear percentiles; what lies outside is drawn in to them by
 * `clamp`. Throws RangeError for an empty sample.
 *
 * @example winsorLimits([0, 1, 2, 3, 100], 0.25) // => { low: 1, high: 3 }
 */
export function winsorLimits(sample: readonly number[], tail: number): WinsorLimits {
  const sorted = Float64Array.from(sample).sort();
  return { low: linearPercentile(sorted, tail), high: linearPercentile(sorted, 1 - tail) };
}

/**
 * A value drawn in to the limits.
 *
 * @example clamp(9, { low: 1, high: 3 }) // => 3
 */
export const clamp = (value: number, { low, high }: WinsorLimits): number =>
  Math.min(high, Math.max(low, value));
