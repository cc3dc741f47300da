import { describe, expect, test } from 'vitest';
import type { PlainDate } from '../calendar/plainDate.ts';
import { PLAIN_DEFINITION } from '../measures/definition.ts';
import { decimal } from '../money/decimal.ts';
import { POLICY_VERSION_1 as policy } from '../policy.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import { bookOf } from '../statements/statementBook.ts';
import { buildCovenant, buildLevel } from './covenant.fixture.ts';
import type { Covenant } from './covenant.ts';
import { testCovenant } from './testCovenant.ts';

const run = (covenant: Covenant, statements: readonly Statement[], on: PlainDate) =>
  testCovenant(covenant, bookOf(statements, 12), on, policy, '2026-06-30');

describe('capital expenditure', () => {
  const limit = buildCovenant({
    name: 'Capital expenditure',
    measure: 'capital-expenditure',
    firstTestOn: '2024-12-31',
    levels: [buildLevel('2024-01-01', null, '6')],
    definition: { ...PLAIN_DEFINITION, capexCarriedShare: decimal('0.5') },
  });
  const spending = (year: '2024' | '2025', amount: number) =>
    buildStatement(`${year}-12-31`, 12, { capex: -amount });

  // cov-062: 6.8 against 6 and half of the 2 that last year left.
  test('is kept with half of what last year left unused', () => {
    const tested = run(limit, [spending('2024', 4), spending('2025', 6.8)], '2025-12-31');
    expect(tested).toMatchObject({ outcome: 'met, thin', tested: decimal('6.8'), level: decimal(7) });
    expect(tested.headroom.absolute?.toFixed()).toBe('0.2');
    expect(tested.bridge.slice(-3).map(({ label, amount }) => `${label} ${amount.toFixed()}`)).toEqual([
      'Limit of the year 6',
      'Carried over from the year to 31 Dec 2024 1',
      'Limit with carry-over 7',
    ]);
  });

  test('carries nothing over where last year was overspent, and nothing without a limit of that year', () => {
    const over = run(limit, [spending('2024', 9), spending('2025', 6.8)], '2025-12-31');
    expect(over).toMatchObject({ outcome: 'not met', level: decimal(6) });
    const first = run(limit, [spending('2024', 5)], '2024-12-31');
    expect(first).toMatchObject({ outcome: 'met', level: decimal(6) });
  });

  test('cannot be tested where last year’s spending is not there', () => {
    const tested = run(
      limit,
      [buildStatement('2024-12-31', 12, { revenue: 1 }), spending('2025', 5)],
      '2025-12-31',
    );
    expect(tested).toMatchObject({
      outcome: 'cannot be tested',
      reason: 'missing: Capital expenditure of 12 months to 31 Dec 2024',
      level: decimal(6),
    });
  });

  test('is held against a later limit of its own year, never against the next year’s', () => {
    const later = (from: '2025-07-01' | '2025-12-31' | '2026-01-01') => {
      const levels = [buildLevel('2024-01-01', null, '6'), buildLevel(from, null, '4')];
      return run({ ...limit, levels }, [spending('2024', 6), soFar], '2025-06-30').againstLaterLevels;
    };
    const soFar = buildStatement('2025-06-30', 6, { capex: -5 });
    expect(later('2025-07-01')).toMatchObject([{ from: '2025-07-01', outcome: 'not met' }]);
    expect(later('2025-12-31')).toHaveLength(1);
    expect(later('2026-01-01')).toEqual([]);
  });

  // Own arithmetic.
  test('of a year that runs is what was spent so far, with costs that were capitalised', () => {
    const soFar = buildStatement('2025-09-30', 9, { capex: -3, capitalised_costs_paid: -1 });
    const tested = run(limit, [spending('2024', 4), soFar], '2025-09-30');
    expect(tested.tested?.toFixed()).toBe('4');
  });
});

describe('a minimum net worth that rises with profits', () => {
  const minimum = buildCovenant({
    name: 'Tangible net worth',
    measure: 'tangible-net-worth',
    operator: '>=',
    firstTestOn: '2023-12-31',
    levels: [buildLevel('2023-01-01', null, '25')],
    definition: { ...PLAIN_DEFINITION, profitShareInNetWorth: decimal('0.5') },
  });
  const years = [6, -4, 2].map((net_income, k) =>
    buildStatement(`${2023 + k}-12-31` as PlainDate, 12, { net_income }),
  );
  const worth = (equity: number, date: PlainDate = '2025-12-31') => buildStatement(date, 0, { equity });

  // cov-059: 25 + half of 6 + half of 2; the loss of 4 takes nothing away.
  test.each([
    [29, 'met, thin'],
    [28.99, 'not met'],
  ] as const)('with net worth of %s is %s', (equity, outcome) => {
    const tested = run(minimum, [...years, worth(equity)], '2025-12-31');
    expect(tested).toMatchObject({ outcome, level: decimal(29), reason: null });
  });

  test('takes up no year that has not ended, and none from before its base was agreed', () => {
    expect(run(minimum, [...years, worth(40, '2025-09-30')], '2025-09-30').level?.toFixed()).toBe('28');
    const later = { ...minimum, levels: [buildLevel('2024-06-01', null, '25')] };
    expect(run(later, [...years, worth(40)], '2025-12-31').level?.toFixed()).toBe('26');
  });

  test('cannot be tested where the profit of a year is not there', () => {
    const tested = run(minimum, [...years.slice(1), worth(40)], '2025-12-31');
    expect(tested.outcome).toBe('cannot be tested');
    expect(tested.reason).toContain('31 Dec 2023');
  });
});
