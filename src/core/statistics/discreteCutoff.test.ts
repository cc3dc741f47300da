import { expect, test } from 'vitest';
import { discreteCutoff } from './discreteCutoff.ts';

test('counts the value seen in the upper tail', () => {
  // scipy.stats.binom 1.17.1: twice P(X >= 61) of 113, and twice P(X <= 12) or P(X >= 12) of 31, at 1/3.
  expect(discreteCutoff({ previous: 14, at: 61, next: 38 }, 0).pValue).toBeCloseTo(1.0121619971416242e-5, 12);
  expect(discreteCutoff({ previous: 9, at: 12, next: 10 }, 0).pValue).toBeCloseTo(0.645, 3);
});

test('agrees with adding up every way in which three observations fall on three values', () => {
  // At k = 0 each of the 27 ways is equally likely; all three at the cut-off is one of them.
  expect(discreteCutoff({ previous: 0, at: 3, next: 0 }, 0).pAtLeast).toBeCloseTo(1 / 27, 12);
  expect(discreteCutoff({ previous: 1, at: 2, next: 0 }, 0).pAtLeast).toBeCloseTo(7 / 27, 12);
  expect(discreteCutoff({ previous: 2, at: 0, next: 1 }, 0).pValue).toBeCloseTo((2 * 8) / 27, 12);
});

test('a wider bound asks for more', () => {
  const at = (bound: number) => discreteCutoff({ previous: 14, at: 61, next: 38 }, bound).pAtLeast;
  expect(at(0)).toBeLessThan(at(0.05));
  expect(at(0.05)).toBeLessThan(at(0.1));
});

test('no observations speak for nothing', () => {
  expect(discreteCutoff({ previous: 0, at: 0, next: 0 }, 0.05)).toMatchObject({
    pValue: 1,
    pAtLeast: 1,
    n: 0,
  });
});
