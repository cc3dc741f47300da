import { expect, test } from 'vitest';
import { normalCdf } from './normalDistribution.ts';

test.each([
  [0, 0.5],
  [1, 0.8413447460685429],
  [-1.96, 0.024997895148220435],
  [2.999, 0.9986456634662729],
  [3.001, 0.998654527174915],
  [-3.001, 0.0013454728250849653],
  [-5, 2.866515718791933e-7],
  [-10, 7.61985302416047e-24],
  [-40, 0],
])('the share of a standard normal below %d', (z, share) => {
  // scipy.stats.norm.cdf
  expect(Math.abs(normalCdf(z) - share)).toBeLessThanOrEqual(1e-13 * share);
});
