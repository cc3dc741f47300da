import type { ComparedFigure } from './comparedFigures.ts';
import type { PeerInputs } from './peerFigures.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import type { QualityBlock, QualityBlockName } from './score.ts';
import type { Standing } from './standing.ts';

/** What a block is built from: its context, its shape with and without a risk, and its figures by name. */
export interface BlockContext {
  readonly peer: PeerInputs;
  readonly compared: Readonly<Record<ComparedFigure, number | null>>;
  /** Null where the figure is missing or there is nobody to compare with. */
  readonly standing: (figure: ComparedFigure) => Standing | null;
}

/** A block that cannot be given says why, and coverage is the lower for it. */
export type Block = (context: BlockContext) => QualityBlock;

const { weights, gates } = QUALITY_TABLE;

export const NOBODY = 'no peers in the sector and fewer than ten other borrowers to compare with';

/**
 * A risk that counts no more than the middle where what it rests on is immaterial: a percentile alone must not accuse.
 *
 * @example gated(0.9, true) // => 0.5
 * @example gated(0.9, false) // => 0.9
 */
export const gated = (risk: number, isImmaterial: boolean): number =>
  isImmaterial ? Math.min(risk, gates.cap) : risk;

/**
 * A block with its risk, 0 to 1, and the number of those it was ranked among.
 *
 * @example block('cash conversion', 0.4, null) // => { name: 'cash conversion', weight: 10, risk: 0.4, reason: null, figures: {}, peers: 0 }
 */
export const block = (name: QualityBlockName, risk: number, place: Standing | null): QualityBlock => ({
  name,
  weight: weights[name],
  risk,
  reason: null,
  figures: {},
  peers: place ? (place.medianOf === 'sector' ? place.sectorPeers : place.bookOthers) : 0,
});

/**
 * A block that cannot be given, with its reason.
 *
 * @example without('cash conversion', 'EBITDA is not above 1\u00a0% of revenue').risk // => null
 */
export const without = (
  name: QualityBlockName,
  reason: string,
  figures: Readonly<Record<string, number>> = {},
): QualityBlock => ({ name, weight: weights[name], risk: null, reason, figures, peers: 0 });

/**
 * Under the figure's name: the middle of the peers and how many they are, the percentile, and whose middle it is.
 *
 * @example placeFigures('conversion', null) // => {}
 */
export const placeFigures = (name: string, place: Standing | null): Record<string, number> =>
  place
    ? {
        [`${name}PeerMedian`]: place.median,
        [`${name}Peers`]: place.medianOf === 'sector' ? place.sectorPeers : place.bookOthers,
        [`${name}MedianOfBook`]: place.medianOf === 'book' ? 1 : 0,
        [`${name}Percentile`]: place.percentile,
        [`${name}SectorWeight`]: place.sectorWeight,
      }
    : {};
