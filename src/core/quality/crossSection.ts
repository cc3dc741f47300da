/**
 * How the peers stand at each quarter end: fitted accrual models and the sorted figures that any borrower's
 * percentiles are read from, itself left out. Plain JSON, so that it can be stored by the night and read by day.
 */
import type { PlainDate } from '../calendar/plainDate.ts';
import { accrualModelFor, unexplainedAccruals, type AccrualModel } from './accrualModel.ts';
import { comparedFigures, COMPARED_FIGURES, type ComparedFigure } from './comparedFigures.ts';
import { comparisonQuarterEnd } from './comparisonQuarterEnd.ts';
import type { PeerInputs } from './peerFigures.ts';
import { bySector } from './bySector.ts';

export type { PeerFigure, PeerInputs } from './peerFigures.ts';

export interface CrossSection {
  readonly version: number;
  /** Oldest first; by calendar quarter, see comparisonQuarterEnd. */
  readonly quarters: readonly QuarterCrossSection[];
}

export interface QuarterCrossSection {
  readonly quarterEnd: PlainDate;
  /** Null where the whole book is too small for a fit. */
  readonly accrualModel: AccrualModel | null;
  readonly sectors: readonly SectorFigures[];
  readonly book: SortedFigures;
  readonly firms: number;
  /** By borrower id: what it brought, so that it can be left out of its own comparison. */
  readonly members: Readonly<Record<string, PeerMember>>;
}

export interface SectorFigures {
  readonly sector: string;
  readonly firms: number;
  readonly sorted: SortedFigures;
}

/** Ascending. */
export type SortedFigures = Readonly<Record<ComparedFigure, readonly number[]>>;

export interface PeerMember {
  readonly sector: string;
  readonly figures: Readonly<Record<ComparedFigure, number | null>>;
}

/**
 * The peers' standing out of everybody's inputs; accounts that do not tie or whose cash flow presentation changed
 * stay out. Of two quarter ends of one borrower in one calendar quarter the later one counts.
 *
 * Work grows as n log n in the number of peers. Source: methods.md B6.
 *
 * @example buildCrossSection(peers, 12).quarters.length // => as many as the peers have calendar quarters
 */
export function buildCrossSection(peers: readonly PeerInputs[], version: number): CrossSection {
  const byQuarter = new Map<PlainDate, Map<number, PeerInputs>>();
  for (const peer of peers) {
    if (!peer.ties || peer.cashFlowPresentationChanged) continue;
    const quarterEnd = comparisonQuarterEnd(peer.quarterEnd);
    const quarter = byQuarter.get(quarterEnd) ?? new Map<number, PeerInputs>();
    byQuarter.set(quarterEnd, quarter);
    const earlier = quarter.get(peer.borrowerId);
    if (!earlier || earlier.quarterEnd < peer.quarterEnd) quarter.set(peer.borrowerId, peer);
  }
  const quarterEnds = [...byQuarter.keys()].sort();
  return {
    version,
    quarters: quarterEnds.map((quarterEnd) =>
      quarterCrossSection(quarterEnd, [...byQuarter.get(quarterEnd)!.values()]),
    ),
  };
}

function quarterCrossSection(quarterEnd: PlainDate, peers: readonly PeerInputs[]): QuarterCrossSection {
  const accrualModel = accrualModelFor(peers);
  const members = peers.map((peer) => ({
    borrowerId: peer.borrowerId,
    sector: peer.sector,
    figures: comparedFigures(peer, unexplainedAccruals(accrualModel, peer)),
  }));
  return {
    quarterEnd,
    accrualModel,
    sectors: [...bySector(members)].map(([sector, own]) => ({
      sector,
      firms: own.length,
      sorted: sortedFigures(own),
    })),
    book: sortedFigures(members),
    firms: members.length,
    members: Object.fromEntries(
      members.map(({ borrowerId, sector, figures }) => [String(borrowerId), { sector, figures }]),
    ),
  };
}

const sortedFigures = (members: readonly PeerMember[]): SortedFigures =>
  Object.fromEntries(
    COMPARED_FIGURES.map((figure) => [figure, sortedValues(members.map((member) => member.figures[figure]))]),
  ) as unknown as SortedFigures;

const sortedValues = (values: readonly (number | null)[]): number[] =>
  Array.from(Float64Array.from(values.filter((value) => value !== null)).sort());
