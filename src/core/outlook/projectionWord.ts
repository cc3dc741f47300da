/** Words for how often a test would not be met. */
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
