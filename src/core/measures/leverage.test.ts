import { describe, expect, test } from 'vitest';
import { decimal } from '../money/decimal.ts';
import { netLeverage } from './netLeverage.ts';
import { requestOf, sheetOf, sidesOf, yearOf } from './request.fixture.ts';
import { seniorLeverage } from './seniorLeverage.ts';
import { totalLeverage } from './totalLeverage.ts';

const debts = {
  short_term_debt: 5,
  senior_debt: 20,
  junior_debt: 10,
  shareholder_loans: 5,
  lease_liabilities: 9,
  cash: 6,
} as const;

describe('leverage over EBITDA of 12', () => {
  // cov-028: 40 of debt less 6 of cash.
  test('net of cash is 40 - 6 over 12', () => {
    expect(sidesOf(netLeverage.measure(requestOf([yearOf(), sheetOf(debts)])))).toEqual(['34', '12']);
  });

  // cov-029: no more than 5 of the cash is netted.
  test('net of no more cash than the agreement nets, which the bridge says', () => {
    const measured = netLeverage.measure(
      requestOf([yearOf(), sheetOf(debts)], { definition: { cashNettingCap: decimal(5) } }),
    );
    expect(sidesOf(measured)).toEqual(['35', '12']);
    expect(measured.bridge.find(({ label }) => label === 'Cash that may be netted')).toMatchObject({
      amount: decimal(-5),
      note: 'of 6, the agreement nets no more',
    });
  });

  // Own arithmetic.
  test('of all borrowings is 40, of what ranks first 25', () => {
    expect(sidesOf(totalLeverage.measure(requestOf([yearOf(), sheetOf(debts)])))).toEqual(['40', '12']);
    expect(sidesOf(seniorLeverage.measure(requestOf([yearOf(), sheetOf(debts)])))).toEqual(['25', '12']);
  });

  test('counts leases where the agreement does, and no shareholder loans where they are net worth', () => {
    const with_ = (definition: Parameters<typeof requestOf>[1]) =>
      sidesOf(totalLeverage.measure(requestOf([yearOf(), sheetOf(debts)], definition)))[0];
    expect(with_({ definition: { leasesInDebt: true } })).toBe('49');
    expect(with_({ definition: { shareholderLoansInNetWorth: true } })).toBe('35');
  });
});

describe('by the rules at signing', () => {
  const statements = [yearOf({ rent_paid: -2 }), sheetOf(debts)];

  // cov-083, with EBITDA of 12 for 14.
  test('leases are no debt and their rent is taken from EBITDA', () => {
    const measured = totalLeverage.measure(
      requestOf(statements, { definition: { accounting: 'frozen', leasesInDebt: true } }),
    );
    expect(sidesOf(measured)).toEqual(['40', '10']);
    expect(measured.bridge.map(({ label }) => label)).toContain('Rent of leases, by the rules at signing');
  });

  test('a borrower that has leases and gives no rent is not taken to pay none', () => {
    const measured = totalLeverage.measure(
      requestOf([yearOf(), sheetOf(debts)], { definition: { accounting: 'frozen' } }),
    );
    expect(sidesOf(measured)).toEqual(['40', 'missing rent_paid']);
    const without = totalLeverage.measure(
      requestOf([yearOf(), sheetOf({ senior_debt: 40 })], { definition: { accounting: 'frozen' } }),
    );
    expect(sidesOf(without)).toEqual(['40', '12']);
  });
});

describe('annualised', () => {
  // cov-009: 7.2 over nine months is 9.6 a year.
  test('EBITDA of the months since closing is set to a year and said to be', () => {
    const nine = yearOf({
      net_income: '2.4',
      income_tax: '0.8',
      interest_expense: '1.6',
      depreciation: '2.0',
      amortisation: '0.4',
    });
    const request = requestOf([{ ...nine, months: 9 }, sheetOf(debts)], { months: 9 });
    const measured = netLeverage.measure(request);
    expect(sidesOf(measured)).toEqual(['34', '9.6']);
    expect(measured.remarks).toEqual(['annualised from 9 months']);
    expect(measured.bridge.map(({ label }) => label)).toContain('Set to a year: 9 months x 12 / 9');
  });
});
