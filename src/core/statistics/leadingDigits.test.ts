import fc from 'fast-check';
import { expect, test } from 'vitest';
import { benfordShares, digitCounts, digitTest } from './leadingDigits.ts';
import { seededRandom } from './seededRandom.ts';

test('the second digits have the published shares', () => {
  // Five decimals of methods.md C6, by the sum over the first digit.
  const printed = [
    '.11968',
    '.11389',
    '.10882',
    '.10433',
    '.10031',
    '.09668',
    '.09337',
    '.09035',
    '.08757',
    '.08500',
  ];
  expect(benfordShares('second').map((share) => share.toFixed(5).slice(1))).toEqual(printed);
});

test.each(['first', 'second'] as const)('the shares of the %s digit sum to one', (place) => {
  expect(benfordShares(place).reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 12);
});

test('reads the digits as they are written', () => {
  const digits = fc.tuple(
    fc.integer({ min: 1, max: 9 }),
    fc.integer({ min: 0, max: 9 }),
    fc.integer({ min: 0, max: 99 }),
    fc.integer({ min: -8, max: 8 }),
  );
  fc.assert(
    fc.property(digits, ([first, second, rest, power]) => {
      const value = -Number(`${first}.${second}${rest}e${power}`);
      expect(digitCounts([value], 'first')[first - 1]).toBe(1);
      expect(digitCounts([value], 'second')[second]).toBe(1);
    }),
  );
  expect(digitCounts([7, 0, Number.NaN], 'second')).toEqual([1, 0, 0, 0, 0, 0, 0, 0, 0, 0]);
});

test('sees nothing in numbers of even logarithm and much in even numbers', () => {
  const random = seededRandom(2);
  const logEven = Array.from({ length: 5_000 }, () => 10 ** (6 * random.share()));
  const even = Array.from({ length: 5_000 }, () => 1 + 8.99 * random.share());
  const first = (values: readonly number[]) => digitTest(digitCounts(values, 'first'), 'first');
  expect(first(logEven)).toMatchObject({ ok: true, value: { meanDeviation: { conformity: 'close' } } });
  expect(first(even)).toMatchObject({ ok: true, value: { meanDeviation: { conformity: 'none' } } });
});

test('gives the mean deviation from a thousand values on', () => {
  const at = (last: number) => digitTest([301, 176, 125, 97, 79, 67, 58, 51, last], 'first');
  expect(at(45)).toMatchObject({ ok: true, value: { n: 999, meanDeviation: null } });
  expect(at(46)).toMatchObject({ ok: true, value: { n: 1_000, meanDeviation: { conformity: 'close' } } });
  expect(at(47)).toMatchObject({ ok: true, value: { n: 1_001 } });
});

test('needs an expected count of five in the rarest digit', () => {
  // 5 / log10(10/9) = 109.3
  const at = (n: number) => digitTest([n, 0, 0, 0, 0, 0, 0, 0, 0], 'first');
  expect(at(109)).toEqual({ ok: false, error: { kind: 'too-few-points', needed: 110, given: 109 } });
  expect(at(110).ok).toBe(true);
});

test('takes the continuity term off only where it is smaller than the difference', () => {
  const found = digitTest([301, 176, 125, 97, 79, 67, 58, 51, 46], 'first');
  if (!found.ok) throw new Error(found.error.kind);
  const share = Math.log10(2);
  // .301 lies .00003 off, less than 1/2000: the whole difference counts, by hand.
  expect(found.value.z[0]).toBeCloseTo((share - 0.301) / Math.sqrt((share * (1 - share)) / 1_000), 10);
  expect(found.value.degreesOfFreedom).toBe(8);
});
