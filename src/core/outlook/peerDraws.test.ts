import { expect, test } from 'vitest';
import { isNotMetAfter, peerDraws } from './peerDraws.ts';

test('a most is not met where the ratio grows by more than its slack', () => {
  // 3.5 / 2.8 = 1.25
  const changes = [1.25, 1.250001, 1.24, -0.5, 'earnings gone'] as const;
  expect(changes.map((change) => isNotMetAfter('most', 1.25, change))).toEqual([
    false,
    true,
    false,
    false,
    true,
  ]);
});

test('a least is not met where the ratio falls by more than its slack', () => {
  const changes = [0.5, 0.499999, 0.6, -0.5, 'earnings gone'] as const;
  expect(changes.map((change) => isNotMetAfter('least', 2, change))).toEqual([
    false,
    true,
    false,
    true,
    true,
  ]);
});

test('counts a draw once in which any of the tests is not met, and no covenant that is not there', () => {
  const tests = [
    { bound: 'most', ratio: 3.2, level: 3.5 },
    { bound: 'least', ratio: 2.4, level: 2 },
    { bound: 'most', ratio: null, level: 1 },
  ] as const;
  const draws = [
    [1, 1, 9],
    [1.2, 0.7, 9],
    [1.2, 1, 9],
    [1, 0.7, 9],
    [1, 'earnings gone', 9],
  ] as const;
  expect(peerDraws(tests, draws)).toMatchObject({
    notMet: 4,
    share: 0.8,
    n: 5,
    slacks: [1.09375, 1.2, null],
  });
});

test('no draws give no share', () => {
  expect(peerDraws([{ bound: 'most', ratio: 3, level: 3.5 }], [])).toMatchObject({ share: null, n: 0 });
});
