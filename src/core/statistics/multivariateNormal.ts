import { integral } from './integral.ts';
import { normalCdf } from './normalDistribution.ts';

/**
 * Probability that one, two or three normal variables of mean 0 all lie below their limits.
 *
 * Two by Plackett's identity (1954, Biometrika 41), which moves the correlation from nought to its value; three the
 * same way from one variable that is independent of the two others (Genz 2004, Statistics and Computing 14:251-260).
 * The integrals are smooth in the arc sine of the correlation and are taken to about 1e-10; no random numbers. No package of the
 * registry has it. Variances must be positive and the matrix that of a covariance; throws RangeError otherwise and
 * for more than three.
 *
 * @example multivariateNormalCdf([0, 0], [[1, 0.5], [0.5, 1]]) // => 0.3333333333333333
 */
export function multivariateNormalCdf(
  limits: readonly number[],
  covariance: readonly (readonly number[])[],
): number {
  const count = limits.length;
  const deviations = limits.map((_, k) => Math.sqrt(covariance[k]?.[k] ?? Number.NaN));
  const isMatrix = covariance.length === count && covariance.every((row) => row.length === count);
  if (count < 1 || count > 3 || !isMatrix || deviations.some((deviation) => !(deviation > 0)))
    throw new RangeError('multivariateNormalCdf needs one to three limits and their covariance');
  const z = limits.map((limit, k) => limit / deviations[k]!);
  const correlation = (a: number, b: number): number => {
    const value = covariance[a]![b]! / (deviations[a]! * deviations[b]!);
    if (!(Math.abs(value) <= 1 + 1e-12) || covariance[a]![b] !== covariance[b]![a])
      throw new RangeError('multivariateNormalCdf needs a symmetric matrix with correlations from -1 to 1');
    return Math.min(1, Math.max(-1, value));
  };
  if (count === 1) return normalCdf(z[0]!);
  if (count === 2) return bivariate(z[0]!, z[1]!, correlation(0, 1));
  return trivariate([z[0]!, z[1]!, z[2]!], [correlation(0, 1), correlation(0, 2), correlation(1, 2)]);
}

function bivariate(a: number, b: number, correlation: number): number {
  const grown = overCorrelations((angle) => bivariateSlope(a, b, angle), correlation);
  return within01(normalCdf(a) * normalCdf(b) + grown);
}

const HALVINGS = 24;

/**
 * Integral over the arc sine of a correlation from nought. Where limits are all but equal and the matrix all but
 * singular the slope turns within a hair of its end: stretches become ever shorter towards it.
 */
function overCorrelations(slope: (angle: number) => number, correlation: number): number {
  const end = Math.asin(correlation);
  const edge = (k: number): number => end * (1 - 2 ** -k);
  let sum = integral(slope, edge(HALVINGS), end);
  for (let k = 0; k < HALVINGS; k += 1) sum += integral(slope, edge(k), edge(k + 1));
  return sum;
}

/** How the probability grows with the arc sine of the correlation: the density times the cosine. */
function bivariateSlope(a: number, b: number, angle: number): number {
  const sine = Math.sin(angle);
  const cosineSquared = Math.cos(angle) ** 2;
  // a² + b² - 2ab sine, without losing the difference of near-equal limits at near-full correlation.
  const squares = sine < 0 ? (a + b) ** 2 - 2 * a * b * (1 + sine) : (a - b) ** 2 + 2 * a * b * (1 - sine);
  if (cosineSquared <= 0) return squares > 0 ? 0 : 1 / (2 * Math.PI);
  return Math.exp(-squares / (2 * cosineSquared)) / (2 * Math.PI);
}

function trivariate(
  [a, b, c]: readonly [number, number, number],
  [ab, ac, bc]: readonly [number, number, number],
): number {
  if (1 + 2 * ab * ac * bc - ab * ab - ac * ac - bc * bc < -1e-12)
    throw new RangeError('multivariateNormalCdf needs a matrix that is a covariance');
  const apart = normalCdf(a) * bivariate(b, c, bc);
  return within01(apart + grown(a, b, c, ab, ac, bc) + grown(a, c, b, ac, ab, bc));
}

/** A variance below this is nought but for rounding: the third variable follows from the two others. */
const ROUNDING = 1e-13;

const step = (distance: number): number => (distance > 0 ? 1 : distance < 0 ? 0 : 0.5);

/** What the correlation of the first two adds, while that of the first and the third grows alongside from nought. */
function grown(
  first: number,
  second: number,
  third: number,
  correlation: number,
  firstThird: number,
  secondThird: number,
): number {
  if (correlation === 0) return 0;
  const slope = (angle: number): number => {
    const r = Math.sin(angle);
    const s = (firstThird * r) / correlation;
    // The third given the second, then what the first adds: differences of near-equal products would lose their digits.
    const added = s - secondThird * r;
    const cosineSquared = Math.cos(angle) ** 2;
    const mean = secondThird * second + (added * (first - r * second)) / cosineSquared;
    const variance = 1 - secondThird ** 2 - added ** 2 / cosineSquared;
    const below = variance > ROUNDING ? normalCdf((third - mean) / Math.sqrt(variance)) : step(third - mean);
    return bivariateSlope(first, second, angle) * below;
  };
  return overCorrelations(slope, correlation);
}

const within01 = (probability: number): number => Math.min(1, Math.max(0, probability));
