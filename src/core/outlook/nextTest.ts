import type { Bound } from '../covenants/headroom.ts';
import { err, ok, type Result } from '../result.ts';
import { rankCounts } from '../statistics/percentile.ts';
import { ownChanges, type PeerCell, type PeerChanges } from './peerChanges.ts';
import { isNotMetAfter, slackOf, type RatioChange } from './peerDraws.ts';
import { WORD_LINES } from './projectionWord.ts';

export interface NextTest {
  /** In how many of the peers' changes the test would not be met. */
  readonly notMet: number;
  readonly share: number;
  /** The peers' changes over the same horizon. */
  readonly n: number;
  /** Whose changes they are. */
  readonly borrowers: number;
  readonly peers: 'sector and third of leverage' | 'book';
  readonly horizonQuarters: number;
  readonly method: 'peer draws, each once';
}

export type NextTestError =
  | { readonly kind: 'too few peers'; readonly needed: number; readonly given: number }
  /** Net cash, or earnings of zero or below: no multiple of such a ratio says anything. */
  | { readonly kind: 'ratio without meaning' };

export const FEWEST_PEERS = 30;
/** Fewer would tell of single borrowers. */
export const FEWEST_PEER_BORROWERS = 5;

export interface TestAhead {
  readonly borrowerId: number;
  readonly bound: Bound;
  readonly ratio: number;
  /** The one that will be in force then, scheduled step-downs taken in. */
  readonly level: number;
}

/**
 * How often the coming test would not be met, were the ratio to change as those of its peers did. Peers are the
 * borrower's sector and third of leverage, the whole book where that has fewer than 30 changes or five borrowers; below
 * that in the book there is no figure. Its own changes are left out.
 *
 * Source: methods.md Part C 2.2 c.
 *
 * @example nextTest({ book: { changes: [], earningsGone: 0, borrowers: 0 }, cells: new Map(), cellOf: new Map(), own: new Map() }, { borrowerId: 1, bound: 'most', ratio: 3, level: 3.5 }).error.kind // => 'too few peers'
 */
export function nextTest(peers: PeerChanges, test: TestAhead): Result<NextTest, NextTestError> {
  const slack = slackOf(test);
  if (slack === null || !(test.ratio > 0)) return err({ kind: 'ratio without meaning' });
  const group = groupFor(peers, test.borrowerId);
  if (!isEnough(group)) return err({ kind: 'too few peers', needed: FEWEST_PEERS, given: group.n });
  const notMet = countNotMet(group, test, slack);
  return ok({
    notMet,
    share: notMet / group.n,
    n: group.n,
    borrowers: group.borrowers,
    peers: group.peers,
    horizonQuarters: peers.horizonQuarters,
    method: 'peer draws, each once',
  });
}

/**
 * The ratio (or amount) at which the coming test would no longer be likely not met: the nearest one to the level that
 * gives a share of at most 66 %. Null where no ratio does, or where there are too few peers.
 *
 * @example ratioNotLikely({ book: { changes: [], earningsGone: 0, borrowers: 0 }, cells: new Map(), cellOf: new Map(), own: new Map() }, { borrowerId: 1, bound: 'most', ratio: 3, level: 3.5 }) // => null
 */
export function ratioNotLikely(peers: PeerChanges, test: TestAhead): number | null {
  const group = groupFor(peers, test.borrowerId);
  if (!isEnough(group)) return null;
  const { changes } = group.cell;
  const slackAt = (place: number): number =>
    test.bound === 'most' ? changes[place]! : 1 / changes[changes.length - 1 - place]!;
  const isLeftOpen = (place: number): boolean =>
    slackAt(place) > 0 && countNotMet(group, test, slackAt(place)) / group.n <= WORD_LINES.likely;
  let low = 0;
  let high = changes.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (isLeftOpen(middle)) high = middle;
    else low = middle + 1;
  }
  if (low >= changes.length) return null;
  return test.bound === 'most' ? test.level / slackAt(low) : test.level * slackAt(low);
}

interface Group {
  readonly cell: PeerCell;
  readonly peers: NextTest['peers'];
  readonly itself: readonly RatioChange[];
  /** Without the borrower itself, as is what follows. */
  readonly n: number;
  readonly borrowers: number;
}

function groupFor(peers: PeerChanges, borrowerId: number): Group {
  const own = peers.own.get(borrowerId);
  const cell = peers.cells.get(peers.cellOf.get(borrowerId) ?? '');
  const near = cell && groupOf(cell, 'sector and third of leverage', own);
  return near && isEnough(near) ? near : groupOf(peers.book, 'book', own);
}

const isEnough = ({ n, borrowers }: Group): boolean =>
  n >= FEWEST_PEERS && borrowers >= FEWEST_PEER_BORROWERS;

function groupOf(cell: PeerCell, peers: Group['peers'], own: readonly RatioChange[] | undefined): Group {
  const itself = ownChanges(cell, own);
  return {
    cell,
    peers,
    itself,
    n: cell.changes.length + cell.earningsGone - itself.length,
    borrowers: cell.borrowers - (own && own.length > 0 ? 1 : 0),
  };
}

function countNotMet(
  { cell: { changes, earningsGone }, itself }: Group,
  { bound }: TestAhead,
  slack: number,
): number {
  const notMet = bound === 'most' ? countAbove(changes, slack) : countNotReaching(changes, slack);
  return notMet + earningsGone - itself.filter((change) => isNotMetAfter(bound, slack, change)).length;
}

const countAbove = (sorted: Float64Array, value: number): number => {
  const { below, equal, n } = rankCounts(sorted, value);
  return n - below - equal;
};

/** How many of the ascending changes leave slack x change below 1: the same product as for a single change. */
function countNotReaching(sorted: Float64Array, slack: number): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (slack * sorted[middle]! < 1) low = middle + 1;
    else high = middle;
  }
  return low;
}
