import { expect, test } from 'vitest';
import { integral } from './integral.ts';
import { normalCdf, normalDensity } from './normalDistribution.ts';

test('is exact for polynomials and changes its sign with the direction', () => {
  expect(integral((x) => 40 * x ** 39, 0, 1)).toBeCloseTo(1, 12);
  expect(integral((x) => x ** 3, 2, 0)).toBeCloseTo(-4, 12);
  expect(integral(Math.exp, 1, 1)).toBe(0);
});

test('finds a peak that is a fiftieth of the stretch', () => {
  expect(integral((x) => 7 * normalDensity(7 * (x - 0.31)), -3, 4)).toBeCloseTo(1, 9);
  expect(integral(normalDensity, -8, 0.7)).toBeCloseTo(normalCdf(0.7), 12);
});
