import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { PlainDate } from '../calendar/plainDate.ts';
import { decimal, ZERO } from '../money/decimal.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import { bookOf } from '../statements/statementBook.ts';
import { addBacksWithin, allowAddBacks } from './addBacks.ts';
import type { AddBack } from './definition.ts';
import { ebitdaOfTwelveMonths } from './ebitda.ts';
import { interestCover } from './interestCover.ts';
import { minimumEbitda } from './minimumEbitda.ts';
import { EARNING_12, ON, requestOf, sidesOf, yearOf } from './request.fixture.ts';

const date = ON;
describe('EBITDA', () => {
  test('is net income, tax, net finance costs, depreciation and amortisation, in a bridge that adds up', () => {
    const { ebitda, bridge } = ebitdaOfTwelveMonths(bookOf([yearOf({ interest_income: '0.5' })], 12), date);
    expect(ebitda.kind === 'value' && ebitda.value.toFixed()).toBe('11.5');
    const figures = bridge.filter(({ kind }) => kind === 'figure').map(({ amount }) => amount);
    expect(figures.reduce((sum, amount) => sum.plus(amount), ZERO).toFixed()).toBe('11.5');
  });

  test('has no line for what the accounts do not have, and a nought without a sign for what is nought', () => {
    const bridgeOf = (figures: Parameters<typeof yearOf>[0]) =>
      JSON.parse(JSON.stringify(ebitdaOfTwelveMonths(bookOf([yearOf(figures)], 12), date).bridge)) as {
        label: string;
        amount: string;
      }[];
    expect(bridgeOf({}).map(({ label }) => label)).not.toContain('Interest income');
    expect(bridgeOf({ interest_income: 0 })).toContainEqual(
      expect.objectContaining({ label: 'Interest income', amount: '0' }),
    );
  });

  test('is missing where a line is missing, never taken as nought', () => {
    const statement = buildStatement(date, 12, { ...EARNING_12, income_tax: undefined });
    const { ebitda } = ebitdaOfTwelveMonths(bookOf([statement], 12), date);
    expect(ebitda.kind === 'missing' && ebitda.missing).toEqual([
      { line: 'income_tax', periodEnd: date, months: 12 },
    ]);
  });
});

describe('add-backs', () => {
  const terms = (basis: 'before' | 'after') => ({ cap: decimal('0.25'), basis });
  const allow = (ebitda: number, basis: 'before' | 'after') =>
    allowAddBacks({ ebitda: decimal(ebitda), uncapped: ZERO, capped: decimal(4), terms: terms(basis) });

  test('are capped at 25.0 % of EBITDA before them, 33.3 % after them, and at nothing without earnings', () => {
    expect(allow(10, 'before').limit?.toFixed()).toBe('2.5');
    expect(allow(10, 'after').limit?.toFixed(4)).toBe('3.3333');
    expect(allow(-1, 'before')).toMatchObject({ limit: ZERO });
  });

  test('after the cap are exactly that share of EBITDA with them', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 1_000_000 }),
        fc.integer({ min: 1, max: 99 }),
        (base, percent) => {
          const cap = decimal(percent).div(100);
          const { allowed, adjusted } = allowAddBacks({
            ebitda: decimal(base),
            uncapped: ZERO,
            capped: decimal(base).times(1_000),
            terms: { cap, basis: 'after' },
          });
          expect(allowed.div(adjusted).minus(cap).abs().lt('1e-25')).toBe(true);
        },
      ),
    );
  });

  test('count where their whole period lies in the twelve months', () => {
    const addBack = (periodEnd: PlainDate, months: number): AddBack => ({
      id: 1,
      periodEnd,
      months,
      label: '',
      amount: decimal(1),
      capped: false,
      reason: '',
      evidence: '',
      approvedBy: null,
    });
    const all = [
      addBack('2025-03-31', 3),
      addBack('2025-03-31', 6),
      addBack(date, 12),
      addBack('2026-03-31', 3),
    ];
    expect(addBacksWithin(12, all, date)).toEqual([all[0], all[2]]);
  });
});

describe('interest', () => {
  const charge = (figures: Parameters<typeof yearOf>[0]) =>
    sidesOf(interestCover.measure(requestOf([yearOf(figures)])))[1];

  test('is cash interest paid where the cash flow statement gives it, an outflow stored below nought', () => {
    expect(charge({ interest_paid: -4, interest_income: '0.5' })).toBe('4');
  });

  test('is not what comes in where expense goes out: the sign contradicts it', () => {
    expect(charge({ interest_paid: 4 })).toBe('2.5');
    expect(charge({ interest_paid: 0 })).toBe('0');
  });

  test('is else interest expense less interest income', () => {
    expect(charge({ interest_income: '0.5' })).toBe('2');
    expect(charge({})).toBe('2.5');
  });
});

describe('EBITDA as a covenant defines it', () => {
  const ebitda = (figures: Parameters<typeof yearOf>[0], given: Parameters<typeof requestOf>[1] = {}) =>
    minimumEbitda.measure(requestOf([yearOf(figures)], given));

  // cov-018.
  test('is an amount against a floor', () => {
    expect(sidesOf(ebitda({}))).toEqual(['12']);
  });

  // Own arithmetic: 12 with an impairment of 3 in net income.
  test('adds impairment back only where the agreement does', () => {
    expect(sidesOf(ebitda({ impairment: 3 }))).toEqual(['12']);
    expect(sidesOf(ebitda({ impairment: 3 }, { definition: { impairmentAddedBack: true } }))).toEqual(['15']);
  });

  // cov-025: base 10 + 1, limit 2.2, 13.2 with 1.8 over the cap.
  test('shows each add-back with reason, evidence and approver, and what is over the cap', () => {
    const addBack = (id: number, amount: string, capped: boolean, approvedBy: string | null): AddBack => ({
      id,
      periodEnd: date,
      months: 12,
      label: `Item ${id}`,
      amount: decimal(amount),
      capped,
      reason: 'plant closure',
      evidence: id === 1 ? '' : 'board paper',
      approvedBy,
    });
    const measured = ebitda(
      { net_income: '2.2' },
      {
        definition: { addBackCap: decimal('0.2') },
        addBacks: [addBack(1, '1', false, 'Iseult Brandrath'), addBack(2, '4', true, null)],
      },
    );
    expect(sidesOf(measured)).toEqual(['13.2']);
    expect(measured.addBacksTaken.toFixed()).toBe('3.2');
    expect(measured.bridge.slice(-4).map(({ label, note }) => `${label}: ${note ?? ''}`)).toEqual([
      'Item 1: plant closure; no evidence given; approved by Iseult Brandrath; without cap',
      'Item 2: plant closure; board paper; not approved by a second person yet; under the cap',
      'Add-backs over the cap: cap 20\u00a0% of EBITDA before them: 2.2',
      'Adjusted EBITDA: ',
    ]);
  });

  // Own arithmetic: three quarters of a year's add-backs lie in the nine months, and all is set to a year.
  test('annualised takes the add-backs of its months and sets them to a year with it', () => {
    const addBack = (periodEnd: PlainDate): AddBack => ({
      id: 1,
      periodEnd,
      months: 3,
      label: 'Item',
      amount: decimal('0.3'),
      capped: false,
      reason: '',
      evidence: '',
      approvedBy: null,
    });
    const measured = minimumEbitda.measure(
      requestOf([{ ...yearOf(), months: 9 }], {
        months: 9,
        addBacks: ['2025-03-31', '2025-06-30', '2025-09-30', '2025-12-31'].map((end) =>
          addBack(end as PlainDate),
        ),
      }),
    );
    // (12 + 0.9) x 12 / 9.
    expect(sidesOf(measured)).toEqual(['17.2']);
    expect(measured.addBacksTaken.toFixed()).toBe('1.2');
  });
});

describe('what stands beside EBITDA', () => {
  const checks = (figures: Parameters<typeof yearOf>[0], given: Partial<Statement> = {}) =>
    minimumEbitda
      .measure(requestOf([{ ...yearOf(figures), ...given }]))
      .bridge.filter(({ kind }) => kind === 'check')
      .map(({ label, amount, note }) => `${label} ${amount.toFixed()}: ${note ?? ''}`);

  test('is nothing where the sheet gives nothing to hold it against', () => {
    expect(checks({ revenue: 80 })).toEqual([]);
  });

  test('is the EBITDA that the borrower states, with what it has more or less', () => {
    expect(checks({ ebitda_reported: 15 })).toEqual([
      'EBITDA as the borrower states it 15: 3 more than its accounts give (25.0\u00a0%)',
    ]);
    expect(checks({ ebitda_reported: 12 })).toEqual([
      'EBITDA as the borrower states it 12: the same as its accounts give',
    ]);
  });

  // cov-019: 80 - 48 - 20.3 is 0.3 less than from net income.
  test('is the way down from revenue, its difference named', () => {
    expect(checks({ revenue: 80, cogs: 48, sga: '20.3' })).toEqual([
      'EBITDA down from revenue 11.7: 0.3 less than from net income: other income below gross profit 0.3',
    ]);
    expect(checks({ revenue: 80, cogs: 48, sga: '20.3', other_operating_income: '0.3' })).toEqual([
      'EBITDA down from revenue 11.7: 0.3 less than from net income: other operating income 0.3',
    ]);
    expect(checks({ revenue: 80, cogs: 48, sga: 20 })).toEqual([
      'EBITDA down from revenue 12: the same as from net income',
    ]);
    expect(checks({ revenue: 80, cogs: 48, sga: '19.8', impairment: '0.2' })).toEqual([
      'EBITDA down from revenue 12.2: 0.2 more than from net income: impairment 0.2',
    ]);
  });

  test('says where depreciation stands inside the costs', () => {
    expect(checks({ revenue: 80, cogs: 48, sga: '23.7' })).toEqual([
      'EBITDA down from revenue 8.3: 3.7 less than from net income: depreciation and amortisation inside the costs 3.7',
    ]);
  });

  // cov-011: 10.6 over 53 weeks is 10.4 over 52; here 12 x 364 / 371.
  test('is the figure of 52 weeks where the year has 53', () => {
    const [only] = checks({}, { periodStart: '2024-12-26' });
    expect(only).toMatch(/^EBITDA over 52 weeks 11\.7735849/);
    expect(checks({}, { periodStart: '2024-12-31' })).toEqual([]);
  });
});
