import { err, ok, type Result } from '../result.ts';
import type { StatisticsError } from './statisticsError.ts';

export interface RankAuc {
  /** Chance that a positive ranks above a negative, ties counting half. */
  readonly estimate: number;
  readonly positives: number;
  readonly negatives: number;
  readonly method: 'Mann-Whitney, mid-ranks';
}

/**
 * Area under the receiver operating curve from ranks (Mann & Whitney 1947; Hanley & McNeil 1982).
 *
 * Needs at least one positive and one negative, else `too-few-points`.
 *
 * @example rankAuc([1, 2, 3], [false, true, true]).value.estimate // => 1
 */
export function rankAuc(
  scores: readonly number[],
  isPositive: readonly boolean[],
): Result<RankAuc, StatisticsError> {
  if (scores.length !== isPositive.length) throw new RangeError('rankAuc needs one label per score');
  const positives = isPositive.filter(Boolean).length;
  const negatives = scores.length - positives;
  if (positives === 0 || negatives === 0) {
    return err({ kind: 'too-few-points', needed: 1, given: 0 });
  }
  const ranks = midRanks(scores);
  const rankSum = ranks.reduce((sum, rank, k) => sum + (isPositive[k] ? rank : 0), 0);
  return ok({
    estimate: (rankSum - (positives * (positives + 1)) / 2) / (positives * negatives),
    positives,
    negatives,
    method: 'Mann-Whitney, mid-ranks',
  });
}

/**
 * Ranks from 1, ties sharing their mean rank.
 *
 * @example midRanks([5, 7, 7]) // => [1, 2.5, 2.5]
 */
export function midRanks(values: readonly number[]): number[] {
  const order = values.map((_, k) => k).sort((a, b) => values[a]! - values[b]!);
  const ranks = new Array<number>(values.length).fill(0);
  for (let from = 0; from < order.length;) {
    let to = from + 1;
    while (to < order.length && values[order[to]!] === values[order[from]!]) to += 1;
    for (let k = from; k < to; k += 1) ranks[order[k]!] = (from + 1 + to) / 2;
    from = to;
  }
  return ranks;
}
