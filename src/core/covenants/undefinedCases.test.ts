/** Every covenant type where its ratio is not defined: methods.md A4, row by row. */
import { describe, expect, test } from 'vitest';
import { PLAIN_DEFINITION } from '../measures/definition.ts';
import type { MeasureCode } from '../measures/measure.ts';
import { decimal } from '../money/decimal.ts';
import { POLICY_VERSION_1 as policy } from '../policy.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import { bookOf } from '../statements/statementBook.ts';
import { buildCovenant, buildLevel } from './covenant.fixture.ts';
import type { Covenant } from './covenant.ts';
import { testCovenant } from './testCovenant.ts';

const on = '2025-12-31';
const covenantOn = (
  measure: MeasureCode,
  operator: Covenant['operator'],
  level: string,
  given: Partial<Covenant> = {},
): Covenant =>
  buildCovenant({
    measure,
    operator,
    firstTestOn: on,
    levels: [buildLevel('2025-01-01', null, level)],
    ...given,
  });
const run = (covenant: Covenant, statements: readonly Statement[]) =>
  testCovenant(covenant, bookOf(statements, 12), on, policy, '2026-06-30');

type Figures = Parameters<typeof buildStatement>[2];
const earning = (ebitda: number, more: Figures = {}) =>
  buildStatement(on, 12, {
    net_income: ebitda,
    income_tax: 0,
    interest_expense: 0,
    depreciation: 0,
    tax_paid: 0,
    capex: 0,
    ...more,
  });
const sheet = (figures: Figures) => buildStatement(on, 0, figures);

describe.each(['total-leverage', 'senior-leverage', 'net-leverage'] as const)('%s at most 3.5', (measure) => {
  test.each([
    [42, 12, 'met, thin', '3.5'],
    [42.01, 12, 'not met', '3.5008333333'],
    [40, -8, 'not met, ratio has no meaning', undefined],
    [40, 0, 'not met, ratio has no meaning', undefined],
    [0, 12, 'met, net cash', '0'],
    [0, -8, 'cannot be tested', undefined],
  ] as const)('debt of %s over EBITDA of %s is %s', (debt, ebitda, outcome, ratio) => {
    const tested = run(covenantOn(measure, '<=', '3.5'), [
      earning(ebitda),
      sheet({ senior_debt: debt, cash: 0 }),
    ]);
    expect([tested.outcome, tested.tested?.toDecimalPlaces(10).toFixed()]).toEqual([outcome, ratio]);
  });
});

describe.each([
  ['interest-cover', { interest_paid: -4 }, { interest_paid: 0 }],
  [
    'debt-service-cover',
    { interest_paid: -4, scheduled_principal: 0 },
    { interest_paid: 0, scheduled_principal: 0 },
  ],
  [
    'fixed-charge-cover',
    { interest_paid: -4, scheduled_principal: 0 },
    { interest_paid: 0, scheduled_principal: 0 },
  ],
] as const)('%s at least 2.5', (measure, charged, uncharged) => {
  const balance = { current_assets: 10, cash: 1, current_liabilities: 5 } as const;
  const sheets = [sheet(balance), buildStatement('2024-12-31', 0, balance)];
  test.each([
    [10, charged, 'met, thin'],
    [9.99, charged, 'not met'],
    [-1, charged, 'not met'],
    [12, uncharged, 'met, no charge to cover'],
    [-1, uncharged, 'cannot be tested'],
    [0, uncharged, 'cannot be tested'],
  ] as const)('EBITDA of %s over %o is %s', (ebitda, charges, outcome) => {
    const tested = run(covenantOn(measure, '>=', '2.5'), [earning(ebitda, charges), ...sheets]);
    expect(tested.outcome).toBe(outcome);
  });
});

test('a cash cover tells how far EBITDA may fall, not the cash that covers', () => {
  // cov-046: money left of 0.75 over EBITDA of 12; the cash that covers may fall by 0.75 of 9.
  const balance = (current_assets: number, date: typeof on | '2024-12-31') =>
    buildStatement(date, 0, { current_assets, cash: 0, current_liabilities: 0 });
  const { headroom, earnings } = run(covenantOn('debt-service-cover', '>=', '1.1'), [
    earning(12, { tax_paid: -1.5, capex: -1, interest_paid: -3, scheduled_principal: 4.5 }),
    balance(0.5, on),
    balance(0, '2024-12-31'),
  ]);
  expect(headroom.moneyLeft?.toFixed()).toBe('0.75');
  expect(headroom.mayFall?.toFixed()).toBe('0.0625');
  expect([headroom.fallOf, earnings?.toFixed()]).toEqual(['earnings', '12']);
});

describe('loan to value at most 70 %', () => {
  test.each([
    [70, 100, 'met, thin', null],
    [70.01, 100, 'not met', null],
    [65, 0, 'cannot be tested', 'valuation not positive'],
    [65, undefined, 'cannot be tested', 'missing: Collateral value on 31 Dec 2025'],
    [0, 100, 'met', 'no loan'],
  ] as const)('a loan of %s on a value of %s is %s', (loan, value, outcome, reason) => {
    const tested = run(covenantOn('loan-to-value', '<=', '0.7'), [
      sheet({ senior_debt: loan, collateral_value: value }),
    ]);
    expect([tested.outcome, tested.reason]).toEqual([outcome, reason]);
  });

  test('cannot be tested on a valuation that is too old', () => {
    const tested = run(
      covenantOn('loan-to-value', '<=', '0.7', {
        definition: { ...PLAIN_DEFINITION, valuationMaxAgeMonths: 24 },
      }),
      [sheet({ senior_debt: 65 }), buildStatement('2023-06-30', 0, { collateral_value: 100 })],
    );
    expect(tested).toMatchObject({ outcome: 'cannot be tested', reason: 'valuation older than 24 months' });
  });
});

test.each([
  [60, 5.2, 'met, thin'],
  [60, 4.7, 'not met'],
  [0, 5.2, 'met, no charge to cover'],
  [0, -1, 'met, no charge to cover'],
] as const)('debt yield at least 8 %%: a loan of %s and income of %s is %s', (loan, noi, outcome) => {
  const tested = run(covenantOn('debt-yield', '>=', '0.08'), [
    buildStatement(on, 12, { noi }),
    sheet({ senior_debt: loan }),
  ]);
  expect(tested.outcome).toBe(outcome);
});

describe('gearing at most 1.5', () => {
  test.each([
    [40, 31, 'met', null],
    [48, 32, 'met, thin', null],
    [48.01, 32, 'not met', null],
    [40, -2, 'not met, ratio has no meaning', 'net worth not positive: ratio has no meaning'],
    [0, 31, 'met', 'no debt'],
    [0, -2, 'cannot be tested', 'no debt and net worth not positive: the agreement decides'],
  ] as const)('debt of %s over net worth of %s is %s', (debt, equity, outcome, reason) => {
    const tested = run(covenantOn('gearing', '<=', '1.5'), [sheet({ senior_debt: debt, equity })]);
    expect([tested.outcome, tested.reason]).toEqual([outcome, reason]);
  });
});

test.each(['current-ratio', 'quick-ratio'] as const)(
  '%s without current liabilities is met, and said to be without',
  (measure) => {
    const assets = { current_assets: 0, cash: 0, receivables: 0 };
    expect(
      run(covenantOn(measure, '>=', '1.2'), [sheet({ ...assets, current_liabilities: 0 })]),
    ).toMatchObject({ outcome: 'met, no charge to cover', reason: 'no current liabilities to cover' });
    expect(run(covenantOn(measure, '>=', '1.2'), [sheet(assets)]).outcome).toBe('cannot be tested');
  },
);

test.each([
  ['minimum-liquidity', '>=', { cash: 5 }, {}],
  ['tangible-net-worth', '>=', { equity: 5 }, {}],
  ['minimum-ebitda', '>=', { cash: 0 }, { net_income: 5 }],
  ['capital-expenditure', '<=', { cash: 0 }, { capex: -5 }],
] as const)(
  '%s is met at its level and cannot be tested without its figure',
  (measure, operator, balance, flows) => {
    const at = (level: string, figures: Figures, moved: Figures) =>
      run(covenantOn(measure, operator, level), [earning(0, moved), sheet(figures)]).outcome;
    expect(at('5', balance, flows)).toBe('met, thin');
    expect(at(operator === '>=' ? '5.01' : '4.99', balance, flows)).toBe('not met');
    const without = { cash: undefined, net_income: undefined, capex: undefined };
    expect(at('5', { senior_debt: 1 }, without)).toBe('cannot be tested');
  },
);

describe('the accounts that the agreement asks for', () => {
  const management = [earning(12), sheet({ senior_debt: 48, cash: 0 })];
  const audited = [
    { ...earning(10), basis: 'audited' as const },
    { ...sheet({ senior_debt: 48, cash: 0 }), basis: 'audited' as const },
  ];
  const onAudited = covenantOn('net-leverage', '<=', '4.5', { basis: 'audited' });

  test('are awaited where only others have come', () => {
    expect(run(onAudited, management)).toMatchObject({
      outcome: 'awaiting figures',
      reason: 'audited figures to 31 Dec 2025 are not there',
    });
  });

  test('are tested where they have, and better founded ones are as good', () => {
    expect(run(onAudited, [...management, ...audited]).tested?.toFixed()).toBe('4.8');
    const onReviewed = covenantOn('net-leverage', '<=', '4.5', { basis: 'reviewed' });
    expect(run(onReviewed, [...management, ...audited]).tested?.toFixed()).toBe('4.8');
  });
});

describe('frozen accounting rules', () => {
  // cov-083.
  const tested = run(
    covenantOn('net-leverage', '<=', '3.4', { definition: { ...PLAIN_DEFINITION, accounting: 'frozen' } }),
    [earning(14, { rent_paid: -2 }), sheet({ senior_debt: 40, lease_liabilities: 9, cash: 0 })],
  );

  test('decide, and today’s rules stand beside', () => {
    expect([tested.outcome, tested.tested?.toFixed(4)]).toEqual(['met, thin', '3.3333']);
    expect(tested.otherAccounting).toMatchObject({
      accounting: 'current',
      numerator: decimal(49),
      denominator: decimal(14),
      tested: decimal('3.5'),
      outcome: 'not met',
    });
  });

  test('are the only ones with another reading beside', () => {
    const plain = run(covenantOn('net-leverage', '<=', '3.4'), [
      earning(14),
      sheet({ senior_debt: 40, cash: 0 }),
    ]);
    expect(plain.otherAccounting).toBeNull();
  });
});
