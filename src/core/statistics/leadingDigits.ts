import { err, ok, type Result } from '../result.ts';
import { chiSquaredUpperTail } from './chiSquared.ts';
import type { StatisticsError } from './statisticsError.ts';

export type DigitPlace = 'first' | 'second';

/** How near to Benford's law the mean deviation is, by Nigrini's cut-offs. */
export type Conformity = 'close' | 'acceptable' | 'marginal' | 'none';

export interface DigitTest {
  readonly place: DigitPlace;
  /** Shares of the digits, from 1 (first place) or 0 (second place). */
  readonly observed: readonly number[];
  readonly expected: readonly number[];
  /** Normal scores of the shares, with the continuity term where it is smaller than the difference. */
  readonly z: readonly number[];
  readonly chiSquared: number;
  readonly degreesOfFreedom: number;
  readonly pValue: number;
  /** Mean absolute deviation with its reading; null below 1,000 values, where honest figures look marginal. */
  readonly meanDeviation: { readonly value: number; readonly conformity: Conformity } | null;
  readonly n: number;
  readonly method: 'Benford';
}

const FEWEST_FOR_MEAN_DEVIATION = 1_000;

/**
 * Cut-offs of Nigrini (2012), Benford's Law. For the second digit published programs differ in the last: .012 is the
 * book's, from memory.
 */
const CUT_OFFS: Readonly<Record<DigitPlace, readonly [number, number, number]>> = {
  first: [0.006, 0.012, 0.015],
  second: [0.008, 0.01, 0.012],
};

/**
 * Shares of the leading digits by Benford's law: log10(1 + 1/d), and for the second digit summed over the first.
 *
 * Source: methods.md C6.
 *
 * @example benfordShares('second') // => [0.11967926859688…, …]
 */
export function benfordShares(place: DigitPlace): readonly number[] {
  const from1To9 = [1, 2, 3, 4, 5, 6, 7, 8, 9];
  if (place === 'first') return from1To9.map((digit) => Math.log10(1 + 1 / digit));
  return [0, ...from1To9].map((second) =>
    from1To9.reduce((sum, first) => sum + Math.log10(1 + 1 / (10 * first + second)), 0),
  );
}

/**
 * How often each leading digit stands in the values; zeros and what has no digits are left out, signs too.
 *
 * @example digitCounts([3.4, -0.035, 0, 12], 'first') // => [1, 0, 2, 0, 0, 0, 0, 0, 0]
 */
export function digitCounts(values: readonly number[], place: DigitPlace): readonly number[] {
  const counts = new Array<number>(place === 'first' ? 9 : 10).fill(0);
  for (const value of values) {
    if (!Number.isFinite(value) || value === 0) continue;
    const digits = Math.abs(value).toExponential();
    if (place === 'first') counts[Number(digits[0]) - 1]! += 1;
    else counts[digits[1] === '.' ? Number(digits[2]) : 0]! += 1;
  }
  return counts;
}

/**
 * Counts of a leading digit against Benford's law. A difference is a difference, no finding: rounding, price points
 * and minimum amounts make them too. For a book, never for one borrower.
 *
 * `too-few-points` below an expected count of 5 in the rarest digit, where chi-squared no longer holds.
 * Source: methods.md C6.
 *
 * @example digitTest([301, 176, 125, 97, 79, 67, 58, 51, 46], 'first').value.meanDeviation.conformity // => 'close'
 */
export function digitTest(counts: readonly number[], place: DigitPlace): Result<DigitTest, StatisticsError> {
  const expected = benfordShares(place);
  if (counts.length !== expected.length) throw new RangeError('digitTest needs one count a digit');
  const n = counts.reduce((sum, count) => sum + count, 0);
  const needed = Math.ceil(5 / Math.min(...expected));
  if (n < needed) return err({ kind: 'too-few-points', needed, given: n });
  const observed = counts.map((count) => count / n);
  const deviations = observed.map((share, k) => Math.abs(share - expected[k]!));
  const chiSquared = deviations.reduce((sum, deviation, k) => sum + (n * deviation ** 2) / expected[k]!, 0);
  const degreesOfFreedom = expected.length - 1;
  const mean = deviations.reduce((sum, deviation) => sum + deviation, 0) / expected.length;
  return ok({
    place,
    observed,
    expected,
    z: deviations.map((deviation, k) => scoreOf(deviation, expected[k]!, n)),
    chiSquared,
    degreesOfFreedom,
    pValue: chiSquaredUpperTail(chiSquared, degreesOfFreedom),
    meanDeviation:
      n < FEWEST_FOR_MEAN_DEVIATION ? null : { value: mean, conformity: conformityOf(mean, place) },
    n,
    method: 'Benford',
  });
}

function scoreOf(deviation: number, expected: number, n: number): number {
  const continuity = 1 / (2 * n);
  const kept = continuity < deviation ? deviation - continuity : deviation;
  return kept / Math.sqrt((expected * (1 - expected)) / n);
}

function conformityOf(mean: number, place: DigitPlace): Conformity {
  const [close, acceptable, marginal] = CUT_OFFS[place];
  if (mean <= close) return 'close';
  if (mean <= acceptable) return 'acceptable';
  return mean <= marginal ? 'marginal' : 'none';
}
