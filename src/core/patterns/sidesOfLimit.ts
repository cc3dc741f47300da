import { normalCdf } from '../statistics/normalDistribution.ts';
import {
  fourBinContrast,
  standardizedDifference,
  type FourBinContrast,
  type FourBins,
  type StandardizedDifference,
} from '../statistics/standardizedDifference.ts';
import { binsAround } from './windows.ts';

/** Both sides of a cut-off at one bin width. The two sides are not two pieces of evidence; the contrast is one. */
export interface SidesOfLimit {
  readonly width: number;
  readonly cutoff: number;
  readonly bins: FourBins;
  readonly left: StandardizedDifference;
  readonly right: StandardizedDifference;
  /** One-sided, multinomial: more just right of the cut-off than its neighbours imply; null without spread. */
  readonly pRight: number | null;
  readonly contrast: FourBinContrast;
  /** All tests, those outside every window too. */
  readonly n: number;
}

/**
 * The standardized differences on both sides of a cut-off, and the four-bin contrast.
 *
 * `headrooms` are those that have a meaning, `n` counts all tests. Source: methods.md C1.
 *
 * @example sidesOfLimit([-0.01, 0.01, 0.011, 0.03], 4, 0.02, 0).right.expected // => 1
 */
export function sidesOfLimit(
  headrooms: readonly number[],
  n: number,
  width: number,
  cutoff: number,
): SidesOfLimit {
  const bins = binsAround(headrooms, width, cutoff);
  const { farLeft, left, right, farRight } = bins;
  const onRight = standardizedDifference({ previous: left, at: right, next: farRight, n });
  return {
    width,
    cutoff,
    bins,
    left: standardizedDifference({ previous: farLeft, at: left, next: right, n }),
    right: onRight,
    pRight: onRight.zMultinomial === null ? null : normalCdf(-onRight.zMultinomial),
    contrast: fourBinContrast(bins, n),
    n,
  };
}
