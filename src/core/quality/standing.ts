import { medianWithout, midRank, rankCounts, withoutMember } from '../statistics/percentile.ts';
import type { ComparedFigure } from './comparedFigures.ts';
import type { PeerMember, QuarterCrossSection } from './crossSection.ts';
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

/**
 * A mid-rank percentile among others: the sector counts by min(1, peers / 10), the whole book for the rest.
 *
 * `sector` and `book` ascend and may hold the borrower's own earlier value, which is then given and left out. Null
 * where there are no sector peers and fewer than ten others in the book. Source: methods.md B6.
 *
 * @example standingOf(0.03, { sector: [0.01, 0.05], book: [0.01, 0.02, 0.05], ownInSector: null, ownInBook: null })
 */
export function standingOf(
  value: number,
  samples: {
    readonly sector: readonly number[];
    readonly book: readonly number[];
    readonly ownInSector: number | null;
    readonly ownInBook: number | null;
  },
): Standing | null {
  const among = (sorted: readonly number[], own: number | null) =>
    own === null ? rankCounts(sorted, value) : withoutMember(rankCounts(sorted, value), value, own);
  const sector = among(samples.sector, samples.ownInSector);
  const book = among(samples.book, samples.ownInBook);
  const { fullSectorPeers, fewestBookOthers, fewestForMedian } = QUALITY_TABLE.peers;
  if (sector.n === 0 && book.n < fewestBookOthers) return null;
  const sectorWeight = Math.min(1, sector.n / fullSectorPeers);
  const [sectorPercentile, bookPercentile] = [midRank(sector), midRank(book)];
  const medianOf = sector.n >= fewestForMedian ? 'sector' : 'book';
  const median =
    medianOf === 'sector'
      ? medianWithout(samples.sector, samples.ownInSector)
      : medianWithout(samples.book, samples.ownInBook);
  // A sector's peers are in the book too, so where one is there the other is.
  if (median === null || bookPercentile === null) return null;
  return {
    percentile: sectorWeight * (sectorPercentile ?? 0) + (1 - sectorWeight) * bookPercentile,
    sectorPercentile,
    bookPercentile,
    sectorWeight,
    sectorPeers: sector.n,
    bookOthers: book.n,
    median,
    medianOf,
  };
}

/** The standing of a borrower's figure in a stored cross-section, whether or not the borrower is a member of it. */
export function standingIn(
  section: QuarterCrossSection,
  borrower: { readonly borrowerId: number; readonly sector: string },
  figure: ComparedFigure,
  value: number,
): Standing | null {
  const member = memberOf(section, borrower.borrowerId);
  const own = member?.figures[figure] ?? null;
  return standingOf(value, {
    sector: section.sectors.find(({ sector }) => sector === borrower.sector)?.sorted[figure] ?? [],
    book: section.book[figure],
    ownInSector: member?.sector === borrower.sector ? own : null,
    ownInBook: own,
  });
}

/** How many others there are at all, whatever figures they lack. */
export function otherFirms(
  section: QuarterCrossSection,
  borrower: { readonly borrowerId: number; readonly sector: string },
): { readonly sectorPeers: number; readonly bookPeers: number } {
  const member = memberOf(section, borrower.borrowerId);
  const firms = section.sectors.find(({ sector }) => sector === borrower.sector)?.firms ?? 0;
  return {
    sectorPeers: firms - (member?.sector === borrower.sector ? 1 : 0),
    bookPeers: section.firms - (member ? 1 : 0),
  };
}

const memberOf = (section: QuarterCrossSection, borrowerId: number): PeerMember | null =>
  section.members[String(borrowerId)] ?? null;
