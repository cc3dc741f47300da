import { expect, test } from 'vitest';
import { businessDate } from './businessDate.ts';
import { lastNightSlot } from './nightSlot.ts';

const slot = (now: string, at = '01:30') => lastNightSlot(new Date(now), at).toISOString();

test('a night starts at its minute: just before it the last one is that of the day before', () => {
  expect(slot('2026-12-02T01:29:59.999Z')).toBe('2026-12-01T01:30:00.000Z');
  expect(slot('2026-12-02T01:30:00.000Z')).toBe('2026-12-02T01:30:00.000Z');
  expect(slot('2026-12-02T01:30:00.001Z')).toBe('2026-12-02T01:30:00.000Z');
});

test('the first of a month and of a year look back over their edge', () => {
  expect(slot('2027-01-01T00:10:00Z')).toBe('2026-12-31T01:30:00.000Z');
});

test('where clocks change, each business date has one night', () => {
  for (const first of ['2027-03-26', '2027-10-29']) {
    const days = [];
    for (let minute = 0; minute < 5 * 24 * 60; minute += 1) {
      const now = new Date(Date.parse(`${first}T00:00:00Z`) + minute * 60_000);
      if (lastNightSlot(now, '01:30').getTime() === now.getTime())
        days.push(businessDate(now, 'Europe/Paris'));
    }
    expect(new Set(days).size).toBe(days.length);
    expect(days).toHaveLength(5);
  }
});

test.each(['24:00', '1:30', '01:60', '', '01:30:00'])('%j is not a time of day', (text) => {
  expect(() => lastNightSlot(new Date('2026-12-02T00:00:00Z'), text)).toThrow(RangeError);
});
