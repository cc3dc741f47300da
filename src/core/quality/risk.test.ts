import fc from 'fast-check';
import { expect, test } from 'vitest';
import { compositeScore, pointsOf } from './quarterScore.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import { QUALITY_BLOCKS } from './score.ts';
import { fScoreRisk, mScoreRisk } from './screens.ts';
import { stretchOf } from './stretch.ts';

const blocksOf = (risks: readonly (number | null)[]) =>
  QUALITY_BLOCKS.map((name, k) => ({ weight: QUALITY_TABLE.weights[name], risk: risks[k] ?? null }));

test('weights add up to 100', () => {
  expect(Object.values(QUALITY_TABLE.weights).reduce((sum, weight) => sum + weight, 0)).toBe(100);
});

// Weighted means worked in Python.
test('the score is 100 less the weighted mean risk of what is available', () => {
  expect(compositeScore(blocksOf([0.93, 0.912673, 0.8, 0.5, 0.6])).score).toBeCloseTo(14.94308, 9);
  expect(compositeScore(blocksOf([0.93, 0.912673, 0.8, null, 0.6])).score).toBeCloseTo(11.047866666667, 9);
});

test('60 of 100 points of weight are enough, fewer give no score', () => {
  const enough = compositeScore(blocksOf([null, 0.6, 0.4, 0.2, null]));
  expect(enough.coverage).toBe(60);
  expect(enough.score).toBeCloseTo(50, 10);
  expect(compositeScore(blocksOf([null, 0.6, 0.4, null, 0.2]))).toEqual({ coverage: 55, score: null });
});

test('a score lies between 0 and 100 and the points of the blocks sum to it', () => {
  const risk = fc.option(fc.double({ min: 0, max: 1, noNaN: true }));
  fc.assert(
    fc.property(fc.array(risk, { minLength: 5, maxLength: 5 }), (risks) => {
      const blocks = blocksOf(risks);
      const { coverage, score } = compositeScore(blocks);
      fc.pre(score !== null);
      if (score === null) return;
      expect(score).toBeGreaterThanOrEqual(-1e-9);
      expect(score).toBeLessThanOrEqual(100 + 1e-9);
      const points = blocks.map((block) => pointsOf(block, coverage));
      expect(points.reduce((sum, each) => sum + each, 0)).toBeCloseTo(score, 9);
    }),
  );
});

test('the largest of three percentiles is taken to the third power, of one to the first', () => {
  expect(stretchOf({ receivables: 0.97, inventory: 0.55, capitalised: 0.4 })).toMatchObject({
    sharpest: 'receivables',
    channels: 3,
  });
  expect(stretchOf({ receivables: 0.97, inventory: 0.55, capitalised: 0.4 })?.risk).toBeCloseTo(0.912673, 12);
  expect(stretchOf({ receivables: null, inventory: null, capitalised: 0.4 })?.risk).toBe(0.4);
  expect(stretchOf({ receivables: null, inventory: null, capitalised: null })).toBeNull();
});

test('the published cut-offs are read at their risks, with straight lines between and no further outside', () => {
  expect([-3, -2.76, -2.22, -2, -1.78, -1, 5].map(mScoreRisk)).toEqual([
    0,
    0,
    0.35,
    expect.closeTo(0.5, 12),
    0.65,
    1,
    1,
  ]);
  expect([0, 0.5, 1, 1.425, 1.85, 2.45, 9].map(fScoreRisk)).toEqual([
    0.15,
    0.15,
    0.4,
    expect.closeTo(0.575, 12),
    0.75,
    1,
    1,
  ]);
});
