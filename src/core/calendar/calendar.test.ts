import { describe, expect, test } from 'vitest';
import { daysOn, deadlineOn, dueDate } from './deadline.ts';
import { fiscalPosition, lastYearEndBefore, reportingMonthEnd } from './fiscalYear.ts';
import { formatDay } from './printDay.ts';

describe('a period end', () => {
  test.each([
    ['2024-12-25', '2024-12-31'],
    ['2024-12-24', '2024-12-24'],
    ['2025-01-06', '2024-12-31'],
    ['2025-01-07', '2025-01-07'],
    ['2024-02-29', '2024-02-29'],
  ] as const)('%s stands for %s: six days belong to the month end, seven do not', (date, monthEnd) => {
    expect(reportingMonthEnd(date)).toBe(monthEnd);
  });

  test.each([
    ['2025-12-31', 12, 2025, 4, 12],
    ['2026-01-31', 12, 2026, 1, 1],
    ['2025-06-30', 3, 2026, 1, 3],
    ['2025-03-31', 3, 2025, 4, 12],
    ['2025-04-30', 3, 2026, 1, 1],
  ] as const)(
    '%s with year end in month %i is in year %i, quarter %i',
    (date, month, fiscalYear, quarter, monthsIntoYear) => {
      expect(fiscalPosition(date, month)).toEqual({ fiscalYear, quarter, monthsIntoYear });
    },
  );

  test('knows the year end before it', () => {
    expect(lastYearEndBefore('2025-06-30', 3)).toBe('2025-03-31');
    expect(lastYearEndBefore('2025-03-31', 3)).toBe('2024-03-31');
  });
});

describe('a due date', () => {
  test('counts calendar days into a leap year', () => {
    expect(dueDate({ periodEnd: '2023-12-31', days: 120, dayCount: 'calendar' })).toBe('2024-04-29');
  });

  test('rolls off a weekend only where the agreement rolls', () => {
    const terms = { periodEnd: '2023-12-31', days: 90, dayCount: 'calendar' } as const;
    expect(dueDate(terms)).toBe('2024-03-30');
    expect(dueDate({ ...terms, roll: 'following' })).toBe('2024-04-01');
  });

  test('counts business days over weekends', () => {
    // Friday; the fifth business day on is the next Friday, the sixth a Monday.
    expect(daysOn('2026-10-30', 5, 'business')).toBe('2026-11-06');
    expect(daysOn('2026-10-30', 6, 'business')).toBe('2026-11-09');
  });

  test.each([
    ['2025-05-07', 'not due', 0],
    ['2025-05-08', 'due within 7 days', 0],
    ['2025-05-15', 'due within 7 days', 0],
    ['2025-05-16', 'late within grace', 1],
    ['2025-05-25', 'late within grace', 10],
    ['2025-05-26', 'overdue past grace', 11],
  ] as const)('of 15 May with ten days of grace is on %s %s', (day, state, daysLate) => {
    const terms = { due: '2025-05-15', graceDays: 10, dayCount: 'calendar', day } as const;
    expect(deadlineOn(terms)).toMatchObject({ state, daysLate, lastGraceDay: '2025-05-25' });
  });
});

test('a day is printed with the month by name', () => {
  expect(formatDay('2026-09-03')).toBe('3 Sep 2026');
});
