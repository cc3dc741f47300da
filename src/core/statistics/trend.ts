import { err, ok, type Result } from '../result.ts';
import { normalCdf } from './normalDistribution.ts';
import type { StatisticsError } from './statisticsError.ts';

/** One group of a trend: how many of it, and how many of those are a yes. */
export interface TrendGroup {
  readonly n: number;
  readonly yes: number;
  readonly score: number;
}

export interface Trend {
  /** Positive where the share rises with the score. */
  readonly statistic: number;
  /** One-sided: that the share rises. */
  readonly pValue: number;
  readonly n: number;
  readonly method: 'Cochran-Armitage';
}

/**
 * Whether a share rises with an ordered group (Cochran 1954, Biometrics 10; Armitage 1955, Biometrics 11). Its square
 * is the statistic of R's prop.trend.test.
 *
 * `no-spread` where all are a yes, none is, or all have one score.
 *
 * @example risingTrend([{ n: 10, yes: 2, score: 0 }, { n: 10, yes: 8, score: 1 }]).value.statistic // => 2.6832815729997…
 */
export function risingTrend(groups: readonly TrendGroup[]): Result<Trend, StatisticsError> {
  const sum = (of: (group: TrendGroup) => number): number =>
    groups.reduce((total, group) => total + of(group), 0);
  const n = sum((group) => group.n);
  const share = n === 0 ? 0 : sum(({ yes }) => yes) / n;
  const scores = sum((group) => group.n * group.score);
  const spread = sum((group) => group.n * group.score ** 2) - (n === 0 ? 0 : scores ** 2 / n);
  const variance = share * (1 - share) * spread;
  if (!(variance > 0)) return err({ kind: 'no-spread' });
  const statistic = sum((group) => group.score * (group.yes - group.n * share)) / Math.sqrt(variance);
  return ok({ statistic, pValue: normalCdf(-statistic), n, method: 'Cochran-Armitage' });
}
