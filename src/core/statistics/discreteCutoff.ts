import { binomialLowerTail, binomialUpperTail } from './binomialDistribution.ts';

export interface DiscreteCutoff {
  /** Between these two the share at the cut-off may lie where nothing is unusual. */
  readonly shareLow: number;
  readonly shareHigh: number;
  /** Two-sided. */
  readonly pValue: number;
  /** One-sided: more at the cut-off than the bound allows. */
  readonly pAtLeast: number;
  readonly n: number;
  readonly method: 'Frandsen, exact binomial';
}

/**
 * Whether a value of a coarse scale (ratios printed to one or two decimals) is seen more or less often than its two
 * neighbours allow, where the density's second difference is at most `bound` of it: the share at the cut-off then
 * lies in [(1 - k)/(3 - k), (1 + k)/(3 + k)].
 *
 * The upper tail counts the value seen, P(X >= n); the published program's P(X > n) is slightly too small. Without
 * observations the p-values are 1. Source: methods.md Part C 3.3; Frandsen (2017, Advances in Econometrics 38).
 *
 * @example discreteCutoff({ previous: 14, at: 61, next: 38 }, 0.05).shareLow // => 0.322033…
 */
export function discreteCutoff(
  { previous, at, next }: { readonly previous: number; readonly at: number; readonly next: number },
  bound: number,
): DiscreteCutoff {
  const n = previous + at + next;
  const shareLow = (1 - bound) / (3 - bound);
  const shareHigh = (1 + bound) / (3 + bound);
  const pAtLeast = binomialUpperTail(at, n, shareHigh);
  const pAtMost = binomialLowerTail(at, n, shareLow);
  return {
    shareLow,
    shareHigh,
    pValue: Math.min(1, 2 * Math.min(pAtLeast, pAtMost)),
    pAtLeast,
    n,
    method: 'Frandsen, exact binomial',
  };
}
