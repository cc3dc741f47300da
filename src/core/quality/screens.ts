/** Published screening scores read as risk. The cut-offs are anchors, the lines between them are ours. */

type Anchor = readonly [score: number, risk: number];

/** Beneish's M with eight variables; -1.78 and -2.22 are the published cut-offs. */
const M_ANCHORS: readonly Anchor[] = [
  [-2.76, 0],
  [-2.22, 0.35],
  [-1.78, 0.65],
  [-1, 1],
];

/** Dechow, Ge, Larson & Sloan's F, model 1; 1, 1.85 and 2.45 are the published lines. */
const F_ANCHORS: readonly Anchor[] = [
  [0.5, 0.15],
  [1, 0.4],
  [1.85, 0.75],
  [2.45, 1],
];

/**
 * Risk of an M-score, 0 to 1. Source: methods.md B6.
 *
 * @example mScoreRisk(-2) // => 0.5
 */
export const mScoreRisk = (score: number): number => between(score, M_ANCHORS);

/**
 * Risk of an F-score, 0.15 to 1. Source: methods.md B6.
 *
 * @example fScoreRisk(1.425) // => 0.575
 */
export const fScoreRisk = (score: number): number => between(score, F_ANCHORS);

function between(score: number, anchors: readonly Anchor[]): number {
  const above = anchors.findIndex(([anchor]) => score < anchor);
  if (above === 0) return anchors[0]![1];
  if (above === -1) return anchors.at(-1)![1];
  const [low, lowRisk] = anchors[above - 1]!;
  const [high, highRisk] = anchors[above]!;
  return lowRisk + ((score - low) / (high - low)) * (highRisk - lowRisk);
}
