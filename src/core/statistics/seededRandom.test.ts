import { expect, test } from 'vitest';
import { seededRandom, xoshiro128 } from './seededRandom.ts';

test('gives the words of the reference implementation of xoshiro128** 1.1', () => {
  // First outputs from the state 1, 2, 3, 4 as tested in the crate rand_xoshiro against the authors' C program.
  const { word } = xoshiro128([1, 2, 3, 4]);
  expect(Array.from({ length: 10 }, word)).toEqual([
    11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597, 4258142804,
  ]);
});

test('repeats itself by the seed, and differs by it', () => {
  const tenOf = (seed: number) => Array.from({ length: 10 }, seededRandom(seed).word);
  expect(tenOf(1)).toEqual(tenOf(1));
  expect(tenOf(1)).not.toEqual(tenOf(2));
  expect(new Set(tenOf(0)).size).toBe(10);
});

test('draws every whole number below the count about equally often', () => {
  const { below } = seededRandom(11);
  const counts = [0, 0, 0, 0, 0, 0, 0];
  for (let draw = 0; draw < 70_000; draw += 1) counts[below(7)]! += 1;
  const chiSquared = counts.reduce((sum, count) => sum + (count - 10_000) ** 2 / 10_000, 0);
  expect(chiSquared).toBeLessThan(22.46); // 0.1 % point with 6 degrees of freedom
});
