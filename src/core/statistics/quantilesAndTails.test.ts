import { expect, test } from 'vitest';
import scipy from '../../../tests/fixtures/statistics/distributions.json' with { type: 'json' };
import { chiSquaredUpperTail } from './chiSquared.ts';
import { normalCdf } from './normalDistribution.ts';
import { normalQuantile } from './normalQuantile.ts';

/** Within a relative tolerance, down to where a double has no digits left. */
const isWithin = (actual: number, wanted: number, relative: number): boolean =>
  Math.abs(actual - wanted) <= relative * Math.abs(wanted) + Number.MIN_VALUE;

test.each(scipy.chi_squared)(
  'chi-squared above $x with $df degrees of freedom, scipy',
  ({ x, df, upper }) => {
    expect(Math.abs(chiSquaredUpperTail(x, df) - upper)).toBeLessThan(1e-14);
  },
);

test.each(scipy.normal_quantile)('the normal quantile at $p, scipy', ({ p, z }) => {
  expect(z === 0 ? normalQuantile(p) === 0 : isWithin(normalQuantile(p), z, 1e-9)).toBe(true);
});

test('the normal quantile is infinite at nought and one, and keeps its sign beyond the package', () => {
  expect([normalQuantile(0), normalQuantile(1)]).toEqual([-Infinity, Infinity]);
  expect(normalCdf(normalQuantile(1e-300)) / 1e-300).toBeCloseTo(1, 9);
});
