import { describe, expect, test } from 'vitest';
import { decimal } from '../money/decimal.ts';
import { POLICY_VERSION_1 as policy } from '../policy.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import { bookOf, openBook } from '../statements/statementBook.ts';
import { buildAddBack, buildCovenant, buildLevel, buildYear } from './covenant.fixture.ts';
import type { Covenant } from './covenant.ts';
import { latestLiveTest } from './latestLiveTest.ts';
import { levelInForce, testDates } from './levels.ts';
import { testCovenant } from './testCovenant.ts';

const on = '2025-12-31';
const run = (covenant: Covenant, statements: readonly Statement[], asOf = '2026-03-31' as const) =>
  testCovenant(covenant, openBook(statements, { scope: covenant.scope, asOf }, 12), on, policy, asOf);

describe('net leverage from statements', () => {
  test('is debt less cash over EBITDA of twelve months, with its bridge and its cells', () => {
    const tested = run(buildCovenant(), buildYear(on, { ebitda: 12, debt: 40, cash: 6 }));
    expect(tested).toMatchObject({ outcome: 'met', justPassing: false, missing: [] });
    expect(tested.tested?.toFixed(4)).toBe('2.8333');
    expect(tested.headroom.mayFall?.toFixed(4)).toBe('0.1905');
    const added = tested.bridge.map(({ label, amount }) => `${label} ${amount.toFixed()}`);
    expect(added).toContain('EBITDA 12');
    expect(added).toContain('Net debt 34');
    expect(tested.inputs.map(({ line, sign }) => `${sign > 0 ? '+' : '-'}${line}`)).toEqual([
      '+senior_debt',
      '-cash',
      '+net_income',
      '+income_tax',
      '+interest_expense',
      '+depreciation',
      '+amortisation',
    ]);
  });

  test('nets cash only up to the cap and counts leases only where the definition does', () => {
    const statements = [
      ...buildYear(on, { ebitda: 12, debt: 40, cash: 6 }).slice(0, 1),
      buildStatement(on, 0, { senior_debt: 40, lease_liabilities: 9, cash: 6 }),
    ];
    const definition = { ...buildCovenant().definition, cashNettingCap: decimal(5), leasesInDebt: true };
    expect(run(buildCovenant({ definition }), statements).numerator?.toFixed()).toBe('44');
    expect(run(buildCovenant(), statements).numerator?.toFixed()).toBe('34');
  });

  test('is missing a debt line that the borrower carried before and leaves out', () => {
    const statements = [
      buildStatement('2024-12-31', 0, { senior_debt: 40, junior_debt: 8, cash: 6 }),
      ...buildYear(on, { ebitda: 12, debt: 40, cash: 6 }),
    ];
    const tested = run(buildCovenant(), statements);
    expect(tested.outcome).toBe('cannot be tested');
    expect(tested.reason).toBe('missing: Junior debt, long-term on 31 Dec 2025');
  });
});

test('a debt line that the borrower takes up later changes no test before it', () => {
  const statements = [
    ...buildYear(on, { ebitda: 12, debt: 40, cash: 6 }),
    buildStatement(
      '2026-03-31',
      0,
      { senior_debt: 40, junior_debt: 8, cash: 6 },
      { receivedOn: '2026-03-31' },
    ),
  ];
  expect(run(buildCovenant(), statements).outcome).toBe('met');
});

test('figures of two accounting frameworks, or of 53 weeks, are tested and marked', () => {
  const [year, sheet] = buildYear(on, { ebitda: 12, debt: 40, cash: 6 }) as [Statement, Statement];
  const underOther = [year, { ...sheet, framework: 'US GAAP' }];
  expect(run(buildCovenant(), underOther).reason).toBe('rests on two accounting frameworks: IFRS, US GAAP');
  const long = { ...year, periodStart: '2024-12-26' as const };
  expect(run(buildCovenant(), [long, sheet]).reason).toBe('rests on 53 weeks (371 days)');
  expect(run(buildCovenant(), [{ ...year, periodStart: '2024-12-31' as const }, sheet]).reason).toBeNull();
});

describe('outcomes that are no result', () => {
  test('figures that have not come are awaited, never met', () => {
    expect(run(buildCovenant(), []).outcome).toBe('awaiting figures');
    const onlyIncome = buildYear(on, { ebitda: 12, debt: 40, cash: 6 }).slice(0, 1);
    expect(run(buildCovenant(), onlyIncome).outcome).toBe('awaiting figures');
  });

  test('figures that came after the day are not there', () => {
    const statements = buildYear(on, { ebitda: 12, debt: 40, cash: 6 }, { receivedOn: '2026-02-15' });
    expect(run(buildCovenant(), statements, '2026-02-14' as '2026-03-31').outcome).toBe('awaiting figures');
    expect(run(buildCovenant(), statements, '2026-02-15' as '2026-03-31').outcome).toBe('met');
  });

  test('an older gap cannot be tested and is named', () => {
    const statements = [
      buildStatement('2025-12-31', 3, { net_income: 1, income_tax: 1, interest_expense: 1, depreciation: 1 }),
      buildStatement(on, 0, { senior_debt: 40, cash: 6 }),
    ];
    const tested = run(buildCovenant(), statements);
    expect(tested.outcome).toBe('cannot be tested');
    expect(tested.reason).toContain('figures of 3 months to 31 Mar 2025');
  });

  test('a holiday, no level and a day before the first test are not tested; the ratio is shown', () => {
    const statements = buildYear(on, { ebitda: 12, debt: 40, cash: 6 });
    const holiday = run(buildCovenant({ levels: [buildLevel('2025-01-01', null, null)] }), statements);
    expect(holiday).toMatchObject({ outcome: 'not tested', reason: 'covenant holiday on 31 Dec 2025' });
    expect(holiday.tested?.toFixed(2)).toBe('2.83');
    expect(run(buildCovenant({ levels: [buildLevel('2026-01-01', null, '3')] }), statements).reason).toBe(
      'no level in force on 31 Dec 2025',
    );
    expect(run(buildCovenant({ firstTestOn: '2026-01-01' }), statements).outcome).toBe('not tested');
    expect(run(buildCovenant({ firstTestOn: on }), statements).outcome).toBe('met');
  });

  test('figures in another currency than the covenant cannot be tested without a rate', () => {
    const statements = buildYear(on, { ebitda: 12, debt: 40, cash: 6 }, { currency: 'USD' });
    expect(run(buildCovenant(), statements).reason).toBe(
      'figures in USD, covenant in EUR: no closing rate of USD in EUR on 31 Dec 2025 is recorded',
    );
  });

  test('figures that do not tie are tested and marked', () => {
    const statements = buildYear(on, { ebitda: 12, debt: 40, cash: 6 }, { tie: 'does-not-tie' });
    expect(run(buildCovenant(), statements)).toMatchObject({
      outcome: 'met',
      reason: 'rests on figures that do not tie',
    });
  });
});

test('what only the agreement’s rounding decides is said', () => {
  const statements = buildYear(on, { ebitda: 12, debt: 42.048, cash: 0 });
  expect(run(buildCovenant({ roundingPlaces: 2 }), statements)).toMatchObject({
    outcome: 'met, thin',
    justPassing: true,
    reason: 'at the 2 decimal places that the agreement rounds to',
  });
  expect(run(buildCovenant(), statements).outcome).toBe('not met');
});

describe('thin and just passing', () => {
  // Net debt over EBITDA of 10 against 3.5x: 31.5 leaves exactly 10 %, 34.3 leaves exactly 2 % of the level.
  test.each([
    [31.49, 'met', false],
    [31.5, 'met', false],
    [31.51, 'met, thin', false],
    [34.3, 'met, thin', false],
    [34.31, 'met, thin', true],
    [35, 'met, thin', true],
    [35.01, 'not met', false],
  ] as const)('net debt of %s over 10 is %s, just passing %s', (debt, outcome, justPassing) => {
    const tested = run(buildCovenant(), buildYear(on, { ebitda: 10, debt, cash: 0 }));
    expect([tested.outcome, tested.justPassing]).toEqual([outcome, justPassing]);
  });
});

describe('a waiver', () => {
  const failing = buildYear(on, { ebitda: 12, debt: 45, cash: 0 });
  const waived = (grantedOn: '2026-03-31' | '2026-04-01', until: '2026-03-31' | '2026-03-30' | null) =>
    run(buildCovenant({ waivers: [{ testDate: on, grantedOn, until, conditions: 'fee' }] }), failing);

  test('leaves the failure underneath and the headroom negative', () => {
    const tested = waived('2026-03-31', null);
    expect(tested).toMatchObject({ outcome: 'not met, waived', underlyingOutcome: 'not met' });
    expect(tested.headroom.absolute?.toFixed()).toBe('-0.25');
  });

  test('counts from the day it is granted to the day it ends, both included', () => {
    expect(waived('2026-04-01', null).outcome).toBe('not met');
    expect(waived('2026-03-31', '2026-03-31').outcome).toBe('not met, waived');
    expect(waived('2026-03-31', '2026-03-30').outcome).toBe('not met');
  });

  test('changes nothing of a test that is met or of another date', () => {
    const waivers = [
      { testDate: '2025-09-30', grantedOn: '2025-10-01', until: null, conditions: '' },
    ] as const;
    expect(run(buildCovenant({ waivers }), failing).outcome).toBe('not met');
    const own = [{ testDate: on, grantedOn: '2025-10-01', until: null, conditions: '' }] as const;
    const met = buildYear(on, { ebitda: 12, debt: 20, cash: 0 });
    expect(run(buildCovenant({ waivers: own }), met).outcome).toBe('met');
  });
});

describe('levels', () => {
  const levels = [
    buildLevel('2025-01-01', '2025-03-31', '4'),
    buildLevel('2025-04-01', '2025-12-31', '3.75'),
    buildLevel('2026-01-01', null, '3.5'),
  ];

  test('are in force up to and including their last day', () => {
    const at = (date: '2024-12-31' | '2025-03-31' | '2025-04-01' | '2026-01-01') => {
      const found = levelInForce(levels, date);
      return found.kind === 'level' ? found.level.toFixed() : found.kind;
    };
    expect([at('2024-12-31'), at('2025-03-31'), at('2025-04-01'), at('2026-01-01')]).toEqual([
      'none',
      '4',
      '3.75',
      '3.5',
    ]);
  });

  test('that come later are held against the result of today', () => {
    const tested = run(buildCovenant({ levels }), buildYear(on, { ebitda: 10, debt: 36, cash: 0 }));
    expect(tested).toMatchObject({ outcome: 'met, thin', nextLevel: { from: '2026-01-01' } });
    expect(tested.againstLaterLevels).toMatchObject([{ from: '2026-01-01', outcome: 'not met' }]);
  });

  test('give test dates in their rhythm, the last one included', () => {
    const rhythm = { firstTestOn: '2025-02-28', everyMonths: 6 } as const;
    expect(testDates(rhythm, '2026-02-28')).toEqual(['2025-02-28', '2025-08-31', '2026-02-28']);
    expect(testDates(rhythm, '2026-02-27')).toEqual(['2025-02-28', '2025-08-31']);
  });
});

describe('add-backs', () => {
  const addBacks = [
    buildAddBack(on, 2),
    buildAddBack('2024-12-31', 9),
    buildAddBack('2025-03-31', 9, { months: 6 }),
  ];

  test('count where their whole period lies in the twelve months', () => {
    const tested = run(buildCovenant({ addBacks }), buildYear(on, { ebitda: 11, debt: 42, cash: 0 }));
    expect(tested.denominator?.toFixed()).toBe('13');
  });

  test('are taken out again for the counterfactual, with the share that the test needs', () => {
    const tested = run(buildCovenant({ addBacks }), buildYear(on, { ebitda: 11, debt: 42, cash: 0 }));
    expect(tested.counterfactuals).toMatchObject([{ kind: 'without add-backs', outcome: 'not met' }]);
    expect(tested.counterfactuals[0]?.ratio?.toFixed(4)).toBe('3.8182');
    expect(tested.counterfactuals[0]?.breakEvenShare?.toFixed()).toBe('0.5');
  });

  test('over their cap are shown as not allowed', () => {
    const definition = { ...buildCovenant().definition, addBackCap: decimal('0.1') };
    const capped = [buildAddBack(on, 2, { capped: true })];
    const tested = run(
      buildCovenant({ definition, addBacks: capped }),
      buildYear(on, { ebitda: 10, debt: 30, cash: 0 }),
    );
    expect(tested.denominator?.toFixed()).toBe('11');
    expect(tested.bridge).toContainEqual(
      expect.objectContaining({ kind: 'disallowed', label: 'Add-backs over the cap' }),
    );
  });
});

test('the latest live test is the newest with figures, and none in a holiday', () => {
  const statements = buildYear(on, { ebitda: 12, debt: 40, cash: 6 });
  const covenant = buildCovenant({
    levels: [buildLevel('2025-01-01', '2026-03-31', '3.5'), buildLevel('2026-04-01', null, null)],
  });
  const tests = (dates: readonly ('2025-12-31' | '2026-03-31' | '2026-06-30')[]) =>
    dates.map((date) => testCovenant(covenant, bookOf(statements, 12), date, policy, '2026-08-01'));
  expect(latestLiveTest(tests(['2025-12-31', '2026-03-31']), 1)?.testDate).toBe('2025-12-31');
  expect(latestLiveTest(tests(['2025-12-31', '2026-03-31', '2026-06-30']), 1)).toBeNull();
});
