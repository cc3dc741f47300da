import { expect, test } from 'vitest';
import { accrualNoise } from './accrualNoise.ts';
import { totalAccruals } from './netOperatingAssets.ts';
import { realActivities } from './realActivities.ts';
import { smoothing } from './smoothing.ts';

// One invented firm over 18 quarters; expected values from statsmodels 0.13.5.
const cashFlow = [
  0.04577, 0.04486, 0.01241, 0.05791, 0.03709, 0.04142, 0.01649, 0.05605, 0.01278, -0.00558, 0.0585, 0.02147,
  0.03087, 0.06846, 0.05273, 0.04265, 0.0514, 0.01545,
];
const workingCapitalChange = [
  -0.00298, 0.00258, 0.02201, -0.01387, -0.01737, 0.00018, 0.01538, -0.01624, 0.01602, 0.02332, -0.01629,
  0.00284, -0.00276, -0.01105, -0.00052, 0.00358, -0.00645, 0.01245,
];

test('accrual noise is the spread of what cash before, now and after does not explain', () => {
  const noise = accrualNoise({ cashFlow, workingCapitalChange });
  if (!noise.ok) throw new Error(noise.error.kind);
  expect(noise.value.n).toBe(16);
  expect(noise.value.coefficients[2]).toBeCloseTo(-0.533760446224, 9);
  expect(noise.value.residualStandardDeviation).toBeCloseTo(0.007554809106, 10);
  expect(noise.value.residualSpread).toBeCloseTo(0.006542656607, 10);
});

test('noise needs twelve usable quarters', () => {
  const first = (count: number) => ({
    cashFlow: cashFlow.slice(0, count),
    workingCapitalChange: workingCapitalChange.slice(0, count),
  });
  expect(accrualNoise(first(14)).ok).toBe(true);
  expect(accrualNoise(first(13))).toEqual({
    ok: false,
    error: { kind: 'too-few-points', needed: 12, given: 11 },
  });
});

const prior = {
  currentAssets: 46,
  cash: 8,
  totalAssets: 96,
  longTermInvestments: 0,
  currentLiabilities: 26,
  shortTermDebt: 5,
  longTermDebt: 30,
  totalLiabilities: 58,
};
const closing = {
  currentAssets: 56.5,
  cash: 7,
  totalAssets: 110,
  longTermInvestments: 0,
  currentLiabilities: 28.7,
  shortTermDebt: 6,
  longTermDebt: 36.8,
  totalLiabilities: 67.5,
};

test('without acquisitions net operating assets change by net income less operating and investing cash', () => {
  // The firm earned 5.5, had 1.7 of operating and -9.5 of investing cash.
  expect(totalAccruals(prior, closing).netOperatingAssetsChange).toBeCloseTo(5.5 - 1.7 + 9.5, 10);
  expect(totalAccruals(prior, closing).scaled).toBeCloseTo(5.5 / 103, 10);
});

test('cash spent on nothing but growth leaves no residual in real activities', () => {
  const firms = Array.from({ length: 20 }, (_, k) => {
    const lagAssets = 50 + 4 * k;
    const sales = 60 + ((k * 17) % 29);
    const salesChange = ((k * 11) % 13) - 5;
    return {
      lagAssets,
      sales,
      salesChange,
      salesChangePrior: ((k * 7) % 9) - 4,
      cashFromOperations: 2 + 0.05 * sales + 0.1 * salesChange,
      productionCosts: 0.7 * sales + (k === 4 ? 9 : 0),
      discretionaryExpenses: 1 + 0.1 * (sales - salesChange),
    };
  });
  const fits = realActivities(firms);
  if (!fits.ok) throw new Error(fits.error.kind);
  const { cashFlow: cash, production, discretionary } = fits.value;
  [0, 2, 0.05, 0.1].forEach((value, k) => expect(cash.coefficients[k]).toBeCloseTo(value, 10));
  [0, 1, 0.1].forEach((value, k) => expect(discretionary.coefficients[k]).toBeCloseTo(value, 10));
  expect(production.residuals.indexOf(Math.max(...production.residuals))).toBe(4);
  expect(realActivities(firms.slice(0, 4)).ok).toBe(false);
});

test('income that never moves beside cash that does is as smooth as can be', () => {
  const cash = [3, 7, 1, 9, 4, 6];
  const smooth = smoothing([5, 5, 5, 5, 5, 5], cash);
  if (!smooth.ok) throw new Error(smooth.error.kind);
  expect(smooth.value.spreadRatio).toBe(0);
  expect(smooth.value.changeCorrelation).toBeCloseTo(-1, 12);
  expect(smooth.value.medianSizeRatio).toBeCloseTo((2 / 7 + 4 / 9) / 2, 12);
  expect(smoothing([5, 5, 5], [1, 2, 3])).toMatchObject({ ok: false, error: { kind: 'too-few-points' } });
  expect(smoothing([5, 6, 5, 6], [2, 2, 2, 2])).toEqual({ ok: false, error: { kind: 'no-spread' } });
});
