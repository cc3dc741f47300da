import quantile from '@stdlib/stats-base-dists-normal-quantile';
import { normalCdf, normalDensity } from './normalDistribution.ts';

const STEPS = 4;

/**
 * The value below which a standard normal variable lies with a probability; infinite at 0 and 1.
 *
 * The package's value loses digits in the lower tail, and all of them below 1e-16: Newton's steps on the log of the
 * tail give them back.
 *
 * @example normalQuantile(0.5) // => 0
 */
export function normalQuantile(probability: number): number {
  if (probability > 0.5) return -normalQuantile(1 - probability);
  if (probability === 0) return -Infinity;
  const first = quantile(probability, 0, 1);
  let z = Number.isFinite(first) ? first : -Math.sqrt(-2 * Math.log(probability));
  for (let step = 0; step < STEPS; step += 1) {
    const below = normalCdf(z);
    z -= (Math.log(below / probability) * below) / normalDensity(z);
  }
  return z;
}
