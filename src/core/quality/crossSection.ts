/**
 * How the peers stand at each quarter end: fitted accrual models and the sorted figures that any borrower's
 * percentiles are read from, itself left out. Plain JSON, so that it can be stored by the night and read by day.
 */
import type { PlainDate } from '../calendar/plainDate.ts';
import { middleOf, type Middle } from '../statistics/percentile.ts';
import { accrualModelFor, unexplainedAccruals, type AccrualModel } from './accrualModel.ts';
import { comparedFigures, COMPARED_FIGURES, type ComparedFigure } from './comparedFigures.ts';
import { comparisonQuarterEnd } from './comparisonQuarterEnd.ts';
import type { PeerInputs } from './peerFigures.ts';
import { publishedModelsFor, type PublishedModels } from './publishedModels.ts';
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
  /** Beside the score; null in cross-sections that were stored before they were kept. */
  readonly published?: PublishedModels | null;
  readonly firms: number;
  /** Together the whole book. */
  readonly sectors: readonly SectorFigures[];
  readonly bookMiddle: Readonly<Record<ComparedFigure, Middle>>;
  /** By borrower id: what it brought, so that it can be left out of its own comparison. */
  readonly members: Readonly<Record<string, PeerMember>>;
}

export interface SectorFigures {
  readonly sector: string;
  readonly firms: number;
  /** Ascending. */
  readonly sorted: Readonly<Record<ComparedFigure, readonly number[]>>;
}

/** Short, because ten thousand of them are stored for every quarter end. */
export interface PeerMember {
  /** Place in `sectors`. */
  readonly sector: number;
  /** In the order of COMPARED_FIGURES. */
  readonly figures: readonly (number | null)[];
}

/**
 * The peers' standing out of everybody's inputs; accounts that do not tie stay out. Of two quarter ends of one borrower in one calendar quarter the later one counts.
 *
 * Work grows as n log n in the number of peers. Source: methods.md B6.
 *
 * @example buildCrossSection(peers, 12).quarters.at(-1)?.firms // => 12
 */
export function buildCrossSection(peers: readonly PeerInputs[], version: number): CrossSection {
  const byQuarter = new Map<PlainDate, Map<number, PeerInputs>>();
  for (const peer of peers) {
    if (!peer.ties) continue;
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
  const compared = peers.map((peer) => comparedFigures(peer, unexplainedAccruals(accrualModel, peer)));
  const ordered = compared.map((figures) => COMPARED_FIGURES.map((figure) => figures[figure]));
  const placed = peers.map((peer, k) => ({ sector: peer.sector, id: peer.borrowerId, figures: ordered[k]! }));
  const sectors = [...bySector(placed)];
  const places = new Map(sectors.map(([sector], place) => [sector, place]));
  return {
    quarterEnd,
    accrualModel,
    published: publishedModelsFor(peers),
    firms: peers.length,
    sectors: sectors.map(([sector, own]) => ({
      sector,
      firms: own.length,
      sorted: perFigure((k) => sortedValues(own, k)),
    })),
    bookMiddle: perFigure((k) => middleOf(sortedValues(placed, k))),
    members: Object.fromEntries(
      placed.map(({ id, sector, figures }) => [String(id), { sector: places.get(sector)!, figures }]),
    ),
  };
}

const perFigure = <T>(read: (place: number) => T): Record<ComparedFigure, T> =>
  Object.fromEntries(COMPARED_FIGURES.map((figure, place) => [figure, read(place)])) as Record<
    ComparedFigure,
    T
  >;

const sortedValues = (
  members: readonly { readonly figures: readonly (number | null)[] }[],
  place: number,
): number[] => Array.from(Float64Array.from(members.flatMap(({ figures }) => figures[place] ?? [])).sort());
