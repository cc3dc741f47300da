import {
  medianOf,
  middleOf,
  midRank,
  rankCounts,
  withoutMember,
  type Middle,
  type RankCounts,
} from '../statistics/percentile.ts';
import { COMPARED_FIGURES, type ComparedFigure } from './comparedFigures.ts';
import type { QuarterCrossSection } from './crossSection.ts';
import { QUALITY_TABLE } from './qualityTable.ts';

/** Where one figure of one borrower stands among other borrowers. */
export interface Standing {
  /** 0 to 1, sector and whole book mixed by `sectorWeight`. */
  readonly percentile: number;
  readonly sectorPercentile: number | null;
  readonly bookPercentile: number | null;
  readonly sectorWeight: number;
  readonly sectorPeers: number;
  readonly bookOthers: number;
  /** Of the sector's peers where they are enough to speak of a middle, else of the whole book's others. */
  readonly median: number;
  readonly medianOf: 'sector' | 'book';
}

/** What a figure is compared with: ascending samples by sector, which together are the book. */
export interface Samples {
  readonly sectors: readonly (readonly number[])[];
  readonly bookMiddle: Middle;
  /** Place of the borrower's sector in `sectors`; null where nobody else is in it. */
  readonly sector: number | null;
  /** The borrower's own value among the samples, to be left out. */
  readonly own: { readonly sector: number; readonly value: number } | null;
}

export type MixedPercentile = Pick<
  Standing,
  'percentile' | 'sectorPercentile' | 'bookPercentile' | 'sectorWeight'
>;

/**
 * A mid-rank percentile among others: the sector counts by min(1, peers / 10), the whole book for the rest. Null
 * where there are no sector peers and fewer than ten others in the book.
 *
 * Source: methods.md B6.
 *
 * @example mixedPercentile({ below: 9, equal: 0, n: 12 }, { below: 9, equal: 0, n: 20 })?.percentile // => 0.75
 */
export function mixedPercentile(sector: RankCounts, book: RankCounts): MixedPercentile | null {
  const { fullSectorPeers, fewestBookOthers } = QUALITY_TABLE.peers;
  const bookPercentile = midRank(book);
  if (bookPercentile === null || (sector.n === 0 && book.n < fewestBookOthers)) return null;
  const sectorWeight = Math.min(1, sector.n / fullSectorPeers);
  const sectorPercentile = midRank(sector);
  return {
    percentile: sectorWeight * (sectorPercentile ?? 0) + (1 - sectorWeight) * bookPercentile,
    sectorPercentile,
    bookPercentile,
    sectorWeight,
  };
}

/** Where a value stands among the samples, the borrower's own left out. Takes log2(n) steps per sector. */
function standingOf(value: number, samples: Samples): Standing | null {
  const { sectors, own } = samples;
  const counts = sectors.map((sorted, place) => {
    const all = rankCounts(sorted, value);
    return own?.sector === place ? withoutMember(all, value, own.value) : all;
  });
  const book = counts.reduce(sumOfCounts, NOBODY);
  const sector = samples.sector === null ? NOBODY : counts[samples.sector]!;
  const mixed = mixedPercentile(sector, book);
  if (!mixed) return null;
  const isSectorMedian = sector.n >= QUALITY_TABLE.peers.fewestForMedian;
  return {
    ...mixed,
    sectorPeers: sector.n,
    bookOthers: book.n,
    median: isSectorMedian ? sectorMedian(samples) : bookMedian(samples),
    medianOf: isSectorMedian ? 'sector' : 'book',
  };
}

const NOBODY: RankCounts = { below: 0, equal: 0, n: 0 };

const sumOfCounts = (one: RankCounts, other: RankCounts): RankCounts => ({
  below: one.below + other.below,
  equal: one.equal + other.equal,
  n: one.n + other.n,
});

function sectorMedian({ sectors, sector, own }: Samples): number {
  const sorted = sectors[sector ?? -1] ?? [];
  const leftOut = own !== null && own.sector === sector ? rankCounts(sorted, own.value).below : null;
  return present(medianOf(middleOf(sorted), leftOut));
}

function bookMedian({ sectors, bookMiddle, own }: Samples): number {
  if (own === null) return present(medianOf(bookMiddle, null));
  const below = sectors.reduce((sum, sorted) => sum + rankCounts(sorted, own.value).below, 0);
  return present(medianOf(bookMiddle, below));
}

/** Callers have counted that somebody is there. */
function present(median: number | null): number {
  if (median === null) throw new Error('a median of nobody');
  return median;
}

/**
 * The standing of a borrower's figure in a stored cross-section, whether or not the borrower is a member of it.
 *
 * @example standingIn(crossSection.quarters.at(-1), peer, 'receivableDays', 0)?.percentile // => 0
 */
export function standingIn(
  section: QuarterCrossSection,
  borrower: { readonly borrowerId: number; readonly sector: string },
  figure: ComparedFigure,
  value: number,
): Standing | null {
  const place = section.sectors.findIndex(({ sector }) => sector === borrower.sector);
  const member = section.members[String(borrower.borrowerId)];
  const own = member?.figures[COMPARED_FIGURES.indexOf(figure)] ?? null;
  return standingOf(value, {
    sectors: section.sectors.map(({ sorted }) => sorted[figure]),
    bookMiddle: section.bookMiddle[figure],
    sector: place === -1 ? null : place,
    own: member && own !== null ? { sector: member.sector, value: own } : null,
  });
}

/**
 * How many others there are at all, whatever figures they lack.
 *
 * @example otherFirms(crossSection.quarters.at(-1), peer) // => { sectorPeers: 11, bookPeers: 11 }
 */
export function otherFirms(
  section: QuarterCrossSection,
  borrower: { readonly borrowerId: number; readonly sector: string },
): { readonly sectorPeers: number; readonly bookPeers: number } {
  const member = section.members[String(borrower.borrowerId)];
  const place = section.sectors.findIndex(({ sector }) => sector === borrower.sector);
  return {
    sectorPeers: (section.sectors[place]?.firms ?? 0) - (member?.sector === place ? 1 : 0),
    bookPeers: section.firms - (member ? 1 : 0),
  };
}
