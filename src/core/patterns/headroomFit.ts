import type { HeadroomGrid, HeadroomSample } from './headroomGrid.ts';

/** Normal priors of a peer group over the mean of headroom and over the log of its spread. */
export interface HeadroomPrior {
  readonly mean: number;
  readonly meanSpread: number;
  readonly logSpread: number;
  readonly logSpreadSpread: number;
}

/** How likely a test of one borrower falls on either side within the window, given its other tests and its peers. */
export interface NearChances {
  readonly passing: number;
  readonly failing: number;
}

export interface HeadroomFit {
  readonly chances: readonly NearChances[];
  /** With which the last pass was weighed. */
  readonly prior: HeadroomPrior;
}

/** Likelihoods are taken to this power: LTM ratios share three of four quarters with their neighbour. */
const TEMPERING = 0.5;
const PASSES = 3;
const LEAST = {
  meanSpread: 0.02,
  meanVariance: 1e-4,
  logSpreadSpread: 0.3,
  logSpreadVariance: 0.01,
  spread: 0.01,
};
/** Cells lighter than the heaviest by e^45 add nothing that a double could hold. */
const NEGLIGIBLE = 45;

/**
 * Fits a normal headroom to every series of a peer group by empirical Bayes, with the window around the limit
 * interval-censored: how the tests lie within it says nothing of the fit, since that is what is asked.
 *
 * Posterior weights on the grid from the tempered likelihood and the group's prior; the prior is refitted from the
 * posteriors, three passes, of which the third's weights are kept. Steps: series x 765 x 3, whatever their length.
 * Source: methods.md Part C 5.2. Throws RangeError for an empty group.
 *
 * @example fitHeadrooms({ means: [0.1], logSpreads: [-2], passing: [0.05], failing: [0.1], logNear: [-1.9] }, [{ passing: 1, failing: 0, outside: 2, sumOutside: 0.3, sumOfSquaresOutside: 0.05, median: 0.1, robustSpread: 0.1 }]).chances[0].passing // => 0.05
 */
export function fitHeadrooms(grid: HeadroomGrid, samples: readonly HeadroomSample[]): HeadroomFit {
  if (samples.length === 0) throw new RangeError('fitHeadrooms needs at least one series');
  const weigher = weigherOf(grid);
  let prior = startingPrior(samples);
  for (let pass = 1; ; pass += 1) {
    weigher.take(prior);
    const posteriors = samples.map((sample) => weigher.weigh(sample));
    if (pass === PASSES) return { chances: posteriors, prior };
    prior = refitted(posteriors);
  }
}

function startingPrior(samples: readonly HeadroomSample[]): HeadroomPrior {
  const medians = momentsOf(samples.map(({ median }) => median));
  const spreads = momentsOf(
    samples.map(({ robustSpread }) => Math.log(Math.max(robustSpread, LEAST.spread))),
  );
  return {
    mean: medians.mean,
    meanSpread: Math.max(LEAST.meanSpread, Math.sqrt(medians.variance)),
    logSpread: spreads.mean,
    logSpreadSpread: Math.max(LEAST.logSpreadSpread, 0.7 * Math.sqrt(spreads.variance)),
  };
}

interface Posterior extends NearChances {
  readonly mean: number;
  readonly meanVariance: number;
  readonly logSpread: number;
  readonly logSpreadVariance: number;
}

function refitted(posteriors: readonly Posterior[]): HeadroomPrior {
  const means = momentsOf(posteriors.map(({ mean }) => mean));
  const spreads = momentsOf(posteriors.map(({ logSpread }) => logSpread));
  const within = momentsOf(posteriors.map(({ meanVariance }) => meanVariance)).mean;
  const withinSpreads = momentsOf(posteriors.map(({ logSpreadVariance }) => logSpreadVariance)).mean;
  return {
    mean: means.mean,
    meanSpread: Math.sqrt(Math.max(LEAST.meanVariance, means.variance + within)),
    logSpread: spreads.mean,
    logSpreadSpread: Math.sqrt(Math.max(LEAST.logSpreadVariance, spreads.variance + withinSpreads)),
  };
}

/** Mean and population variance. */
function momentsOf(values: readonly number[]): { readonly mean: number; readonly variance: number } {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return { mean, variance: values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length };
}

/** Weighs the cells for one series after another, in one piece of memory. */
function weigherOf({ means, logSpreads, passing, failing, logNear }: HeadroomGrid): {
  take: (prior: HeadroomPrior) => void;
  weigh: (sample: HeadroomSample) => Posterior;
} {
  const spreads = logSpreads.length;
  const halfPrecisions = logSpreads.map((logSpread) => Math.exp(-2 * logSpread) / 2);
  const priors = new Float64Array(logNear.length);
  const exponents = new Float64Array(logNear.length);
  const heaviestOfMean = new Float64Array(means.length);

  const take = (prior: HeadroomPrior): void => {
    for (let m = 0; m < means.length; m += 1)
      for (let s = 0; s < spreads; s += 1)
        priors[m * spreads + s] =
          -(((means[m]! - prior.mean) / prior.meanSpread) ** 2) / 2 -
          ((logSpreads[s]! - prior.logSpread) / prior.logSpreadSpread) ** 2 / 2;
  };

  const heaviestOf = (sample: HeadroomSample): number => {
    const { outside: count, sumOutside, sumOfSquaresOutside } = sample;
    const near = TEMPERING * (sample.passing + sample.failing);
    let heaviest = -Infinity;
    for (let m = 0, cell = 0; m < means.length; m += 1) {
      const mean = means[m]!;
      const squares = sumOfSquaresOutside - 2 * mean * sumOutside + count * mean * mean;
      let heaviestHere = -Infinity;
      for (let s = 0; s < spreads; s += 1, cell += 1) {
        const outside = count * logSpreads[s]! + squares * halfPrecisions[s]!;
        const exponent = priors[cell]! + near * logNear[cell]! - TEMPERING * outside;
        exponents[cell] = exponent;
        if (exponent > heaviestHere) heaviestHere = exponent;
      }
      heaviestOfMean[m] = heaviestHere;
      if (heaviestHere > heaviest) heaviest = heaviestHere;
    }
    return heaviest;
  };

  // Sums in variables of their own: most of the time of a whole book is spent here.
  const weigh = (sample: HeadroomSample): Posterior => {
    const heaviest = heaviestOf(sample);
    let sumOfWeights = 0;
    let sumPassing = 0;
    let sumFailing = 0;
    let sumMean = 0;
    let sumMeanSquare = 0;
    let sumLogSpread = 0;
    let sumLogSpreadSquare = 0;
    for (let m = 0; m < means.length; m += 1) {
      if (heaviestOfMean[m]! - heaviest < -NEGLIGIBLE) continue;
      const mean = means[m]!;
      for (let s = 0, cell = m * spreads; s < spreads; s += 1, cell += 1) {
        const exponent = exponents[cell]! - heaviest;
        if (exponent < -NEGLIGIBLE) continue;
        const weight = Math.exp(exponent);
        const logSpread = logSpreads[s]!;
        const weightedMean = weight * mean;
        const weightedLogSpread = weight * logSpread;
        sumOfWeights += weight;
        sumPassing += weight * passing[cell]!;
        sumFailing += weight * failing[cell]!;
        sumMean += weightedMean;
        sumMeanSquare += weightedMean * mean;
        sumLogSpread += weightedLogSpread;
        sumLogSpreadSquare += weightedLogSpread * logSpread;
      }
    }
    const mean = sumMean / sumOfWeights;
    const logSpread = sumLogSpread / sumOfWeights;
    return {
      passing: sumPassing / sumOfWeights,
      failing: sumFailing / sumOfWeights,
      mean,
      meanVariance: sumMeanSquare / sumOfWeights - mean * mean,
      logSpread,
      logSpreadVariance: sumLogSpreadSquare / sumOfWeights - logSpread * logSpread,
    };
  };

  return { take, weigh };
}
