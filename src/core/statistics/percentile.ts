/**
 * The value below which a share of the sample lies, by straight lines between order statistics: position
 * (n - 1) x share. This is type 7 of Hyndman & Fan (1996), the default of R and numpy.
 *
 * `sorted` ascends and is not empty; `share` runs from 0 to 1. Throws RangeError for an empty sample.
 *
 * @example linearPercentile([1, 2, 3, 4], 0.5) // => 2.5
 */
export function linearPercentile(sorted: ArrayLike<number>, share: number): number {
  if (sorted.length === 0) throw new RangeError('linearPercentile needs at least one point');
  const position = (sorted.length - 1) * share;
  const below = Math.floor(position);
  const low = sorted[below]!;
  const high = sorted[Math.min(below + 1, sorted.length - 1)]!;
  return low + (position - below) * (high - low);
}

/** How many of the ascending sample lie below a value and how many equal it. Takes log2(n) steps. */
export interface RankCounts {
  readonly below: number;
  readonly equal: number;
  readonly n: number;
}

/**
 * The counts of a value in an ascending sample.
 *
 * @example rankCounts([1, 2, 2, 3], 2) // => { below: 1, equal: 2, n: 4 }
 */
export function rankCounts(sorted: ArrayLike<number>, value: number): RankCounts {
  const below = firstIndex(sorted, (member) => member >= value);
  const upTo = firstIndex(sorted, (member) => member > value);
  return { below, equal: upTo - below, n: sorted.length };
}

/**
 * The same counts with one member left out: a borrower is not compared with itself.
 *
 * @example withoutMember({ below: 1, equal: 2, n: 4 }, 2, 2) // => { below: 1, equal: 1, n: 3 }
 */
export function withoutMember(counts: RankCounts, value: number, member: number): RankCounts {
  return {
    below: counts.below - (member < value ? 1 : 0),
    equal: counts.equal - (member === value ? 1 : 0),
    n: counts.n - 1,
  };
}

/**
 * Mid-rank percentile, 0 to 1: the share below plus half the share that is equal. Null where there is nobody to
 * compare with.
 *
 * @example midRank({ below: 2, equal: 1, n: 5 }) // => 0.5
 */
export const midRank = ({ below, equal, n }: RankCounts): number | null =>
  n === 0 ? null : (below + equal / 2) / n;

/** The members around the middle of an ascending sample: enough for its median with or without any one member. */
export interface Middle {
  readonly n: number;
  /** Place in the sample of the first of `values`. */
  readonly from: number;
  readonly values: readonly number[];
}

/**
 * The middle of an ascending sample, with the members on either side.
 *
 * @example middleOf([1, 2, 3, 4, 5]) // => { n: 5, from: 1, values: [2, 3, 4] }
 */
export function middleOf(sorted: readonly number[]): Middle {
  const n = sorted.length;
  const from = Math.max(0, Math.floor((n - 2) / 2));
  return { n, from, values: sorted.slice(from, Math.floor((n - 1) / 2) + 2) };
}

/**
 * Median of a sample, or of what is left of it without the member at `leftOut`; null where nothing is left.
 *
 * @example medianOf(middleOf([1, 2, 3, 4, 5]), 0) // => 3.5
 */
export function medianOf({ n, from, values }: Middle, leftOut: number | null): number | null {
  const left = leftOut === null ? n : n - 1;
  if (left <= 0) return null;
  const at = (place: number): number =>
    values[(leftOut !== null && place >= leftOut ? place + 1 : place) - from]!;
  return (at(Math.floor((left - 1) / 2)) + at(Math.floor(left / 2))) / 2;
}

function firstIndex(sorted: ArrayLike<number>, isReached: (member: number) => boolean): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (isReached(sorted[middle]!)) high = middle;
    else low = middle + 1;
  }
  return low;
}
