import { expect, test } from 'vitest';
import { leastSquares } from './leastSquares.ts';
import { LONGLEY, NORRIS, WAMPLER, type CertifiedRegression } from './nistStrd.fixture.ts';

/** What a double holds; certified values have fifteen digits themselves. */
const MOST_DIGITS = 15;

/** Digits that agree (McCullough 1998, The American Statistician 52): relative, absolute where nought is certified. */
function digitsOf(got: number, certified: number): number {
  const error = Math.abs(got - certified) / (certified === 0 ? 1 : Math.abs(certified));
  return error === 0 ? MOST_DIGITS : Math.min(MOST_DIGITS, Math.max(0, -Math.log10(error)));
}

const fewest = (got: readonly number[], certified: readonly number[]): number =>
  Math.min(...certified.map((value, k) => digitsOf(got[k]!, value)));

interface Floor {
  readonly coefficients: number;
  readonly errors: number;
}

/** Floors are a digit below what this machine reaches; a method through X'X would lose half of them. */
test.each<[string, CertifiedRegression, Floor]>([
  ['Norris', NORRIS, { coefficients: 11, errors: 11 }],
  ['Longley', LONGLEY, { coefficients: 10, errors: 11 }],
  ['Wampler 1', WAMPLER[1], { coefficients: 8, errors: 8 }],
  ['Wampler 2', WAMPLER[2], { coefficients: 12, errors: 13 }],
  ['Wampler 3', WAMPLER[3], { coefficients: 8, errors: 12 }],
  ['Wampler 4', WAMPLER[4], { coefficients: 7, errors: 12 }],
  ['Wampler 5', WAMPLER[5], { coefficients: 5, errors: 12 }],
])('agrees with the certified values of NIST StRD %s', (name, { response, columns, certified }, floor) => {
  const fit = leastSquares(response, columns, { constant: true });
  if (!fit.ok) throw new Error(fit.error.kind);
  const { coefficients, standardErrors, residualStandardDeviation, rSquared } = fit.value;
  const reached = {
    coefficients: fewest(coefficients, certified.coefficients),
    errors: fewest(standardErrors, certified.standardErrors),
    deviation: digitsOf(residualStandardDeviation, certified.residualStandardDeviation),
    rSquared: digitsOf(rSquared ?? Number.NaN, certified.rSquared),
  };
  console.log(
    `${name}: digits of coefficients ${reached.coefficients.toFixed(1)}, standard errors ${reached.errors.toFixed(1)}, residual deviation ${reached.deviation.toFixed(1)}, R² ${reached.rSquared.toFixed(1)}`,
  );
  expect(reached.coefficients).toBeGreaterThanOrEqual(floor.coefficients);
  expect(reached.errors).toBeGreaterThanOrEqual(floor.errors);
  expect(reached.deviation).toBeGreaterThanOrEqual(floor.errors);
  expect(reached.rSquared).toBeGreaterThanOrEqual(11);
});
