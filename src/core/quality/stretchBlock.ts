import { capitalisedShare, inventoryDays, receivableDays } from './comparedFigures.ts';
import { block, gated, NOBODY, placeFigures, without, type BlockContext } from './blockParts.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import type { QualityBlock } from './score.ts';
import type { Standing } from './standing.ts';
import { stretchOf } from './stretch.ts';

const { gates } = QUALITY_TABLE;

/**
 * Receivable days, inventory days and capitalised costs: the one that stretched most among its peers.
 *
 * @example stretchBlock({ peer: { ...peer, figures: {} }, compared: {}, standing: () => null }).risk // => null
 */
export function stretchBlock({ peer, standing }: BlockContext): QualityBlock {
  const receivables = receivableDays(peer.figures);
  const inventory = inventoryDays(peer.figures);
  const capitalised = capitalisedShare(peer.figures);
  const closing = peer.acquisitionThisQuarter;
  const places = {
    receivables: receivables && standing('receivableDaysChange'),
    inventory: inventory && standing('inventoryDaysChange'),
    capitalised: capitalised && standing('capitalisedShareChange'),
  };
  const risks = {
    receivables: closing ? null : gatedPlace(places.receivables, receivables, gates.daysUp),
    inventory: closing ? null : gatedPlace(places.inventory, inventory, gates.daysUp),
    capitalised: gatedPlace(places.capitalised, capitalised, gates.capitalisedShareUp),
  };
  const stretch = stretchOf(risks);
  const figures = {
    ...(receivables && {
      receivableDays: receivables.days,
      receivableDaysYearAgo: receivables.daysYearAgo,
      receivableDaysChange: receivables.change,
      ...medianFigure('receivableDays', standing('receivableDays')),
      ...placeFigures('receivableDaysChange', places.receivables),
      ...riskFigure('receivables', risks.receivables),
    }),
    ...(inventory && {
      inventoryDays: inventory.days,
      inventoryDaysYearAgo: inventory.daysYearAgo,
      inventoryDaysChange: inventory.change,
      ...medianFigure('inventoryDays', standing('inventoryDays')),
      ...placeFigures('inventoryDaysChange', places.inventory),
      ...riskFigure('inventory', risks.inventory),
    }),
    ...(capitalised && {
      capitalisedShare: capitalised.share,
      capitalisedShareYearAgo: capitalised.shareYearAgo,
      capitalisedShareChange: capitalised.change,
      ...medianFigure('capitalisedShare', standing('capitalisedShare')),
      ...placeFigures('capitalisedShareChange', places.capitalised),
      ...riskFigure('capitalised', risks.capitalised),
    }),
  };
  if (!stretch)
    return without('sharpest stretch', noStretchReason(closing, Object.values(places), figures), figures);
  const sharpest = places[stretch.sharpest];
  return {
    ...block('sharpest stretch', stretch.risk, sharpest),
    figures: { ...figures, channels: stretch.channels },
  };
}

function noStretchReason(
  isClosing: boolean,
  places: readonly (Standing | null)[],
  figures: Readonly<Record<string, number>>,
): string {
  if (isClosing && places.some((place) => place !== null))
    return 'an acquisition closed in the quarter: receivable and inventory days are left out';
  return Object.keys(figures).length > 0
    ? NOBODY
    : 'receivable days, inventory days and capitalised costs cannot be given for both years';
}

const gatedPlace = (
  place: Standing | null,
  measured: { readonly change: number } | null,
  gate: number,
): number | null => (place && measured ? gated(place.percentile, measured.change < gate) : null);

const medianFigure = (name: string, place: Standing | null): Record<string, number> =>
  place ? { [`${name}PeerMedian`]: place.median } : {};

const riskFigure = (channel: string, risk: number | null): Record<string, number> =>
  risk === null ? {} : { [`${channel}Risk`]: risk };
