/** Words for how often a test would not be met. */
import { decimal } from '../money/decimal.ts';
import { formatShare } from '../money/print.ts';

export const PROJECTION_WORDS = ['unlikely', 'possible', 'open', 'likely'] as const;
export type ProjectionWord = (typeof PROJECTION_WORDS)[number];

/** From which share on a word holds; 'likely' begins above its line, the others at theirs. */
export const WORD_LINES = { possible: 0.1, open: 0.33, likely: 0.66 } as const;

/**
 * The word for a share of not being met: unlikely below 10 %, possible up to 33 %, open up to 66 %, likely above.
 *
 * Source: the lender's words for projections; desk practice, no source.
 *
 * @example projectionWord(0.66) // => 'open'
 */
export function projectionWord(share: number): ProjectionWord {
  if (share > WORD_LINES.likely) return 'likely';
  if (share >= WORD_LINES.open) return 'open';
  return share >= WORD_LINES.possible ? 'possible' : 'unlikely';
}

/**
 * How often, in whole per cent; tails that no count bears out are cut at a thousandth.
 *
 * @example printOften(0.717) // => '72\u00a0%'
 * @example printOften(1e-9) // => 'under 0.1\u00a0%'
 */
export function printOften(share: number): string {
  if (share > 0 && share < 0.001) return `under ${formatShare(decimal('0.001'))}`;
  if (share < 1 && share > 0.999) return `over ${formatShare(decimal('0.999'))}`;
  return formatShare(decimal(share), { places: 0 });
}
