import { linearPercentile, rankCounts } from '../statistics/percentile.ts';
import { groupedBy } from '../patterns/groupedBy.ts';
import type { RatioChange } from './peerDraws.ts';

/** A ratio at one quarter end; `hasEarnings` is false where EBITDA is zero or below and the ratio has no meaning. */
export interface RatioPoint {
  readonly ratio: number;
  readonly hasEarnings: boolean;
}

/** One borrower's ratio quarter by quarter, oldest first, all borrowers ending with the same quarter. */
export interface RatioHistory {
  readonly borrowerId: number;
  readonly sector: string;
  /** By which it is put into a third of its sector; null where it has none that means anything. */
  readonly leverage: number | null;
  readonly points: readonly (RatioPoint | null)[];
}

/** The changes of one peer group. */
export interface PeerCell {
  /** Ascending, without the outer hundredths. */
  readonly changes: Float64Array;
  readonly earningsGone: number;
  /** Members with any change. */
  readonly borrowers: number;
}

export interface PeerChanges {
  readonly horizonQuarters: number;
  readonly cells: ReadonlyMap<string, PeerCell>;
  readonly book: PeerCell;
  readonly cellOf: ReadonlyMap<number, string>;
  /** What each borrower brought, so that nobody is compared with itself. */
  readonly own: ReadonlyMap<number, readonly RatioChange[]>;
}

/** Changes that end in these last quarters count. */
export const QUARTERS_OF_CHANGES = 8;
export const TRUNCATED_SHARE = 0.01;

/**
 * How the ratios of the book changed over a horizon, by sector and by third of leverage within it.
 *
 * A change over h quarters is taken over h quarters, never compounded from single ones: twelve-month figures overlap.
 * Within a group the outer hundredths are left out, as in the published procedure; changes to no earnings stay.
 * Source: methods.md Part C 2.2 c.
 *
 * @example peerChanges([], 1).book.earningsGone // => 0
 */
export function peerChanges(histories: readonly RatioHistory[], horizonQuarters: number): PeerChanges {
  const cellOf = thirdsOfLeverage(histories);
  const own = new Map(
    histories.map((history) => [history.borrowerId, changesOf(history.points, horizonQuarters)]),
  );
  const cellWith = (members: readonly RatioHistory[]): PeerCell =>
    peerCell(members.map(({ borrowerId }) => own.get(borrowerId)!));
  const placed = histories.filter(({ borrowerId }) => cellOf.has(borrowerId));
  const byCell = groupedBy(placed, ({ borrowerId }) => cellOf.get(borrowerId)!);
  return {
    horizonQuarters,
    cells: new Map([...byCell].map(([cell, members]) => [cell, cellWith(members)])),
    book: cellWith(histories),
    cellOf,
    own,
  };
}

function thirdsOfLeverage(histories: readonly RatioHistory[]): ReadonlyMap<number, string> {
  const cellOf = new Map<number, string>();
  for (const [sector, members] of groupedBy(histories, (history) => history.sector)) {
    const withLeverage = members.filter(({ leverage }) => leverage !== null);
    if (withLeverage.length === 0) continue;
    const sorted = Float64Array.from(withLeverage, ({ leverage }) => leverage!).sort();
    const [lower, upper] = [linearPercentile(sorted, 1 / 3), linearPercentile(sorted, 2 / 3)];
    const thirds = [1, 2, 3].map((third) => `${sector}, third ${third}`);
    for (const { borrowerId, leverage } of withLeverage)
      cellOf.set(borrowerId, thirds[leverage! <= lower ? 0 : leverage! <= upper ? 1 : 2]!);
  }
  return cellOf;
}

function changesOf(points: readonly (RatioPoint | null)[], horizon: number): readonly RatioChange[] {
  const changes: RatioChange[] = [];
  for (let end = Math.max(horizon, points.length - QUARTERS_OF_CHANGES); end < points.length; end += 1) {
    const before = points[end - horizon];
    const after = points[end];
    if (!before || !after || !before.hasEarnings || !(before.ratio > 0)) continue;
    changes.push(after.hasEarnings ? after.ratio / before.ratio : 'earnings gone');
  }
  return changes;
}

function peerCell(members: readonly (readonly RatioChange[])[]): PeerCell {
  const all = new Float64Array(members.reduce((count, changes) => count + changes.length, 0));
  let known = 0;
  for (const changes of members)
    for (const change of changes)
      if (change !== 'earnings gone') {
        all[known] = change;
        known += 1;
      }
  const sorted = all.subarray(0, known).sort();
  return {
    changes: withoutOuterHundredths(sorted),
    earningsGone: all.length - known,
    borrowers: members.filter((changes) => changes.length > 0).length,
  };
}

function withoutOuterHundredths(sorted: Float64Array): Float64Array {
  if (sorted.length === 0) return sorted;
  const low = linearPercentile(sorted, TRUNCATED_SHARE);
  const high = linearPercentile(sorted, 1 - TRUNCATED_SHARE);
  const upToHigh = rankCounts(sorted, high);
  return sorted.subarray(rankCounts(sorted, low).below, upToHigh.below + upToHigh.equal);
}

/**
 * What a borrower brought to a group's changes, the outer hundredths left out as they are there.
 *
 * @example ownChanges({ changes: new Float64Array([0.5, 1]), earningsGone: 0, borrowers: 1 }, [1, 2, 'earnings gone']) // => [1, 'earnings gone']
 */
export const ownChanges = (
  { changes }: PeerCell,
  own: readonly RatioChange[] | undefined,
): readonly RatioChange[] =>
  (own ?? []).filter(
    (change) => change === 'earnings gone' || (change >= changes[0]! && change <= changes.at(-1)!),
  );
