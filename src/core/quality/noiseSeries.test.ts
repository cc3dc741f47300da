import { expect, test } from 'vitest';
import { accrualNoise } from '../accruals/accrualNoise.ts';
import { addMonthsToMonthEnd, plainDate } from '../calendar/plainDate.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import { bookOf } from '../statements/statementBook.ts';
import { noiseSeriesOf } from './noiseSeries.ts';

// The firm of reference vector q-031: eighteen quarters scaled by average assets.
const CASH = [
  0.04577, 0.04486, 0.01241, 0.05791, 0.03709, 0.04142, 0.01649, 0.05605, 0.01278, -0.00558, 0.0585, 0.02147,
  0.03087, 0.06846, 0.05273, 0.04265, 0.0514, 0.01545,
];
const WORKING_CAPITAL = [
  -0.00298, 0.00258, 0.02201, -0.01387, -0.01737, 0.00018, 0.01538, -0.01624, 0.01602, 0.02332, -0.01629,
  0.00284, -0.00276, -0.01105, -0.00052, 0.00358, -0.00645, 0.01245,
];
const ASSETS = 1_000_000;
const LAST = plainDate('2025-12-31');

/** Quarters that differ from those of a year before by the vector's figures, assets the same throughout. */
function quarters(lastOnly = CASH.length) {
  const count = CASH.length + 4;
  const [cash, accruals] = [CASH, WORKING_CAPITAL].map((series) => {
    const flows = [0, 0, 0, 0];
    for (const change of series) flows.push(flows.at(-4)! + Math.round(change * ASSETS));
    return flows;
  }) as [number[], number[]];
  return Array.from({ length: count }, (_, k) => k)
    .slice(-(lastOnly + 4))
    .flatMap((k) => {
      const periodEnd = addMonthsToMonthEnd(LAST, -3 * (count - 1 - k));
      const flows = {
        revenue: ASSETS,
        cfo: cash[k],
        depreciation: 1000,
        net_income: accruals[k]! + cash[k]! - 1000,
      };
      return [
        buildStatement(periodEnd, 3, flows),
        buildStatement(periodEnd, 0, { total_assets: ASSETS, ppe_gross: 400_000 }),
      ];
    });
}

test('noise is fitted on quarters against the same quarters of the year before', () => {
  const noise = accrualNoise(noiseSeriesOf(bookOf(quarters(), 12))(LAST));
  const plain = noiseSeriesOf(bookOf(quarters(), 12))(LAST);
  const { cashFlow, workingCapitalChange } = plain;
  const fitted = accrualNoise({ cashFlow, workingCapitalChange });
  if (!fitted.ok) throw new Error(fitted.error.kind);
  expect(fitted.value.n).toBe(16);
  // statsmodels 0.13.5, reference vector q-031.
  expect(fitted.value.residualStandardDeviation).toBeCloseTo(0.007554809106, 9);
  // Revenue and plant that never move leave nothing for the controls to explain.
  expect(noise).toMatchObject({ ok: false, error: { kind: 'rank-deficient' } });
});

test('fourteen quarters have twelve with one before and after, thirteen have too few', () => {
  const plainOf = (count: number) => {
    const { cashFlow, workingCapitalChange } = noiseSeriesOf(bookOf(quarters(count), 12))(LAST);
    return accrualNoise({ cashFlow, workingCapitalChange });
  };
  expect(plainOf(14).ok).toBe(true);
  expect(plainOf(13)).toEqual({ ok: false, error: { kind: 'too-few-points', needed: 12, given: 11 } });
});

test('a quarter that does not tie is a gap and costs its neighbours', () => {
  const book = bookOf(
    quarters().map((statement) =>
      statement.periodEnd === '2025-12-31' ? { ...statement, tie: 'does-not-tie' as const } : statement,
    ),
    12,
  );
  const { cashFlow } = noiseSeriesOf(book)(LAST);
  expect(cashFlow.at(-1)).toBeNull();
  expect(cashFlow.at(-2)).toBeCloseTo(0.0514, 12);
});

test('a quarter is not held against one under another presentation of cash flows', () => {
  const book = bookOf(
    quarters().map((statement) =>
      statement.periodEnd > '2025-01-01' ? { ...statement, framework: 'IFRS 18' } : statement,
    ),
    12,
  );
  expect(noiseSeriesOf(book)(LAST).cashFlow.slice(-5)).toEqual([expect.any(Number), null, null, null, null]);
});
