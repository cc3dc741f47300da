import { describe, expect, test } from 'vitest';
import { coarseRatios } from './coarseRatios.ts';

const most = (tested: number, ratioStep: number | null = 0.01) => ({
  tested,
  distance: 3.5 - tested,
  ratioStep,
});
const least = (tested: number) => ({ tested, distance: tested - 2, ratioStep: 0.01 });

describe('cells around the level', () => {
  test('a ratio counts where the agreement rounds it to, on either side', () => {
    // At most 3.50x: 3.504 rounds to the level, 3.506 to one step over it, 3.492 to one step below.
    expect(coarseRatios([3.504, 3.496, 3.506, 3.514, 3.492, 3.516, 3.48].map((x) => most(x)))).toMatchObject({
      counts: { previous: 2, at: 2, next: 1 },
      rounded: 7,
      n: 5,
    });
    // At least 2.00x: more is the passing side.
    expect(coarseRatios([1.996, 2.004, 2.012, 1.988].map(least))).toMatchObject({
      counts: { previous: 1, at: 2, next: 1 },
    });
  });

  test('a level between two steps has no cell, and is told among those rounded', () => {
    expect(coarseRatios([{ tested: 3.502, distance: 0.003, ratioStep: 0.01 }])).toMatchObject({
      n: 0,
      pValue: 1,
      rounded: 1,
    });
  });

  test('tests without a ratio and agreements that do not round are left out; without any it is not done', () => {
    expect(coarseRatios([most(3.5, null), { tested: null, distance: null, ratioStep: 0.01 }])).toBeNull();
    expect(coarseRatios([most(3.5, null), most(3.5)])).toMatchObject({ rounded: 1, n: 1 });
  });
});

test('is Frandsen’s test with the bound of 5 %', () => {
  const rows = [
    ...Array.from({ length: 14 }, () => most(3.51)),
    ...Array.from({ length: 61 }, () => most(3.5)),
    ...Array.from({ length: 38 }, () => most(3.49)),
  ];
  // (1 - .05) / (3 - .05) and (1 + .05) / (3 + .05), by hand.
  expect(coarseRatios(rows)!.shareLow).toBeCloseTo(0.3220338983, 9);
  expect(coarseRatios(rows)!.shareHigh).toBeCloseTo(0.3442622951, 9);
});
