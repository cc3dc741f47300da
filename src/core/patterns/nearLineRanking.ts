import { groupedBy } from './groupedBy.ts';
import { fitHeadrooms, type NearChances } from './headroomFit.ts';
import {
  headroomGrid,
  headroomSample,
  NEAR_LINE,
  type HeadroomSample,
  type NearLine,
} from './headroomGrid.ts';
import { roomFor } from './headroomLikelihoods.ts';
import { FEWEST_NEAR, nearLineEvidence, type NearLineEvidence } from './nearLineEvidence.ts';

/** The headrooms of one borrower under one covenant, as shares of the level. */
export interface HeadroomSeries<Id> {
  readonly id: Id;
  readonly sector: string;
  readonly headrooms: readonly number[];
}

export interface RankedSeries<Id> extends NearLineEvidence {
  readonly id: Id;
  /** Chance that nothing is lifted, given the whole book: the local false-discovery rate. */
  readonly localFdr: number;
  /** Nothing can be said below three tests near the line. */
  readonly hasEnoughNear: boolean;
  /** Belongs to the list, should the book's own gate open. */
  readonly listed: boolean;
  /** With whom it was fitted. */
  readonly peers: 'sector' | 'book';
  /** How many series of them, itself among them. */
  readonly peerCount: number;
}

export interface NearLineRanking<Id> {
  /** In the order given. */
  readonly series: readonly RankedSeries<Id>[];
  /** Share of the book that the fit takes for lifting before looking at one borrower. */
  readonly priorShare: number;
  readonly near: NearLine;
  readonly n: number;
  readonly method: 'two groups by empirical Bayes, headroom censored near the line';
}

/** The list is the largest one whose mean local false-discovery rate is at most this. */
export const LARGEST_MEAN_FDR = 0.1;
/** A sector of fewer series leans on the whole book. */
export const FEWEST_PEERS = 20;

/**
 * Ranks the series of a book by how unlike a smooth headroom their tests near the line lie. Never more than a
 * pattern: steering the business and steering the accounts look alike here.
 *
 * One type of covenant at a time. A series without any headroom is not ranked; `n` counts those that are.
 * Source: methods.md Part C 5.2 and 5.4.
 *
 * @example rankNearLine([{ id: 1, sector: 'metal goods', headrooms: [0.1, 0.01, -0.2] }]).series[0].near // => 1
 */
export function rankNearLine<Id>(
  series: readonly HeadroomSeries<Id>[],
  near: NearLine = NEAR_LINE,
): NearLineRanking<Id> {
  const usable = series.filter(({ headrooms }) => headrooms.length > 0);
  const samples = usable.map(({ headrooms }) => headroomSample(headrooms, near));
  const fits = fitByPeers(usable, samples, near);
  const evidence = samples.map((sample, k) => nearLineEvidence(sample, fits[k]!.chances));
  const priorShare = shareLifted(evidence.map(({ bayesFactor }) => bayesFactor));
  const rates = evidence.map(({ near: count, bayesFactor }) => ({
    localFdr: 1 - posterior(priorShare, bayesFactor),
    hasEnoughNear: count >= FEWEST_NEAR,
  }));
  const listed = listOf(rates);
  return {
    series: evidence.map((each, k) => ({
      ...each,
      id: usable[k]!.id,
      localFdr: rates[k]!.localFdr,
      hasEnoughNear: rates[k]!.hasEnoughNear,
      peers: fits[k]!.peers,
      peerCount: fits[k]!.peerCount,
      listed: listed.has(k),
    })),
    priorShare,
    near,
    n: evidence.length,
    method: 'two groups by empirical Bayes, headroom censored near the line',
  };
}

interface PeerFit {
  readonly chances: NearChances;
  readonly peers: 'sector' | 'book';
  readonly peerCount: number;
}

function fitByPeers(
  series: readonly HeadroomSeries<unknown>[],
  samples: readonly HeadroomSample[],
  near: NearLine,
): readonly PeerFit[] {
  const grid = headroomGrid(near);
  const groups = groupedBy(series.keys(), (k) => series[k]!.sector);
  const room = roomFor(grid, Math.max(0, ...[...groups.values()].map(({ length }) => length)));
  const fits = new Array<PeerFit>(series.length);
  const leaning: number[] = [];
  for (const members of groups.values()) {
    if (members.length < FEWEST_PEERS) leaning.push(...members);
    else
      fitHeadrooms(
        grid,
        members.map((k) => samples[k]!),
        room,
      ).chances.forEach((chances, place) => {
        fits[members[place]!] = { chances, peers: 'sector', peerCount: members.length };
      });
  }
  if (leaning.length === 0) return fits;
  const { chances } = fitHeadrooms(grid, samples);
  for (const k of leaning) fits[k] = { chances: chances[k]!, peers: 'book', peerCount: series.length };
  return fits;
}

const EM = { start: 0.1, passes: 60, least: 1e-4, most: 0.9 };

/** The share of the book in the lifting group, by 60 passes of EM with half a success in five trials added. */
function shareLifted(bayesFactors: readonly number[]): number {
  let share = EM.start;
  for (let pass = 0; pass < EM.passes; pass += 1) {
    const expected = bayesFactors.reduce((sum, factor) => sum + posterior(share, factor), 0);
    share = Math.min(EM.most, Math.max(EM.least, (expected + 0.5) / (bayesFactors.length + 5)));
  }
  return share;
}

/**
 * Posterior probability of the group that a Bayes factor speaks for, from its share of the book.
 *
 * @example posterior(0.5, 3) // => 0.75
 */
export const posterior = (share: number, bayesFactor: number): number =>
  (share * bayesFactor) / (1 - share + share * bayesFactor);

/** The places of the listed: the lowest rates whose mean stays within the bound; equal rates stand or fall together. */
function listOf(
  ranked: readonly Pick<RankedSeries<unknown>, 'localFdr' | 'hasEnoughNear'>[],
): ReadonlySet<number> {
  const order = [...ranked.keys()]
    .filter((k) => ranked[k]!.hasEnoughNear)
    .sort((a, b) => ranked[a]!.localFdr - ranked[b]!.localFdr);
  let sum = 0;
  let length = 0;
  order.forEach((k, place) => {
    sum += ranked[k]!.localFdr;
    const next = order[place + 1];
    const isTied = next !== undefined && ranked[next]!.localFdr === ranked[k]!.localFdr;
    if (!isTied && sum <= LARGEST_MEAN_FDR * (place + 1)) length = place + 1;
  });
  return new Set(order.slice(0, length));
}
