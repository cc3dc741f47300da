import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import scipy from '../../../tests/fixtures/statistics/distributions.json' with { type: 'json' };
import { binomialLowerTail, binomialUpperTail, exactBinomial } from './binomialDistribution.ts';

/** Within a relative tolerance, down to where a double has no digits left. */
const isWithin = (actual: number, wanted: number, relative: number): boolean =>
  Math.abs(actual - wanted) <= relative * Math.abs(wanted) + Number.MIN_VALUE;

describe.each(scipy.binomial)('$k of $n at $p', ({ k, n, p, lower, upper, two_sided }) => {
  test('has the tails of scipy.stats.binom, small ones to the digit', () => {
    expect(isWithin(binomialLowerTail(k, n, p), lower, 1e-11)).toBe(true);
    expect(isWithin(binomialUpperTail(k, n, p), upper, 1e-11)).toBe(true);
  });

  test('has the two-sided p-value of scipy.stats.binomtest', () => {
    expect(isWithin(exactBinomial(k, n, p, 'two-sided').pValue, two_sided, 1e-10)).toBe(true);
  });
});

/** Every sequence of n trials, with its probability and its number of successes. */
function enumerated(n: number, p: number): readonly { successes: number; probability: number }[] {
  return Array.from({ length: 2 ** n }, (_, bits) => {
    const successes = bits.toString(2).replaceAll('0', '').length;
    return { successes, probability: p ** successes * (1 - p) ** (n - successes) };
  });
}

test('agrees with adding up every sequence of trials', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 9 }), fc.double({ min: 0.03, max: 0.97, noNaN: true }), (n, p) => {
      const sequences = enumerated(n, p);
      const sumWhere = (isCounted: (successes: number) => boolean) =>
        sequences.reduce((sum, each) => sum + (isCounted(each.successes) ? each.probability : 0), 0);
      const chance = (count: number) => sumWhere((successes) => successes === count);
      for (let k = 0; k <= n; k += 1) {
        const limit = chance(k) * (1 + 1e-7);
        expect(exactBinomial(k, n, p, 'greater').pValue).toBeCloseTo(
          sumWhere((each) => each >= k),
          11,
        );
        expect(exactBinomial(k, n, p, 'less').pValue).toBeCloseTo(
          sumWhere((each) => each <= k),
          11,
        );
        expect(exactBinomial(k, n, p, 'two-sided').pValue).toBeCloseTo(
          sumWhere((each) => chance(each) <= limit),
          9,
        );
      }
    }),
    { numRuns: 40 },
  );
});

test('without trials every count from nought is certain', () => {
  expect(binomialUpperTail(0, 0, 1 / 3)).toBe(1);
  expect(binomialUpperTail(1, 0, 1 / 3)).toBe(0);
});

test('refuses more successes than trials', () => {
  expect(() => exactBinomial(3, 2, 0.5, 'greater')).toThrow(RangeError);
  expect(() => exactBinomial(0, 0, 0.5, 'greater')).toThrow(RangeError);
});
