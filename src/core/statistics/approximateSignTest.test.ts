import fc from 'fast-check';
import { expect, test } from 'vitest';
import { approximateSignTest, bestCountNear, nearestToCount, signTestOf } from './approximateSignTest.ts';
import { binomialLowerTail } from './binomialDistribution.ts';

test("counts 218 where the authors' program does, from 223 by its rule of thumb", () => {
  // Log of rdcont 1.1.0 on Lee (2008): N = 6559, q = 218 (preliminary 223), p = .1980374220065977.
  expect(bestCountNear(223, 0.05, 'two-sided')).toBe(218);
  expect(signTestOf(119, 218, 6559).pTwoSided).toBeCloseTo(0.1980374220065977, 12);
});

test.each(['one-sided', 'two-sided'] as const)('the chosen count attains the level best, %s', (sides) => {
  const tail = sides === 'one-sided' ? 0.05 : 0.025;
  const attained = (q: number) => {
    let best = 0;
    for (let k = 0; k <= q && binomialLowerTail(k, q, 0.5) <= tail; k += 1)
      best = binomialLowerTail(k, q, 0.5);
    return best;
  };
  const chosen = bestCountNear(40, 0.05, sides);
  expect(attained(chosen)).toBeLessThanOrEqual(tail);
  for (let q = 40 - 15; q <= 40 + 15; q += 1) expect(attained(q)).toBeLessThanOrEqual(attained(chosen));
});

test('is where the density is seen that more are counted: far from it the least count that can reject', () => {
  expect(nearestToCount(0, 900, 0.05, 'two-sided')).toBeGreaterThan(
    nearestToCount(2, 900, 0.05, 'two-sided'),
  );
  expect(bestCountNear(1, 0.05, 'one-sided')).toBeGreaterThanOrEqual(1);
});

test('counts all that are as near as the last one, in whatever order they come', () => {
  const values = [...Array.from({ length: 40 }, (_, k) => k - 20), ...Array.from({ length: 30 }, () => 1)];
  const sign = approximateSignTest(values, 0, 0.05, 'one-sided');
  const reversed = approximateSignTest([...values].reverse(), 0, 0.05, 'one-sided');
  expect(sign).toEqual(reversed);
  expect(sign.ok && sign.value.atOrAbove).toBeGreaterThanOrEqual(32);
});

test('a value at the cut-off counts as above it', () => {
  expect(approximateSignTest([-3, -2, -1, 0, 1, 2], 0, 0.05, 'one-sided')).toMatchObject({
    ok: true,
    value: { atOrAbove: 3, nearest: 6 },
  });
});

test('has no answer for too few values or equal ones', () => {
  // One in 32 is the first tail of a coin below 5 %: five throws.
  expect(approximateSignTest([1, 2, 3, 4], 0, 0.05, 'one-sided')).toEqual({
    ok: false,
    error: { kind: 'too-few-points', needed: 5, given: 4 },
  });
  expect(approximateSignTest([1, 1, 1, 1, 1], 0, 0.05, 'one-sided')).toEqual({
    ok: false,
    error: { kind: 'no-spread' },
  });
});

test('mirrored values have the mirrored count', () => {
  const sizes = fc.uniqueArray(fc.double({ min: 0.001, max: 1, noNaN: true }), {
    minLength: 6,
    maxLength: 60,
  });
  fc.assert(
    fc.property(sizes, (given) => {
      const values = given.map((size, k) => (k % 3 === 0 ? -size : size));
      const [plain, mirrored] = [values, values.map((value) => -value)].map((each) => {
        const sign = approximateSignTest(each, 0, 0.05, 'one-sided');
        if (!sign.ok) throw new Error(sign.error.kind);
        return sign.value;
      });
      expect(mirrored!.nearest).toBe(plain!.nearest);
      expect(mirrored!.atOrAbove).toBe(plain!.nearest - plain!.atOrAbove);
    }),
  );
});
