import { QUALITY_TABLE } from './qualityTable.ts';
import type { QualityBand } from './score.ts';

export interface Headline {
  readonly headline: number | null;
  /** Quarter ends behind it. */
  readonly quarters: number;
  /** One quarter end only. */
  readonly provisional: boolean;
}

/**
 * The mean of the last three quarter ends' scores, oldest first; two are allowed, one is provisional.
 *
 * Averaging halves the jumps of a clean firm's score at no cost in power. Source: methods.md B5 and B6.
 *
 * @example headlineOf([52, 41, 27]).headline // => 40
 */
export function headlineOf(quarterScores: readonly (number | null)[]): Headline {
  const scores = quarterScores.slice(-QUALITY_TABLE.headlineQuarters).filter((score) => score !== null);
  return {
    headline: scores.length === 0 ? null : scores.reduce((sum, score) => sum + score, 0) / scores.length,
    quarters: scores.length,
    provisional: scores.length === 1,
  };
}

const { bands, bandHysteresisPoints } = QUALITY_TABLE;

/**
 * The band a headline lies in; a lower bound belongs to its band.
 *
 * @example bandOf(45) // => 'broadly supported'
 */
export const bandOf = (headline: number): QualityBand =>
  (bands.find(({ from }) => headline >= from) ?? bands.at(-1)!).band;

/**
 * The band after a new headline: the furthest one whose line the headline is five points past, else the one before.
 *
 * Repeating it with the same headline changes nothing. Source: methods.md B6.
 *
 * @example bandAfter('needs explanation', 29) // => 'needs explanation'
 */
export function bandAfter(previous: QualityBand | null, headline: number): QualityBand {
  if (previous === null) return bandOf(headline);
  const before = bands.findIndex(({ band }) => band === previous);
  const upTo = bands.findIndex(({ from }) => headline >= from + bandHysteresisPoints);
  if (upTo !== -1 && upTo < before) return bands[upTo]!.band;
  // Bands run downwards: the last lower bound that the headline is five points under has the next band below it.
  const downTo = bands.findLastIndex(({ from }) => headline <= from - bandHysteresisPoints) + 1;
  return bands[Math.max(before, downTo)]!.band;
}
