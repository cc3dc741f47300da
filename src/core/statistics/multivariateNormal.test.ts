import fc from 'fast-check';
import { expect, test } from 'vitest';
import scipy from '../../../tests/fixtures/statistics/distributions.json' with { type: 'json' };
import { multivariateNormalCdf } from './multivariateNormal.ts';
import { normalCdf } from './normalDistribution.ts';

test.each(scipy.normal)('below $limits, integrated by scipy', ({ limits, covariance, cdf }) => {
  expect(Math.abs(multivariateNormalCdf(limits, covariance) - cdf)).toBeLessThan(1e-8);
});

test("gives R mvtnorm's probabilities of any violation", () => {
  // R mvtnorm 1.1-3 pmvnorm, to the digits printed.
  const uncorrelated = [
    [0.04, 0],
    [0, 0.09],
  ];
  expect(1 - multivariateNormalCdf([0.2, 0.3], uncorrelated)).toBeCloseTo(0.292139, 6);
});

const correlation = fc.double({ min: -1, max: 1, noNaN: true });
const limit = fc.double({ min: -4, max: 4, noNaN: true });

test('has the exact orthant of two variables, up to full correlation', () => {
  fc.assert(
    fc.property(correlation, (r) => {
      const matrix = [
        [1, r],
        [r, 1],
      ];
      expect(multivariateNormalCdf([0, 0], matrix)).toBeCloseTo(0.25 + Math.asin(r) / (2 * Math.PI), 9);
    }),
  );
});

test('has the exact orthant of three variables', () => {
  fc.assert(
    fc.property(correlation, correlation, correlation, (a, b, c) => {
      fc.pre(1 + 2 * a * b * c - a * a - b * b - c * c > 1e-4);
      const matrix = [
        [1, a, b],
        [a, 1, c],
        [b, c, 1],
      ];
      const wanted = 1 / 8 + (Math.asin(a) + Math.asin(b) + Math.asin(c)) / (4 * Math.PI);
      expect(multivariateNormalCdf([0, 0, 0], matrix)).toBeCloseTo(wanted, 7);
    }),
  );
});

test('fully correlated variables are one variable', () => {
  fc.assert(
    fc.property(limit, limit, limit, (a, b, c) => {
      const ones = [1, 1, 1];
      const wanted = normalCdf(Math.min(a, b));
      expect(
        multivariateNormalCdf(
          [a, b],
          [
            [1, 1],
            [1, 1],
          ],
        ),
      ).toBeCloseTo(wanted, 7);
      expect(multivariateNormalCdf([a, b, c], [ones, ones, ones])).toBeCloseTo(
        normalCdf(Math.min(a, b, c)),
        6,
      );
    }),
  );
});

test('independent variables multiply, and a distant limit falls away', () => {
  fc.assert(
    fc.property(limit, limit, limit, correlation, (a, b, c, r) => {
      const matrix = [
        [1, 0, r],
        [0, 1, 0],
        [r, 0, 1],
      ];
      const pair = [
        [1, r],
        [r, 1],
      ];
      const two = multivariateNormalCdf([a, c], pair);
      expect(multivariateNormalCdf([a, b, c], matrix)).toBeCloseTo(two * normalCdf(b), 8);
      expect(multivariateNormalCdf([a, 40, c], matrix)).toBeCloseTo(two, 8);
    }),
  );
});

test('does not mind in which order the variables come', () => {
  const [a, b, c] = [-0.5, 0.3, 1.2];
  const [ab, ac, bc] = [0.7, -0.2, 0.1];
  const forward = multivariateNormalCdf(
    [a, b, c],
    [
      [1, ab, ac],
      [ab, 1, bc],
      [ac, bc, 1],
    ],
  );
  const backward = multivariateNormalCdf(
    [c, b, a],
    [
      [1, bc, ac],
      [bc, 1, ab],
      [ac, ab, 1],
    ],
  );
  expect(forward).toBeCloseTo(backward, 9);
});

test('refuses what is no covariance of one to three variables', () => {
  const refused: readonly [number[], number[][]][] = [
    [[], []],
    [[0, 0, 0, 0], [1, 2, 3, 4].map(() => [1, 1, 1, 1])],
    [[0], [[0]]],
    [
      [0, 0],
      [
        [1, 1.1],
        [1.1, 1],
      ],
    ],
    [
      [0, 0],
      [
        [1, 0.5],
        [0.4, 1],
      ],
    ],
    [
      [0, 0, 0],
      [
        [1, 0.9, -0.9],
        [0.9, 1, 0.9],
        [-0.9, 0.9, 1],
      ],
    ],
  ];
  for (const [limits, covariance] of refused)
    expect(() => multivariateNormalCdf(limits, covariance)).toThrow(RangeError);
});
