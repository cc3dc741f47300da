import { expect, test } from 'vitest';
import { addBusinessDays, isBusinessDay } from './businessDays.ts';

// 4 December 2026 is a Friday (ISO 8601 week date 2026-W49-5).
test('Saturday and Sunday are no business days', () => {
  expect(
    (['2026-12-03', '2026-12-04', '2026-12-05', '2026-12-06', '2026-12-07'] as const).map(isBusinessDay),
  ).toEqual([true, true, false, false, true]);
});

test('counting steps over weekends', () => {
  expect(addBusinessDays('2026-12-04', 1)).toBe('2026-12-07');
  expect(addBusinessDays('2026-12-05', 1)).toBe('2026-12-07');
  expect(addBusinessDays('2026-12-01', 10)).toBe('2026-12-15');
  expect(addBusinessDays('2026-12-01', 20)).toBe('2026-12-29');
});

test('no days on is the day itself', () => {
  expect(addBusinessDays('2026-12-05', 0)).toBe('2026-12-05');
});

test('days before 1970 have their weekday too', () => {
  // 31 December 1969 was a Wednesday, 28 December 1969 a Sunday.
  expect(isBusinessDay('1969-12-31')).toBe(true);
  expect(isBusinessDay('1969-12-28')).toBe(false);
});
