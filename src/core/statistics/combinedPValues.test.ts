import fc from 'fast-check';
import { expect, test } from 'vitest';
import { fisherCombination, stoufferCombination } from './combinedPValues.ts';

const given = [0.03, 0.2, 0.008];

test('gives the combinations of scipy.stats.combine_pvalues 1.17.1', () => {
  expect(fisherCombination(given).pValue).toBeCloseTo(0.0028986698750829445, 12);
  expect(stoufferCombination(given).statistic).toBeCloseTo(2.962575, 6);
  expect(stoufferCombination(given).pValue).toBeCloseTo(0.0015254, 7);
});

test('leaves a single p-value as it is', () => {
  fc.assert(
    fc.property(fc.double({ min: 1e-6, max: 1, noNaN: true }), (p) => {
      expect(fisherCombination([p]).pValue).toBeCloseTo(p, 10);
      expect(stoufferCombination([p]).pValue).toBeCloseTo(p, 10);
    }),
  );
});

test('fully correlated p-values are one p-value', () => {
  expect(stoufferCombination([0.03, 0.03, 0.03], [1, 1, 1], 1).pValue).toBeCloseTo(0.03, 12);
});

test('widens by twice the products of the weights times the correlation', () => {
  const [plain, correlated] = [0, 0.3].map((rho) => stoufferCombination(given, [2, 1, 1], rho).statistic);
  // Weights 2, 1, 1: squares 6, products of pairs 2 + 2 + 1 = 5, by hand.
  expect(correlated).toBeCloseTo(plain! * Math.sqrt(6 / (6 + 2 * 5 * 0.3)), 12);
});

test('refuses what is no p-value', () => {
  expect(() => fisherCombination([0, 0.5])).toThrow(RangeError);
  expect(() => stoufferCombination([1.01])).toThrow(RangeError);
  expect(() => stoufferCombination([0.5], [1, 2])).toThrow(RangeError);
});
