import type { Bound } from '../covenants/headroom.ts';
import { err, ok, type Result } from '../result.ts';
import { multivariateNormalCdf } from '../statistics/multivariateNormal.ts';
import { normalCdf } from '../statistics/normalDistribution.ts';
import { rankCounts } from '../statistics/percentile.ts';
import type { PeerCell, PeerChanges } from './peerChanges.ts';
import { isNotMetAfter, slackOf } from './peerDraws.ts';

export interface NextTest {
  /** In how many of the peers' changes the test would not be met. */
  readonly notMet: number;
  readonly share: number;
  /** The peers' changes over the same horizon. */
  readonly n: number;
  readonly peers: 'sector and third of leverage' | 'book';
  readonly horizonQuarters: number;
  readonly method: 'peer draws, each once';
}

export type NextTestError =
  | { readonly kind: 'too few peers'; readonly needed: number; readonly given: number }
  /** Net cash, or earnings of zero or below: no multiple of such a ratio says anything. */
  | { readonly kind: 'ratio without meaning' };

const FEWEST_PEERS = 30;

/**
 * How often the coming test would not be met, were the ratio to change as those of its peers did. `level` is the one
 * that will be in force then, scheduled step-downs taken in. Peers are the borrower's sector and third of leverage,
 * the whole book where that has fewer than 30 changes; below 30 in the book there is no figure. Its own changes are
 * left out.
 *
 * Source: methods.md Part C 2.2 c.
 *
 * @example nextTest({ book: { changes: [], earningsGone: 0, own: new Map() }, cells: new Map(), cellOf: new Map() }, { borrowerId: 1, bound: 'most', ratio: 3, level: 3.5 }).error.kind // => 'too few peers'
 */
export function nextTest(
  peers: PeerChanges,
  {
    borrowerId,
    ...test
  }: { readonly borrowerId: number; readonly bound: Bound; readonly ratio: number; readonly level: number },
): Result<NextTest, NextTestError> {
  const slack = slackOf(test);
  if (slack === null || !(test.ratio > 0)) return err({ kind: 'ratio without meaning' });
  const own = peers.cells.get(peers.cellOf.get(borrowerId) ?? '');
  const inCell = own && countNotMet(own, borrowerId, test.bound, slack);
  const isCell = inCell !== undefined && inCell.n >= FEWEST_PEERS;
  const { notMet, n } = isCell ? inCell : countNotMet(peers.book, borrowerId, test.bound, slack);
  if (n < FEWEST_PEERS) return err({ kind: 'too few peers', needed: FEWEST_PEERS, given: n });
  return ok({
    notMet,
    share: notMet / n,
    n,
    peers: isCell ? 'sector and third of leverage' : 'book',
    horizonQuarters: peers.horizonQuarters,
    method: 'peer draws, each once',
  });
}

function countNotMet(
  { changes, earningsGone, own }: PeerCell,
  borrowerId: number,
  bound: Bound,
  slack: number,
): { readonly notMet: number; readonly n: number } {
  const itself = own.get(borrowerId) ?? [];
  const notMet = bound === 'most' ? countAbove(changes, slack) : countNotReaching(changes, slack);
  return {
    notMet: notMet + earningsGone - itself.filter((change) => isNotMetAfter(bound, slack, change)).length,
    n: changes.length + earningsGone - itself.length,
  };
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

/**
 * Chance that headroom ends below nought after some quarters, were it to return to its mean with normal shocks: the
 * check beside the peers' figure. Headroom, mean, deviation and tightening are shares of the level; the deviation is
 * that of the series, not of its shocks; tightening is what scheduled steps take.
 *
 * Source: methods.md Part C 2.2 a.
 *
 * @example chanceByReversion({ headroom: 0.06, mean: 0.12, persistence: 0.75, deviation: 0.1, tightening: 0.05, quarters: 1 }) // => 0.35272…
 */
export function chanceByReversion(given: {
  readonly headroom: number;
  readonly mean: number;
  readonly persistence: number;
  readonly deviation: number;
  readonly tightening: number;
  readonly quarters: number;
}): number {
  const kept = given.persistence ** given.quarters;
  const expected = given.mean + kept * (given.headroom - given.mean) - given.tightening;
  return normalCdf(-expected / (given.deviation * Math.sqrt(1 - kept * kept)));
}

/**
 * Chance that at least one of up to three tests is not met next quarter: slacks as logs of ratio over level, and the
 * covariance of the ratios' quarterly log changes over the book.
 *
 * Source: methods.md Part C 2.2 b; Murfin (2012, Journal of Finance 67:1565-1601).
 *
 * @example chanceOfAnyNotMet([0], [[0.04]]) // => 0.5
 */
export const chanceOfAnyNotMet = (
  logSlacks: readonly number[],
  covariance: readonly (readonly number[])[],
): number => 1 - multivariateNormalCdf(logSlacks, covariance);
