/** How likely the tests of every series of a peer group are under every cell of the grid. */
import type { HeadroomGrid, HeadroomSample } from './headroomGrid.ts';

/** Likelihoods are taken to this power: LTM ratios share three of four quarters with their neighbour. */
const TEMPERING = 0.5;
/** Cells lighter than the heaviest by e^45 add nothing that a double could hold. */
export const NEGLIGIBLE = 45;
/** Likelihoods of a larger group are not held for the next pass: 6 kB a series. */
const MOST_HELD = 4_000;

/**
 * Memory in which groups of up to so many series can be fitted one after another.
 *
 * @example roomFor({ means: [0.1], logSpreads: [-2], passing: [0.05], failing: [0.1], logNear: [-1.9] }, 3).length // => 3
 */
export const roomFor = ({ logNear: { length: cells } }: HeadroomGrid, series: number): Float64Array =>
  new Float64Array(cells * (series > MOST_HELD ? 1 : series));

interface Likelihoods {
  /** Cell `c` of the series lies at `at + c`, beside the largest; outside `from` and `to` it is negligible. */
  readonly held: Float64Array;
  readonly at: number;
  readonly from: number;
  readonly to: number;
}

/**
 * The tempered likelihoods of every series, the largest of each being one; held for all passes unless `held` is too
 * small for that.
 *
 * @example likelihoodsOfGroup({ means: [0.1], logSpreads: [-2], passing: [0.05], failing: [0.1], logNear: [-1.9] }, [{ passing: 0, failing: 0, outside: 1, sumOutside: 0.1, sumOfSquaresOutside: 0.01, median: 0.1, robustSpread: 0.1 }], likelihoodWriter({ means: [0.1], logSpreads: [-2], passing: [0.05], failing: [0.1], logNear: [-1.9] }), roomFor({ means: [0.1], logSpreads: [-2], passing: [0.05], failing: [0.1], logNear: [-1.9] }, 1))(0).held[0] // => 1
 */
export function likelihoodsOfGroup(
  grid: HeadroomGrid,
  samples: readonly HeadroomSample[],
  likelihoodOf: LikelihoodWriter,
  held: Float64Array,
): (series: number) => Likelihoods {
  const cells = grid.logNear.length;
  const isHeld = held.length >= samples.length * cells;
  const logs = new Float64Array(cells);
  const flat = new Float64Array(cells);
  const lay = (series: number): Likelihoods => {
    const at = isHeld ? series * cells : 0;
    const heaviest = likelihoodOf(samples[series]!, flat, logs);
    return { held, at, ...layLikelihoods(grid, logs, heaviest, held, at) };
  };
  if (!isHeld) return lay;
  const laid = samples.map((_, series) => lay(series));
  return (series) => laid[series]!;
}

/** Whole rows of a mean, so that the cells between the first and the last that count are known by two numbers. */
function layLikelihoods(
  { means, logSpreads: { length: spreads } }: HeadroomGrid,
  logs: Float64Array,
  heaviest: number,
  held: Float64Array,
  at: number,
): { readonly from: number; readonly to: number } {
  let from = -1;
  let to = 0;
  for (let m = 0; m < means.length; m += 1) {
    const [start, end] = [m * spreads, (m + 1) * spreads];
    let counts = false;
    for (let cell = start; cell < end; cell += 1) {
      const weight = weightOf(logs[cell]! - heaviest);
      held[at + cell] = weight;
      if (weight > 0) counts = true;
    }
    if (!counts) continue;
    if (from < 0) from = start;
    to = end;
  }
  return { from, to };
}

/**
 * The weight of an exponent, nought where it is too light to count beside a heaviest of one: so nothing is multiplied
 * with traces.
 *
 * @example weightOf(-91) // => 0
 */
export const weightOf = (exponent: number): number => (exponent < -2 * NEGLIGIBLE ? 0 : Math.exp(exponent));

type LikelihoodWriter = (sample: HeadroomSample, base: Float64Array, into: Float64Array) => number;

/**
 * Writes the tempered log likelihood of every cell, added to what stands in `base`, and gives the largest.
 *
 * @example likelihoodWriter({ means: [0.1], logSpreads: [-2], passing: [0.05], failing: [0.1], logNear: [-1.9] })({ passing: 0, failing: 0, outside: 1, sumOutside: 0.1, sumOfSquaresOutside: 0.01, median: 0.1, robustSpread: 0.1 }, [0], [0]) // => 1
 */
export function likelihoodWriter({ means, logSpreads, logNear }: HeadroomGrid): LikelihoodWriter {
  const spreads = logSpreads.length;
  const halfPrecisions = logSpreads.map((logSpread) => Math.exp(-2 * logSpread) / 2);
  return ({ passing, failing, outside: count, sumOutside, sumOfSquaresOutside }, base, into) => {
    const near = TEMPERING * (passing + failing);
    let heaviest = -Infinity;
    for (let m = 0, cell = 0; m < means.length; m += 1) {
      const mean = means[m]!;
      const squares = sumOfSquaresOutside - 2 * mean * sumOutside + count * mean * mean;
      for (let s = 0; s < spreads; s += 1, cell += 1) {
        const outside = count * logSpreads[s]! + squares * halfPrecisions[s]!;
        const exponent = base[cell]! + near * logNear[cell]! - TEMPERING * outside;
        into[cell] = exponent;
        if (exponent > heaviest) heaviest = exponent;
      }
    }
    return heaviest;
  };
}
