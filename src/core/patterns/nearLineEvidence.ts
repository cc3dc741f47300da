import { binomialUpperTail } from '../statistics/binomialDistribution.ts';
import type { NearChances } from './headroomFit.ts';

/** Below this many tests within the window nothing can be said of a borrower. */
export const FEWEST_NEAR = 3;

/** How much a shortfall within the window might be lifted over the line: the shares that are tried, equally likely. */
export const LIFTED_SHARES: readonly number[] = [0.2, 0.4, 0.6, 0.8, 0.95];

export interface NearLineEvidence {
  /** Tests within the window. */
  readonly near: number;
  /** Those of them on the passing side. */
  readonly passing: number;
  /** How many of them a smooth headroom would put there. */
  readonly expectedPassing: number;
  /** Share of the window that a smooth headroom puts on the passing side. */
  readonly share: number;
  /** Conditional exact test, one-sided; 1 without tests near the line. */
  readonly pAtLeast: number;
  /** The same with half the probability of the count seen: for ranking and combining. */
  readonly pMid: number;
  /** How much likelier the counts are under lifting than without. */
  readonly bayesFactor: number;
}

const LEAST_SHARE = 0.05;
const LARGEST_SHARE = 0.95;

/**
 * Given that a test ends within the window, on which side does it end? Conditional on their number, the passing ones
 * are binomial with the share that the fit puts on that side; lifting moves tests across the line but never across
 * the window's edges.
 *
 * The share is kept within 5 % and 95 %. Source: methods.md Part C 5.2 (tests C4 and C7; own derivation).
 *
 * @example nearLineEvidence({ passing: 3, failing: 0 }, { passing: 0.1, failing: 0.2 }).expectedPassing // => 1
 */
export function nearLineEvidence(
  counts: { readonly passing: number; readonly failing: number },
  chances: NearChances,
): NearLineEvidence {
  const near = counts.passing + counts.failing;
  const share = shareOf(chances);
  const pAtLeast = binomialUpperTail(counts.passing, near, share);
  const pMore = binomialUpperTail(counts.passing + 1, near, share);
  return {
    near,
    passing: counts.passing,
    expectedPassing: near * share,
    share,
    pAtLeast,
    pMid: (pAtLeast + pMore) / 2,
    bayesFactor: bayesFactor(counts, (1 - share) / share),
  };
}

function shareOf({ passing, failing }: NearChances): number {
  const share = passing / (passing + failing);
  // Neither side can be reached: nothing is known, and a flat density has one part in three on the passing side.
  return Number.isNaN(share) ? 1 / 3 : Math.min(LARGEST_SHARE, Math.max(LEAST_SHARE, share));
}

function bayesFactor(
  { passing, failing }: { readonly passing: number; readonly failing: number },
  failingPerPassing: number,
): number {
  const sum = LIFTED_SHARES.reduce(
    (total, lifted) => total + (1 + lifted * failingPerPassing) ** passing * (1 - lifted) ** failing,
    0,
  );
  return sum / LIFTED_SHARES.length;
}
