import { expect, test } from 'vitest';
import { daysBetween, fromEpochDay, epochDay } from '../calendar/plainDate.ts';
import { comparisonQuarterEnd } from './comparisonQuarterEnd.ts';

test.each([
  ['2026-09-30', '2026-09-30'],
  ['2026-02-28', '2026-03-31'],
  ['2026-01-31', '2025-12-31'],
  ['2026-01-03', '2025-12-31'],
  ['2026-05-31', '2026-06-30'],
  ['2026-10-31', '2026-09-30'],
  ['2026-11-30', '2026-12-31'],
] as const)('%s is compared at %s', (quarterEnd, calendar) => {
  expect(comparisonQuarterEnd(quarterEnd)).toBe(calendar);
});

test('no day is compared at a quarter end more than 46 days away', () => {
  for (let day = epochDay('2024-01-01'); day < epochDay('2028-01-01'); day += 1) {
    const date = fromEpochDay(day);
    expect(Math.abs(daysBetween(date, comparisonQuarterEnd(date)))).toBeLessThanOrEqual(46);
  }
});
