const ROOT_TWO_PI = Math.sqrt(2 * Math.PI);

/**
 * Density of the standard normal distribution.
 *
 * @example normalDensity(0) // => 0.3989…
 */
export const normalDensity = (z: number): number => Math.exp((-z * z) / 2) / ROOT_TWO_PI;

/**
 * Standard normal distribution function.
 *
 * Near the middle by the series of Marsaglia (2004, Journal of Statistical Software 11(4)), which adds positive
 * terms only; in the tails by Laplace's continued fraction, so that small probabilities keep their digits.
 *
 * @example normalCdf(0) // => 0.5
 */
export function normalCdf(z: number): number {
  if (Number.isNaN(z)) return Number.NaN;
  if (z > 3) return 1 - lowerTail(z);
  if (z < -3) return lowerTail(-z);
  let term = z;
  let sum = z;
  for (let k = 3; Math.abs(term) > 1e-18; k += 2) {
    term *= (z * z) / k;
    sum += term;
  }
  return 0.5 + sum * normalDensity(z);
}

/** Probability beyond a distance of more than 3, by the continued fraction taken from its far end. */
function lowerTail(distance: number): number {
  if (distance > 39) return 0;
  let fraction = distance;
  for (let k = 120; k >= 1; k -= 1) fraction = distance + k / fraction;
  return normalDensity(distance) / fraction;
}
