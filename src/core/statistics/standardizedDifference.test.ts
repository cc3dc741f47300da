import fc from 'fast-check';
import { expect, test } from 'vitest';
import { fourBinContrast, standardizedDifference } from './standardizedDifference.ts';

/** Exact variance of a weighted sum of multinomial counts, by adding up every way in which n fall into the cells. */
function enumeratedVariance(n: number, chances: readonly number[], weights: readonly number[]): number {
  let [first, second] = [0, 0];
  const place = (left: number, probability: number, sum: number): void => {
    if (left === 0) {
      first += probability * sum;
      second += probability * sum * sum;
      return;
    }
    chances.forEach((chance, cell) => place(left - 1, probability * chance, sum + weights[cell]!));
  };
  place(n, 1, 0);
  return second - first * first;
}

const counts = fc.array(fc.integer({ min: 0, max: 3 }), { minLength: 5, maxLength: 5 });

test('the multinomial variances are those of every way in which the observations can fall', () => {
  fc.assert(
    fc.property(counts, (given) => {
      const n = given.reduce((sum, count) => sum + count, 0);
      fc.pre(n > 0 && n <= 6);
      const chances = given.map((count) => count / n);
      const [farLeft = 0, left = 0, right = 0, farRight = 0] = given;
      const { zMultinomial, expected } = standardizedDifference({
        previous: left,
        at: right,
        next: farRight,
        n,
      });
      const variance = enumeratedVariance(n, chances, [0, -0.5, 1, -0.5, 0]);
      if (zMultinomial === null) expect(variance).toBeCloseTo(0, 12);
      else expect(zMultinomial * Math.sqrt(variance)).toBeCloseTo(right - expected, 8);
      const contrast = fourBinContrast({ farLeft, left, right, farRight }, n);
      expect(contrast.variance).toBeCloseTo(enumeratedVariance(n, chances, [1 / 3, -1, 1, -1 / 3, 0]), 8);
    }),
    { numRuns: 60 },
  );
});

test('three empty bins have no z', () => {
  expect(standardizedDifference({ previous: 0, at: 0, next: 0, n: 500 })).toEqual({
    expected: 0,
    zIndependent: null,
    zMultinomial: null,
  });
  expect(fourBinContrast({ farLeft: 0, left: 0, right: 0, farRight: 0 }, 500)).toMatchObject({
    z: null,
    pValue: null,
  });
});

test('shows both sides of the published counts at two decimals', () => {
  // Public write-up on filings of 2016 to 2025: -0.79 and +1.95 at a width of .005.
  const left = standardizedDifference({ previous: 409, at: 459, next: 550, n: 16_018 });
  const right = standardizedDifference({ previous: 459, at: 550, next: 533, n: 16_018 });
  expect([left.zIndependent?.toFixed(2), right.zIndependent?.toFixed(2)]).toEqual(['-0.79', '1.95']);
});
