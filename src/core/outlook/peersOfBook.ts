import type { MeasureCode } from '../measures/measure.ts';
import { peerChanges, type PeerChanges } from './peerChanges.ts';
import { historiesAt, ratioGrids, type Horizon } from './ratioGrid.ts';
import type { RatioSeries } from './ratioSeries.ts';

/** How the ratios of one measure changed over a horizon; null where nobody has the measure. */
export type PeersOfBook = (measure: MeasureCode, quarters: Horizon) => PeerChanges | null;

/**
 * The peers' changes out of a night's ratios. They are built once for one night, when first asked for, and serve every
 * borrower of it.
 *
 * @example peersOfBook([])('net-leverage', 1) // => null
 */
export function peersOfBook(ratios: readonly RatioSeries[]): PeersOfBook {
  const known = BY_NIGHT.get(ratios);
  if (known) return known;
  const peers = remembered(ratios);
  BY_NIGHT.set(ratios, peers);
  return peers;
}

const BY_NIGHT = new WeakMap<readonly RatioSeries[], PeersOfBook>();

function remembered(ratios: readonly RatioSeries[]): PeersOfBook {
  const grids = ratioGrids(ratios);
  const built = new Map<string, PeerChanges>();
  return (measure, quarters) => {
    const grid = grids.get(measure);
    if (!grid) return null;
    const key = `${measure} ${quarters}`;
    const changes = built.get(key) ?? peerChanges(historiesAt(grid, grid.quarterEnds.length - 1), quarters);
    built.set(key, changes);
    return changes;
  };
}
