/** Every topic of the pattern vectors, read into the core's own functions. */
import { z } from 'zod';
import { nearProbabilities } from '#core/patterns/headroomGrid.ts';
import { LIFTED_SHARES, nearLineEvidence } from '#core/patterns/nearLineEvidence.ts';
import { posterior } from '#core/patterns/nearLineRanking.ts';
import { chanceByReversion, chanceOfAnyNotMet } from '#core/outlook/reversion.ts';
import { peerDraws } from '#core/outlook/peerDraws.ts';
import { adjustedPValues, nullShare, type Adjustment } from '#core/statistics/adjustedPValues.ts';
import { signTestOf } from '#core/statistics/approximateSignTest.ts';
import { exactBinomial } from '#core/statistics/binomialDistribution.ts';
import { fisherCombination, stoufferCombination } from '#core/statistics/combinedPValues.ts';
import { densityBreak } from '#core/statistics/densityBreak.ts';
import { discreteCutoff } from '#core/statistics/discreteCutoff.ts';
import { benfordShares, digitTest } from '#core/statistics/leadingDigits.ts';
import { normalQuantile } from '#core/statistics/normalQuantile.ts';
import { poissonBinomial } from '#core/statistics/poissonBinomial.ts';
import { fourBinContrast, standardizedDifference } from '#core/statistics/standardizedDifference.ts';
import { valueOf, type Topic } from './topic.ts';

const numbers = z.array(z.number());

const sides: Topic = (inputs) => {
  const given = z
    .strictObject({ n_prev: z.number(), n: z.number(), n_next: z.number(), N: z.number() })
    .parse(inputs);
  const found = standardizedDifference({
    previous: given.n_prev,
    at: given.n,
    next: given.n_next,
    n: given.N,
  });
  return { expected: found.expected, z_bd: found.zIndependent, z_multinomial: found.zMultinomial };
};

const contrast: Topic = (inputs) => {
  const { counts_LL_L_R_RR: counts, N } = z
    .strictObject({
      counts_LL_L_R_RR: z.tuple([z.number(), z.number(), z.number(), z.number()]),
      N: z.number(),
    })
    .parse(inputs);
  const [farLeft, left, right, farRight] = counts;
  const { difference, variance, z: score } = fourBinContrast({ farLeft, left, right, farRight }, N);
  return { D_RL: difference, var: variance, z: score };
};

const ADJUSTMENT_NAMES: Readonly<Record<string, Adjustment>> = {
  bonferroni: 'bonferroni',
  holm: 'holm',
  BH: 'benjamini-hochberg',
  BY: 'benjamini-yekutieli',
};

const adjusted: Topic = (inputs) => {
  const { p, method } = z.strictObject({ p: numbers, method: z.string() }).parse(inputs);
  const adjustment = ADJUSTMENT_NAMES[method];
  if (!adjustment) throw new Error(`no such adjustment: ${method}`);
  return { adjusted: adjustedPValues(p, adjustment), pi0: nullShare(p, 0.5) };
};

const combined: Topic = (inputs) => {
  const { p, method, weights } = z
    .strictObject({ p: numbers, method: z.enum(['fisher', 'stouffer']), weights: numbers.optional() })
    .parse(inputs);
  const { statistic, pValue } = method === 'fisher' ? fisherCombination(p) : stoufferCombination(p, weights);
  return { statistic, p: pValue };
};

const sumOfTrials: Topic = (inputs) => {
  const { p } = z.strictObject({ p: numbers }).parse(inputs);
  const { mean, variance, probabilities } = poissonBinomial(p);
  return { mean, var: variance, pmf: probabilities };
};

const binomial: Topic = (inputs) => {
  const { k, n, p0, alternative } = z
    .strictObject({
      k: z.number(),
      n: z.number(),
      p0: z.number(),
      alternative: z.enum(['greater', 'less', 'two-sided']),
    })
    .parse(inputs);
  return { p: exactBinomial(k, n, p0, alternative).pValue };
};

const RECIPES = ['q200', 'q200-shift'] as const;

const mccrary: Topic = (inputs) => {
  const { recipe, cutoff, bin, bandwidth } = z
    .strictObject({
      recipe: z.enum(RECIPES),
      cutoff: z.number(),
      bin: z.number().optional(),
      bandwidth: z.number().optional(),
    })
    .parse(inputs);
  const found = valueOf(densityBreak(sampleOf(recipe), cutoff, { binWidth: bin, bandwidth }));
  return {
    theta: found.estimate,
    se: found.standardError,
    z: found.statistic,
    p: found.pTwoSided,
    bin: found.binWidth,
    bandwidth: found.bandwidth,
  };
};

function sampleOf(recipe: (typeof RECIPES)[number]): number[] {
  const plain = Array.from({ length: 200 }, (_, i) => normalQuantile((i + 0.5) / 200) + 0.3);
  return recipe === 'q200' ? plain : plain.map((x) => (x > -0.15 && x < 0 ? -x : x));
}

const signTest: Topic = (inputs) => {
  const { q, S_right } = z.strictObject({ q: z.number(), S_right: z.number() }).parse(inputs);
  return { p: signTestOf(S_right, q, q).pTwoSided };
};

const discrete: Topic = (inputs) => {
  const { n_prev, n_at, n_next, k } = z
    .strictObject({ n_prev: z.number(), n_at: z.number(), n_next: z.number(), k: z.number() })
    .parse(inputs);
  const found = discreteCutoff({ previous: n_prev, at: n_at, next: n_next }, k);
  return { p: found.pValue, p_low: found.shareLow, p_high: found.shareHigh };
};

const digitShares: Topic = (inputs) => {
  const { digit } = z.strictObject({ digit: z.enum(['first', 'second']) }).parse(inputs);
  return { p: benfordShares(digit) };
};

const firstDigits: Topic = (inputs) => {
  const { counts } = z.strictObject({ counts: numbers }).parse(inputs);
  const { n, meanDeviation, chiSquared, pValue } = valueOf(digitTest(counts, 'first'));
  return { N: n, mad: meanDeviation?.value ?? null, chi_squared: chiSquared, p: pValue };
};

const jointViolation: Topic = (inputs) => {
  const { slack, covariance } = z
    .strictObject({ slack: numbers, covariance: z.array(numbers) })
    .parse(inputs);
  return { p: chanceOfAnyNotMet(slack, covariance) };
};

const draws: Topic = (inputs) => {
  const given = z
    .strictObject({
      direction: z.enum(['max', 'min']),
      threshold: z.number(),
      ratio: z.number(),
      draws: numbers,
    })
    .parse(inputs);
  const bound = given.direction === 'max' ? 'most' : 'least';
  const { slacks, notMet, share } = peerDraws(
    [{ bound, ratio: given.ratio, level: given.threshold }],
    given.draws.map((change) => [change]),
  );
  return { slack: slacks[0], not_met: notMet, share };
};

const reversion: Topic = (inputs) => {
  const given = z
    .strictObject({
      headroom: z.number(),
      mean: z.number(),
      phi: z.number(),
      sigma_marginal: z.number(),
      step_down: z.number(),
    })
    .parse(inputs);
  const { headroom, mean, phi, sigma_marginal, step_down } = given;
  return {
    p_not_met: chanceByReversion({
      headroom,
      mean,
      persistence: phi,
      deviation: sigma_marginal,
      tightening: step_down,
      quarters: 1,
    }),
  };
};

const nearLine: Topic = (inputs) => {
  const given = z
    .strictObject({
      mean: z.number(),
      sigma: z.number(),
      band: z.tuple([z.literal(0), z.number()]),
      gap: z.tuple([z.number(), z.literal(0)]),
      k_band: z.number(),
      k_gap: z.number(),
      pi_grid: numbers.refine((shares) => String(shares) === String(LIFTED_SHARES), 'the settings in force'),
      prior: z.number(),
    })
    .parse(inputs);
  const chances = nearProbabilities(given.mean, given.sigma, { band: given.band[1], gap: -given.gap[0] });
  const evidence = nearLineEvidence({ passing: given.k_band, failing: given.k_gap }, chances);
  return {
    share: evidence.share,
    expected_in_band: evidence.expectedPassing,
    p_upper: evidence.pAtLeast,
    p_mid: evidence.pMid,
    bayes_factor: evidence.bayesFactor,
    posterior: posterior(given.prior, evidence.bayesFactor),
  };
};

/** By the names of the vector file. */
export const topics: Record<string, Topic> = {
  'adjusted-p-values': adjusted,
  'approximate-sign-test': signTest,
  'ar1-projection': reversion,
  'benford-expected': digitShares,
  'benford-first-digit': firstDigits,
  'combined-p-values': combined,
  'discrete-cutoff': discrete,
  'exact-binomial': binomial,
  'four-bin-contrast': contrast,
  'joint-violation-normal': jointViolation,
  mccrary,
  'near-line-conditional': nearLine,
  'peer-draws': draws,
  'poisson-binomial': sumOfTrials,
  'standardized-difference': sides,
};
