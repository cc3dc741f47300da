import fc from 'fast-check';
import { expect, test } from 'vitest';
import scipy from '../../../tests/fixtures/statistics/distributions.json' with { type: 'json' };
import { ADJUSTMENTS, adjustedPValues, nullShare } from './adjustedPValues.ts';

const { p: published, bh, by } = scipy.adjusted;
const rejected = (adjusted: readonly number[]) => adjusted.filter((p) => p <= 0.05).length;

test('rejects of the fifteen p-values of Benjamini & Hochberg (1995) as many as R does', () => {
  // R 4.2.2 stats::p.adjust: 4 by BH, 3 by BY, 3 by Holm, 3 by Bonferroni.
  expect(ADJUSTMENTS.map((adjustment) => rejected(adjustedPValues(published, adjustment)))).toEqual([
    3, 3, 4, 3,
  ]);
});

test('gives the adjusted values of scipy.stats.false_discovery_control', () => {
  adjustedPValues(published, 'benjamini-hochberg').forEach((p, k) => expect(p).toBeCloseTo(bh[k]!, 12));
  adjustedPValues(published, 'benjamini-yekutieli').forEach((p, k) => expect(p).toBeCloseTo(by[k]!, 12));
});

test('steps down by Holm, by hand', () => {
  // Sorted .01 .02 .04 times 3, 2, 1 is .03 .04 .04, the largest so far.
  expect(adjustedPValues([0.04, 0.01, 0.02], 'holm')).toEqual([0.04, 0.03, 0.04]);
});

test('keeps the order, never goes below the p-value or above 1, and does not mind in which order they come', () => {
  const sample = fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 1, maxLength: 12 });
  fc.assert(
    fc.property(sample, fc.constantFrom(...ADJUSTMENTS), (pValues, adjustment) => {
      const adjusted = adjustedPValues(pValues, adjustment);
      pValues.forEach((p, k) => {
        expect(adjusted[k]!).toBeGreaterThanOrEqual(p - 1e-15);
        expect(adjusted[k]!).toBeLessThanOrEqual(1);
        pValues.forEach((other, j) => {
          if (p < other) expect(adjusted[k]!).toBeLessThanOrEqual(adjusted[j]!);
        });
      });
      expect(adjustedPValues([...pValues].reverse(), adjustment)).toEqual([...adjusted].reverse());
    }),
  );
});

test('nothing to adjust is nothing', () => {
  expect(adjustedPValues([], 'holm')).toEqual([]);
});

test('counts the share without an effect from what lies above a half', () => {
  expect(nullShare(published, 0.5)).toBeCloseTo(4 / 7.5, 12); // four of fifteen, by hand
  expect(nullShare([0.9, 0.8], 0.5)).toBe(1);
  expect(() => nullShare([], 0.5)).toThrow(RangeError);
});
