import { expect, test } from 'vitest';
import { businessDayBefore, latestReportedQuarterEnd, quarterEndOnOrAfter } from './demoDays.ts';

test('the quarter end on or after a day is the day itself where it is one', () => {
  expect(quarterEndOnOrAfter('2026-12-01')).toBe('2026-12-31');
  expect(quarterEndOnOrAfter('2026-12-31')).toBe('2026-12-31');
  expect(quarterEndOnOrAfter('2027-01-01')).toBe('2027-03-31');
});

test('a quarter counts as reported forty-five days after its end, not a day earlier', () => {
  expect(latestReportedQuarterEnd('2026-11-13')).toBe('2026-06-30');
  expect(latestReportedQuarterEnd('2026-11-14')).toBe('2026-09-30');
  expect(latestReportedQuarterEnd('2026-12-01')).toBe('2026-09-30');
});

test('the business day before a Monday is the Friday', () => {
  // 2026-12-01 is a Tuesday by the perpetual calendar.
  expect(businessDayBefore('2026-12-01')).toBe('2026-11-30');
  expect(businessDayBefore('2026-11-30')).toBe('2026-11-27');
  expect(businessDayBefore('2026-11-29')).toBe('2026-11-27');
});
