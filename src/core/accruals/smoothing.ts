/** Income smoothing of one firm; after Leuz, Nanda & Wysocki (2003, JFE 69), definitions from memory. */
import { err, ok, type Result } from '../result.ts';
import { midRanks } from '../statistics/rankAuc.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';

export interface Smoothing {
  /** Spread of operating income over that of cash from operations: low is smooth. */
  readonly spreadRatio: number;
  /** Rank correlation of the changes of accruals and of cash: near -1 is smooth. */
  readonly changeCorrelation: number;
  /** Size of accruals over size of cash, by means and by medians of the sizes' ratio. */
  readonly meanSizeRatio: number;
  readonly medianSizeRatio: number;
  readonly n: number;
}

/**
 * Four descriptions of how smooth income is beside cash. In the paper they are medians of countries; for one firm they
 * describe and are never scored. Errors: `too-few-points` below four periods, `no-spread` where cash never moves.
 *
 * @example smoothing([5, 5, 5, 5], [2, 6, 4, 8]) // => { ok: true, value: { spreadRatio: 0, changeCorrelation: -1, … } }
 */
export function smoothing(
  operatingIncome: readonly number[],
  cashFromOperations: readonly number[],
): Result<Smoothing, StatisticsError> {
  const n = operatingIncome.length;
  if (n < 4) return err({ kind: 'too-few-points', needed: 4, given: n });
  const accruals = operatingIncome.map((income, k) => income - cashFromOperations[k]!);
  const cashSpread = spread(cashFromOperations);
  const correlation = pearson(midRanks(changes(accruals)), midRanks(changes(cashFromOperations)));
  if (cashSpread === 0 || correlation === null || cashFromOperations.some((cash) => cash === 0)) {
    return err({ kind: 'no-spread' });
  }
  const ratios = accruals.map((accrual, k) => Math.abs(accrual) / Math.abs(cashFromOperations[k]!));
  return ok({
    spreadRatio: spread(operatingIncome) / cashSpread,
    changeCorrelation: correlation,
    meanSizeRatio: mean(ratios),
    medianSizeRatio: median(ratios),
    n,
  });
}

const mean = (values: readonly number[]): number =>
  values.reduce((sum, value) => sum + value, 0) / values.length;

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = Math.floor(sorted.length / 2);
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}

const changes = (values: readonly number[]): number[] =>
  values.slice(1).map((value, k) => value - values[k]!);

function spread(values: readonly number[]): number {
  const centre = mean(values);
  return Math.sqrt(values.reduce((sum, value) => sum + (value - centre) ** 2, 0) / (values.length - 1));
}

function pearson(one: readonly number[], other: readonly number[]): number | null {
  const [a, b] = [mean(one), mean(other)];
  const scale = spread(one) * spread(other) * (one.length - 1);
  return scale === 0 ? null : one.reduce((sum, value, k) => sum + (value - a) * (other[k]! - b), 0) / scale;
}
