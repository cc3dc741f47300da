export const ADJUSTMENTS = ['bonferroni', 'holm', 'benjamini-hochberg', 'benjamini-yekutieli'] as const;
export type Adjustment = (typeof ADJUSTMENTS)[number];

/**
 * P-values adjusted for how many there are, in the order given. Holm (1979, Scandinavian Journal of Statistics 6) and
 * Bonferroni bound the chance of a single false one; Benjamini & Hochberg (1995, Journal of the Royal Statistical
 * Society B 57) and Benjamini & Yekutieli (2001, Annals of Statistics 29; for any dependence) the share of false ones.
 *
 * @example adjustedPValues([0.01, 0.02], 'holm') // => [0.02, 0.02]
 */
export function adjustedPValues(pValues: readonly number[], adjustment: Adjustment): readonly number[] {
  const m = pValues.length;
  const order = pValues.map((_, place) => place).sort((a, b) => pValues[a]! - pValues[b]!);
  const sorted = order.map((place) => pValues[place]!);
  const adjusted = new Array<number>(m);
  adjustedInOrder(sorted, adjustment).forEach((value, rank) => (adjusted[order[rank]!] = value));
  return adjusted;
}

function adjustedInOrder(sorted: readonly number[], adjustment: Adjustment): readonly number[] {
  const m = sorted.length;
  switch (adjustment) {
    case 'bonferroni':
      return sorted.map((p) => Math.min(1, p * m));
    case 'holm':
      return runningMaximum(sorted.map((p, rank) => Math.min(1, p * (m - rank))));
    case 'benjamini-hochberg':
      return minimumFromTheRight(sorted.map((p, rank) => (p * m) / (rank + 1)));
    case 'benjamini-yekutieli': {
      const harmonic = sorted.reduce((sum, _, rank) => sum + 1 / (rank + 1), 0);
      return minimumFromTheRight(sorted.map((p, rank) => (p * m * harmonic) / (rank + 1)));
    }
  }
}

/**
 * Share of tests without an effect, from how many p-values lie above `above` (Storey 2002, Journal of the Royal
 * Statistical Society B 64). At most 1. Throws RangeError without p-values.
 *
 * @example nullShare([0.01, 0.2, 0.7, 0.9], 0.5) // => 1
 */
export function nullShare(pValues: readonly number[], above: number): number {
  if (pValues.length === 0) throw new RangeError('nullShare needs at least one p-value');
  return Math.min(1, pValues.filter((p) => p > above).length / ((1 - above) * pValues.length));
}

function runningMaximum(values: readonly number[]): readonly number[] {
  let largest = 0;
  return values.map((value) => (largest = Math.max(largest, value)));
}

function minimumFromTheRight(values: readonly number[]): readonly number[] {
  let smallest = 1;
  return values.map((_, k) => (smallest = Math.min(smallest, values[values.length - 1 - k]!))).reverse();
}
