import { describe, expect, test } from 'vitest';
import type { PlainDate } from '../calendar/plainDate.ts';
import { latestValuation } from './collateral.ts';
import { debtYield } from './debtYield.ts';
import { loanToValue } from './loanToValue.ts';
import { ON, requestOf, sheetOf, sidesOf, yearOf } from './request.fixture.ts';

const loanOf = (value: number | null) =>
  sheetOf({ senior_debt: 60, short_term_debt: 5, ...(value === null ? {} : { collateral_value: value }) });

describe('loan to value', () => {
  // cov-050: 65 over 100.
  test('is short-term and senior debt over the latest valuation', () => {
    expect(sidesOf(loanToValue.measure(requestOf([loanOf(100)])))).toEqual(['65', '100']);
  });

  test('has no value without a valuation, and none on a valuation of nought', () => {
    expect(sidesOf(loanToValue.measure(requestOf([loanOf(null)])))[1]).toBe('missing collateral_value');
    expect(sidesOf(loanToValue.measure(requestOf([loanOf(0)])))[1]).toBe('valuation not positive');
  });

  // cov-051: 24 months, on both sides of the last day.
  test.each([
    ['2023-12-31', '100'],
    ['2023-12-30', 'valuation older than 24 months'],
  ] as const)('with a valuation of %s stands on %s', (valuedOn, expected) => {
    const statements = [loanOf(null), sheetOf({ collateral_value: 100 }, valuedOn)];
    const request = requestOf(statements, { definition: { valuationMaxAgeMonths: 24 } });
    expect(sidesOf(loanToValue.measure(request))[1]).toBe(expected);
    expect(sidesOf(loanToValue.measure(requestOf(statements)))[1]).toBe('100');
  });

  test('takes no valuation of a later day', () => {
    expect(
      sidesOf(
        loanToValue.measure(requestOf([loanOf(null), sheetOf({ collateral_value: 90 }, '2026-03-31')])),
      )[1],
    ).toBe('missing collateral_value');
  });
});

test('a value that later sheets repeat is as old as the first that shows it', () => {
  const valued = (date: PlainDate, value: number) => sheetOf({ collateral_value: value }, date);
  const { book } = requestOf([
    valued('2024-12-31', 90),
    valued('2025-03-31', 100),
    valued('2025-06-30', 100),
    valued(ON, 100),
  ]);
  expect(latestValuation(book, ON)?.valuedOn).toBe('2025-03-31');
  expect(latestValuation(book, '2025-02-28')?.valuedOn).toBe('2024-12-31');
});

// cov-052: 5.2 over 60.
test('debt yield is net operating income of twelve months over the loan', () => {
  const sheet = sheetOf({ senior_debt: 60 });
  expect(sidesOf(debtYield.measure(requestOf([yearOf({ noi: '5.2' }), sheet])))).toEqual(['5.2', '60']);
  expect(sidesOf(debtYield.measure(requestOf([yearOf(), sheet])))[0]).toBe('missing noi');
});
