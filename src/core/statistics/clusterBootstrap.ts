import { err, ok, type Result } from '../result.ts';
import { linearPercentile } from './percentile.ts';
import { seededRandom } from './seededRandom.ts';
import type { StatisticsError } from './statisticsError.ts';

export interface BootstrapInterval {
  readonly estimate: number;
  readonly standardError: number;
  /** Percentiles 2.5 and 97.5 of the draws. */
  readonly low: number;
  readonly high: number;
  /** Clusters, not rows: rows of one cluster are drawn together. */
  readonly n: number;
  readonly draws: number;
  readonly seed: number;
  readonly method: 'bootstrap by cluster, percentile interval';
}

/**
 * Standard error and 95 % interval of a statistic whose rows hang together within clusters: whole clusters are drawn
 * with replacement (Davison & Hinkley 1997, Bootstrap Methods and their Application, section 3.8; from memory).
 *
 * `too-few-points` below two clusters.
 *
 * @example clusterBootstrap([1, 2, 3], (drawn) => drawn.length, { draws: 20, seed: 7 }).value.standardError // => 0
 */
export function clusterBootstrap<Cluster>(
  clusters: readonly Cluster[],
  statistic: (drawn: readonly Cluster[]) => number,
  { draws, seed }: { readonly draws: number; readonly seed: number },
): Result<BootstrapInterval, StatisticsError> {
  const n = clusters.length;
  if (n < 2) return err({ kind: 'too-few-points', needed: 2, given: n });
  const random = seededRandom(seed);
  // One array for all draws: the statistic reads it and keeps nothing.
  const drawn = [...clusters];
  const values = Float64Array.from({ length: draws }, () => {
    for (let place = 0; place < n; place += 1) drawn[place] = clusters[random.below(n)]!;
    return statistic(drawn);
  }).sort();
  const mean = values.reduce((sum, value) => sum + value, 0) / draws;
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return ok({
    estimate: statistic(clusters),
    standardError: Math.sqrt(squares / (draws - 1)),
    low: linearPercentile(values, 0.025),
    high: linearPercentile(values, 0.975),
    n,
    draws,
    seed,
    method: 'bootstrap by cluster, percentile interval',
  });
}
