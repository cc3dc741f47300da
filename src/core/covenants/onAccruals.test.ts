/** Tests on other earnings: methods.md B7. Ids are those of tests/reference/covenant-vectors.json. */
import { describe, expect, test } from 'vitest';
import type { MeasureCode } from '../measures/measure.ts';
import { decimal } from '../money/decimal.ts';
import { POLICY_VERSION_1 as policy } from '../policy.ts';
import { openBook } from '../statements/statementBook.ts';
import { buildAddBack, buildCovenant, buildLevel, buildYear } from './covenant.fixture.ts';
import type { Covenant } from './covenant.ts';
import { withAccrualsTakenOut } from './onAccruals.ts';
import { deviationOfChanges } from './roomInDeviations.ts';
import { headroomCovenants, smallestHeadroomsAhead, tightestAhead } from './smallestHeadroom.ts';
import { testCovenant } from './testCovenant.ts';

const on = '2025-12-31';
const asOf = '2026-03-31';
const testOf = (covenant: Covenant, figures: { ebitda: number; debt: number; cash: number }) =>
  testCovenant(
    covenant,
    openBook(buildYear(on, figures), { scope: covenant.scope, asOf }, 12),
    on,
    policy,
    asOf,
  );
const readings = (covenant: Covenant, unexplained: number, workingCapital = 0) =>
  withAccrualsTakenOut(testOf(covenant, { ebitda: 11, debt: 42, cash: 0 }), covenant, {
    unexplained,
    workingCapital,
  }).counterfactuals.map(({ kind, ratio, outcome }) => [kind, ratio?.toFixed(10), outcome]);

describe('a test on other earnings', () => {
  const addBacks = [buildAddBack(on, 2)];

  test('is computed without add-backs, without unexplained accruals, without either and on cash (cov-092)', () => {
    expect(readings(buildCovenant({ addBacks }), 1.4, 0.5)).toEqual([
      ['without add-backs', '3.8181818182', 'not met'],
      ['without unexplained accruals', '3.6206896552', 'not met'],
      ['without either', '4.3750000000', 'not met'],
      ['on a cash basis', '3.3600000000', 'met'],
    ]);
  });

  test('never has a negative residual added back (cov-093), and says nothing of either without add-backs', () => {
    expect(readings(buildCovenant({ levels: [buildLevel('2025-01-01', null, '4')] }), -1.4, -2)).toEqual([
      ['without unexplained accruals', '3.8181818182', 'met'],
      ['on a cash basis', '3.8181818182', 'met'],
    ]);
  });

  test('needs half of the add-backs (cov-094)', () => {
    const [without] = testOf(buildCovenant({ addBacks }), { ebitda: 11, debt: 42, cash: 0 }).counterfactuals;
    expect(without?.breakEvenShare?.toFixed()).toBe('0.5');
  });

  test.each(['current-ratio', 'minimum-liquidity'] satisfies MeasureCode[])(
    '%s has no earnings and does not move',
    (measure) => {
      const covenant = buildCovenant({
        measure,
        operator: '>=',
        levels: [buildLevel('2025-01-01', null, '1')],
      });
      expect(readings(covenant, 1.4)).toEqual([]);
    },
  );
});

test('the smallest headroom is told at each step agreed for later, over all live tests', () => {
  const steps = (
    id: number,
    first: string,
    later: readonly (readonly ['2026-06-01' | '2026-09-01', string])[],
  ) =>
    buildCovenant({
      id,
      firstTestOn: on,
      levels: [
        buildLevel('2025-01-01', '2026-05-31', first),
        ...later.map(([from, level]) => buildLevel(from, null, level)),
      ],
    });
  const covenants = [steps(1, '4', [['2026-09-01', '3.75']]), steps(2, '5', [['2026-06-01', '3.9']])];
  const tests = covenants.map((covenant) => testOf(covenant, { ebitda: 10, debt: 35, cash: 0 }));
  const ahead = smallestHeadroomsAhead(tests, [1, 2]);
  // 1 - 35/39 = 0.1026 at the first step, against 0.125 today; 1 - 35/37.5 = 0.0667 at the second.
  expect(ahead.map(({ from, covenantId, mayFall }) => [from, covenantId, mayFall.toFixed(4)])).toEqual([
    ['2026-06-01', 2, '0.1026'],
    ['2026-09-01', 1, '0.0667'],
  ]);
  expect(tightestAhead(ahead)?.from).toBe('2026-09-01');
});

test('our own triggers count towards a borrower’s headroom only where it has no covenant', () => {
  const covenant = buildCovenant();
  expect(headroomCovenants([covenant, { ...covenant, id: 2, isOurs: true }])).toEqual([1]);
  expect(headroomCovenants([{ ...covenant, id: 2, isOurs: true }])).toEqual([2]);
});

test('the deviation of changes is that of a sample: numpy.std(numpy.diff([4, 7, 5, 9]), ddof=1) = 3.2145502537', () => {
  const values = [4, 7, 5, 9].map((value) => decimal(value));
  expect(deviationOfChanges(values).toFixed(10)).toBe('3.2145502537');
});
