/** Where the headrooms of a peer group lie, with the window around the limit left out of the question. */
import type { HeadroomGrid, HeadroomSample } from './headroomGrid.ts';
import {
  likelihoodsOfGroup,
  likelihoodWriter,
  NEGLIGIBLE,
  roomFor,
  weightOf,
} from './headroomLikelihoods.ts';

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

const PASSES = 3;
const LEAST = {
  meanSpread: 0.02,
  meanVariance: 1e-4,
  logSpreadSpread: 0.3,
  logSpreadVariance: 0.01,
  spread: 0.01,
};
/** Above this sum of weights the likelihoods left out, lighter than their heaviest by e^90, are negligible. */
const LEAST_SUM = Math.exp(-NEGLIGIBLE);

/**
 * Fits a normal headroom to every series of a peer group by empirical Bayes, with the window around the limit
 * interval-censored: how the tests lie within it says nothing of the fit, since that is what is asked.
 *
 * Posterior weights on the grid from the tempered likelihood and the group's prior; the prior is refitted from the
 * posteriors, three passes, of which the third's weights are kept. Steps: series x 765 x 3, whatever their length.
 * `room` is memory to work in, overwritten: one for many groups.
 * Source: methods.md Part C 5.2. Throws RangeError for an empty group.
 *
 * @example fitHeadrooms({ means: [0.1], logSpreads: [-2], passing: [0.05], failing: [0.1], logNear: [-1.9] }, [{ passing: 1, failing: 0, outside: 2, sumOutside: 0.3, sumOfSquaresOutside: 0.05, median: 0.1, robustSpread: 0.1 }]).chances[0].passing // => 0.05
 */
export function fitHeadrooms(
  grid: HeadroomGrid,
  samples: readonly HeadroomSample[],
  room: Float64Array = roomFor(grid, samples.length),
): HeadroomFit {
  if (samples.length === 0) throw new RangeError('fitHeadrooms needs at least one series');
  const weigher = weigherOf(grid, samples, room);
  let prior = startingPrior(samples);
  for (let pass = 1; pass < PASSES; pass += 1) {
    weigher.take(prior);
    prior = refitted(samples.map((_, k) => weigher.moments(k)));
  }
  weigher.take(prior);
  return { chances: samples.map((_, k) => weigher.chances(k)), prior };
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

interface Posterior {
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

interface Weigher {
  /** Weighs with this prior from now on. */
  readonly take: (prior: HeadroomPrior) => void;
  readonly moments: (series: number) => Posterior;
  readonly chances: (series: number) => NearChances;
}

/**
 * Weighs the cells for one series after another, where most of the time of a whole book is spent: a weight is the
 * likelihood of the series, taken once, times the prior of the pass, taken once for all series.
 */
function weigherOf(grid: HeadroomGrid, samples: readonly HeadroomSample[], room: Float64Array): Weigher {
  const { means, logSpreads, passing, failing } = grid;
  const spreads = logSpreads.length;
  const cells = means.length * spreads;
  const logPriors = new Float64Array(cells);
  const priors = new Float64Array(cells);
  const weights = new Float64Array(cells);
  const likelihoodOf = likelihoodWriter(grid);
  const likelihoodsOf = likelihoodsOfGroup(grid, samples, likelihoodOf, room);

  const take = (prior: HeadroomPrior): void => {
    let heaviest = -Infinity;
    for (let m = 0, cell = 0; m < means.length; m += 1)
      for (let s = 0; s < spreads; s += 1, cell += 1) {
        const logPrior =
          -(((means[m]! - prior.mean) / prior.meanSpread) ** 2) / 2 -
          ((logSpreads[s]! - prior.logSpread) / prior.logSpreadSpread) ** 2 / 2;
        logPriors[cell] = logPrior;
        if (logPrior > heaviest) heaviest = logPrior;
      }
    for (let cell = 0; cell < cells; cell += 1) priors[cell] = weightOf(logPriors[cell]! - heaviest);
  };

  /** Fills `weights` between two cells and gives these and the sum; elsewhere they are negligible. */
  const weigh = (series: number): Weighed => {
    const { held, at, from, to } = likelihoodsOf(series);
    let sum = 0;
    for (let cell = from; cell < to; cell += 1) {
      const weight = held[at + cell]! * priors[cell]!;
      weights[cell] = weight;
      sum += weight;
    }
    return sum > LEAST_SUM ? { from, to, sum } : weighInLogs(samples[series]!);
  };

  // Where the prior lies so far from the likelihood that their product would lose its digits.
  const weighInLogs = (sample: HeadroomSample): Weighed => {
    const heaviest = likelihoodOf(sample, logPriors, weights);
    let sum = 0;
    for (let cell = 0; cell < cells; cell += 1) {
      const weight = Math.exp(weights[cell]! - heaviest);
      weights[cell] = weight;
      sum += weight;
    }
    return { from: 0, to: cells, sum };
  };

  const moments = (series: number): Posterior => {
    const { from, to, sum } = weigh(series);
    let sumMean = 0;
    let sumMeanSquare = 0;
    let sumLogSpread = 0;
    let sumLogSpreadSquare = 0;
    for (let m = Math.trunc(from / spreads), cell = from; cell < to; m += 1) {
      let ofMean = 0;
      for (let s = 0; s < spreads; s += 1, cell += 1) {
        const weight = weights[cell]!;
        const weightedLogSpread = weight * logSpreads[s]!;
        ofMean += weight;
        sumLogSpread += weightedLogSpread;
        sumLogSpreadSquare += weightedLogSpread * logSpreads[s]!;
      }
      sumMean += ofMean * means[m]!;
      sumMeanSquare += ofMean * means[m]! * means[m]!;
    }
    const mean = sumMean / sum;
    const logSpread = sumLogSpread / sum;
    return {
      mean,
      meanVariance: sumMeanSquare / sum - mean * mean,
      logSpread,
      logSpreadVariance: sumLogSpreadSquare / sum - logSpread * logSpread,
    };
  };

  const chances = (series: number): NearChances => {
    const { from, to, sum } = weigh(series);
    let sumPassing = 0;
    let sumFailing = 0;
    for (let cell = from; cell < to; cell += 1) {
      sumPassing += weights[cell]! * passing[cell]!;
      sumFailing += weights[cell]! * failing[cell]!;
    }
    return { passing: sumPassing / sum, failing: sumFailing / sum };
  };

  return { take, moments, chances };
}

interface Weighed {
  readonly from: number;
  readonly to: number;
  readonly sum: number;
}
