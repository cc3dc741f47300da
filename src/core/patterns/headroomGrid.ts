import { normalCdf } from '../statistics/normalDistribution.ts';
import { edge } from './windows.ts';

/** The window around the limit within which a result can be moved from one side to the other, in shares of the level. */
export interface NearLine {
  /** Passing side: from 0 (in) to `band` (out). */
  readonly band: number;
  /** Failing side: from -`gap` (in) to 0 (out). */
  readonly gap: number;
}

/** Recommended, once and before looking: methods.md Part C 5.4. */
export const NEAR_LINE: NearLine = { band: 0.02, gap: 0.04 };

/**
 * What every pair of a mean and a spread of headroom says of the window: computed once, used for every borrower.
 * Cell `mean x spreads + spread`.
 */
export interface HeadroomGrid {
  readonly near: NearLine;
  readonly means: Float64Array;
  readonly logSpreads: Float64Array;
  readonly passing: Float64Array;
  readonly failing: Float64Array;
  /** Log of the probability of the whole window. */
  readonly logNear: Float64Array;
}

const MEANS = { from: -0.3, to: 0.8, count: 45 };
const LOG_SPREADS = { from: Math.log(0.02), to: Math.log(0.4), count: 17 };
/** Keeps the log finite where a cell puts nothing into the window. */
const LEAST_PROBABILITY = 1e-300;

/**
 * The grid of means from -30 % to 80 % and spreads from 2 % to 40 % of the level. Source: methods.md Part C 5.2.
 *
 * @example headroomGrid(NEAR_LINE).passing.length // => 765
 */
export function headroomGrid(near: NearLine): HeadroomGrid {
  const means = steps(MEANS);
  const logSpreads = steps(LOG_SPREADS);
  const cells = means.length * logSpreads.length;
  const grid = {
    near,
    means,
    logSpreads,
    passing: new Float64Array(cells),
    failing: new Float64Array(cells),
    logNear: new Float64Array(cells),
  };
  means.forEach((mean, m) =>
    logSpreads.forEach((logSpread, s) => {
      const cell = m * logSpreads.length + s;
      const { passing, failing } = nearProbabilities(mean, Math.exp(logSpread), near);
      grid.passing[cell] = passing;
      grid.failing[cell] = failing;
      grid.logNear[cell] = Math.log(Math.max(passing + failing, LEAST_PROBABILITY));
    }),
  );
  return grid;
}

/**
 * How likely a normal headroom falls on either side of the limit within the window.
 *
 * @example nearProbabilities(0, 1, { band: 0.5, gap: 0.5 }).passing // => 0.19146246127401…
 */
export function nearProbabilities(
  mean: number,
  spread: number,
  { band, gap }: NearLine,
): { readonly passing: number; readonly failing: number } {
  const between = (from: number, to: number): number => {
    const [low, high] = [(from - mean) / spread, (to - mean) / spread];
    // In the upper tail the difference of the small numbers keeps its digits.
    return low > 0 ? normalCdf(-low) - normalCdf(-high) : normalCdf(high) - normalCdf(low);
  };
  return { passing: between(0, band), failing: between(-gap, 0) };
}

const steps = ({ from, to, count }: { from: number; to: number; count: number }): Float64Array =>
  Float64Array.from({ length: count }, (_, k) => from + ((to - from) * k) / (count - 1));

/** What the fit needs of one series of headrooms: enough to weigh every cell without the values. */
export interface HeadroomSample {
  readonly passing: number;
  readonly failing: number;
  readonly outside: number;
  readonly sumOutside: number;
  readonly sumOfSquaresOutside: number;
  readonly median: number;
  /** 1.4826 times the median distance from the median: the standard deviation of a normal series. */
  readonly robustSpread: number;
}

/**
 * Counts and sums of one series, oldest or newest first alike. Throws RangeError for an empty one.
 *
 * @example headroomSample([0.01, -0.02, 0.3], NEAR_LINE).outside // => 1
 */
export function headroomSample(headrooms: readonly number[], near: NearLine): HeadroomSample {
  if (headrooms.length === 0) throw new RangeError('headroomSample needs at least one headroom');
  const upper = edge(1, near.band);
  const lower = edge(-1, near.gap);
  let passing = 0;
  let failing = 0;
  let sumOutside = 0;
  let sumOfSquaresOutside = 0;
  for (const headroom of headrooms) {
    if (headroom >= lower && headroom < 0) failing += 1;
    else if (headroom >= 0 && headroom < upper) passing += 1;
    else {
      sumOutside += headroom;
      sumOfSquaresOutside += headroom * headroom;
    }
  }
  const median = medianOfValues(Float64Array.from(headrooms));
  const distances = Float64Array.from(headrooms, (headroom) => Math.abs(headroom - median));
  return {
    passing,
    failing,
    outside: headrooms.length - passing - failing,
    sumOutside,
    sumOfSquaresOutside,
    median,
    robustSpread: 1.4826 * medianOfValues(distances),
  };
}

function medianOfValues(values: Float64Array): number {
  values.sort();
  const middle = values.length >> 1;
  return values.length % 2 === 1 ? values[middle]! : (values[middle - 1]! + values[middle]!) / 2;
}
