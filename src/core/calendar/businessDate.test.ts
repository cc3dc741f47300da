import { expect, test } from 'vitest';
import { businessDate } from './businessDate.ts';

// Zone rules as in the IANA database: Paris is UTC+1 in winter and UTC+2 from 28 March to 31 October 2027.
test('an instant belongs to the day of the lender’s zone, at, just before and just after its midnight', () => {
  expect(businessDate(new Date('2026-12-01T22:59:59.999Z'), 'Europe/Paris')).toBe('2026-12-01');
  expect(businessDate(new Date('2026-12-01T23:00:00Z'), 'Europe/Paris')).toBe('2026-12-02');
  expect(businessDate(new Date('2026-12-01T23:00:00.001Z'), 'Europe/Paris')).toBe('2026-12-02');
});

test('summer time moves the midnight by an hour', () => {
  expect(businessDate(new Date('2027-06-30T21:59:59Z'), 'Europe/Paris')).toBe('2027-06-30');
  expect(businessDate(new Date('2027-06-30T22:00:00Z'), 'Europe/Paris')).toBe('2027-07-01');
});

test('zones on both sides of the date line have different days at one instant', () => {
  const instant = new Date('2026-12-31T12:00:00Z');
  expect(businessDate(instant, 'Pacific/Auckland')).toBe('2027-01-01');
  expect(businessDate(instant, 'Pacific/Honolulu')).toBe('2026-12-31');
});

test('a zone that does not exist is refused', () => {
  expect(() => businessDate(new Date(0), 'Nowhere/Else')).toThrow(RangeError);
});
