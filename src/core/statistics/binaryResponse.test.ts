import { expect, test } from 'vitest';
import { binaryResponse } from './binaryResponse.ts';

// Spector & Mazzeo (1980) as printed in Greene: grade point average, test score, new teaching method, improved.
const ROWS = [
  [2.66, 20, 0, 0],
  [2.89, 22, 0, 0],
  [3.28, 24, 0, 0],
  [2.92, 12, 0, 0],
  [4, 21, 0, 1],
  [2.86, 17, 0, 0],
  [2.76, 17, 0, 0],
  [2.87, 21, 0, 0],
  [3.03, 25, 0, 0],
  [3.92, 29, 0, 1],
  [2.63, 20, 0, 0],
  [3.32, 23, 0, 0],
  [3.57, 23, 0, 0],
  [3.26, 25, 0, 1],
  [3.53, 26, 0, 0],
  [2.74, 19, 0, 0],
  [2.75, 25, 0, 0],
  [2.83, 19, 0, 0],
  [3.12, 23, 1, 0],
  [3.16, 25, 1, 1],
  [2.06, 22, 1, 0],
  [3.62, 28, 1, 1],
  [2.89, 14, 1, 0],
  [3.51, 26, 1, 0],
  [3.54, 24, 1, 1],
  [2.83, 27, 1, 1],
  [3.39, 17, 1, 1],
  [2.67, 24, 1, 0],
  [3.65, 21, 1, 1],
  [4, 23, 1, 1],
  [3.1, 21, 1, 0],
  [2.39, 19, 1, 1],
] as const;
const columns = [0, 1, 2].map((k) => ROWS.map((row) => row[k]!));
const isYes = ROWS.map((row) => row[3] === 1);

test('agrees with the probit that Greene prints for the Spector & Mazzeo data', () => {
  const fit = binaryResponse('probit', isYes, columns);
  expect(fit.ok && fit.value.coefficients.map((value) => Number(value.toFixed(3)))).toEqual([
    -7.452, 1.626, 0.052, 1.426,
  ]);
});

test('agrees with the logit of statsmodels 0.13.5', () => {
  const fit = binaryResponse('logit', isYes, columns);
  const expected = [-13.021346858116, 2.826112594889, 0.095157661318, 2.378687655093];
  expected.forEach((value, k) => expect(fit.ok && fit.value.coefficients[k]).toBeCloseTo(value, 8));
});

test('has no answer where the outcomes are perfectly separated', () => {
  const fit = binaryResponse('logit', [false, false, false, true, true, true], [[1, 2, 3, 4, 5, 6]]);
  expect(fit.ok).toBe(false);
});
