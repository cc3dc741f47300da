import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { PlainDate } from '../calendar/plainDate.ts';
import { decimal, ZERO } from '../money/decimal.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import { bookOf } from '../statements/statementBook.ts';
import { addBacksWithin, allowAddBacks } from './addBacks.ts';
import { currentRatio } from './currentRatio.ts';
import { PLAIN_DEFINITION, type AddBack, type MeasureRequest } from './definition.ts';
import { ebitdaOfTwelveMonths } from './ebitda.ts';
import { interestCover } from './interestCover.ts';
import { minimumLiquidity } from './minimumLiquidity.ts';
import { totalLeverage } from './totalLeverage.ts';
import { translationInto } from './translation.ts';

const date: PlainDate = '2025-12-31';
const definition = PLAIN_DEFINITION;
const request = (statements: readonly Statement[], given: Partial<MeasureRequest> = {}): MeasureRequest => ({
  book: bookOf(statements, 12),
  date,
  definition,
  addBacks: [],
  months: 12,
  translation: translationInto('EUR', []),
  ...given,
});
const earnings = {
  net_income: '4.2',
  income_tax: '1.6',
  interest_expense: '2.5',
  depreciation: '3.0',
  amortisation: '0.7',
} as const;
const year = (figures: Parameters<typeof buildStatement>[2] = {}) =>
  buildStatement(date, 12, { ...earnings, ...figures });

describe('EBITDA', () => {
  test('is net income, tax, net finance costs, depreciation and amortisation, in a bridge that adds up', () => {
    const { ebitda, bridge } = ebitdaOfTwelveMonths(bookOf([year({ interest_income: '0.5' })], 12), date);
    expect(ebitda.kind === 'value' && ebitda.value.toFixed()).toBe('11.5');
    const figures = bridge.filter(({ kind }) => kind === 'figure').map(({ amount }) => amount);
    expect(figures.reduce((sum, amount) => sum.plus(amount), ZERO).toFixed()).toBe('11.5');
  });

  test('has no line for what the accounts do not have, and a nought without a sign for what is nought', () => {
    const bridgeOf = (figures: Parameters<typeof year>[0]) =>
      JSON.parse(JSON.stringify(ebitdaOfTwelveMonths(bookOf([year(figures)], 12), date).bridge)) as {
        label: string;
        amount: string;
      }[];
    expect(bridgeOf({}).map(({ label }) => label)).not.toContain('Interest income');
    expect(bridgeOf({ interest_income: 0 })).toContainEqual(
      expect.objectContaining({ label: 'Interest income', amount: '0' }),
    );
  });

  test('is missing where a line is missing, never taken as nought', () => {
    const statement = buildStatement(date, 12, { ...earnings, income_tax: undefined });
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
  const charge = (figures: Parameters<typeof buildStatement>[2]) => {
    const { denominator } = interestCover.measure(request([year(figures)]));
    return denominator?.kind === 'value' ? denominator.value.toFixed() : denominator?.kind;
  };

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

describe('balances', () => {
  const balance = (figures: Parameters<typeof buildStatement>[2]) => buildStatement(date, 0, figures);

  test('debt is every borrowing, and missing where no debt line is there', () => {
    const debt = (figures: Parameters<typeof buildStatement>[2]) =>
      totalLeverage.measure(request([year(), balance(figures)])).numerator;
    const all = debt({
      short_term_debt: 5,
      senior_debt: 20,
      junior_debt: 3,
      shareholder_loans: 2,
      lease_liabilities: 9,
    });
    expect(all.kind === 'value' && all.value.toFixed()).toBe('30');
    expect(debt({ cash: 4 })).toMatchObject({ kind: 'missing', missing: [{ line: 'senior_debt' }] });
  });

  test('the current ratio reads both subtotals', () => {
    const { numerator, denominator } = currentRatio.measure(
      request([balance({ current_assets: 30, current_liabilities: 20 })]),
    );
    expect([numerator.kind, denominator?.kind]).toEqual(['value', 'value']);
  });

  test('liquidity counts undrawn commitments only where the definition does', () => {
    const statements = [
      balance({ cash: 4, revolver_commitment: 10, revolver_drawn: 6, letters_of_credit: 1 }),
    ];
    const liquidity = (undrawnCountsAsLiquidity: boolean) => {
      const { numerator } = minimumLiquidity.measure(
        request(statements, { definition: { ...definition, undrawnCountsAsLiquidity } }),
      );
      return numerator.kind === 'value' ? numerator.value.toFixed() : numerator.kind;
    };
    expect([liquidity(false), liquidity(true)]).toEqual(['4', '7']);
  });

  test('a commitment that is overdrawn takes nothing from cash', () => {
    const { numerator } = minimumLiquidity.measure(
      request([balance({ cash: 4, revolver_commitment: 10, revolver_drawn: 12 })], {
        definition: { ...definition, undrawnCountsAsLiquidity: true },
      }),
    );
    expect(numerator.kind === 'value' && numerator.value.toFixed()).toBe('4');
  });
});
