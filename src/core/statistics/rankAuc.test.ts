import fc from 'fast-check';
import { expect, test } from 'vitest';
import { midRanks, rankAuc } from './rankAuc.ts';

test('counts a tie half: five and a half of nine pairs are in order', () => {
  // Pairs worked by hand: positives .35, .8, .4 against negatives .1, .4, .7.
  const auc = rankAuc([0.1, 0.4, 0.35, 0.8, 0.4, 0.7], [false, false, true, true, true, false]);
  expect(auc).toMatchObject({ ok: true, value: { positives: 3, negatives: 3 } });
  expect(auc.ok && auc.value.estimate).toBeCloseTo(5.5 / 9, 12);
});

test('needs both kinds', () => {
  expect(rankAuc([1, 2], [true, true])).toEqual({
    ok: false,
    error: { kind: 'too-few-points', needed: 1, given: 0 },
  });
});

test('shares a rank among ties', () => {
  expect(midRanks([3, 1, 3, 2])).toEqual([3.5, 1, 3.5, 2]);
});

test('is the share of pairs in order', () => {
  const point = fc.tuple(fc.integer({ min: 0, max: 6 }), fc.boolean());
  fc.assert(
    fc.property(fc.array(point, { minLength: 2, maxLength: 25 }), (points) => {
      const auc = rankAuc(
        points.map(([score]) => score),
        points.map(([, label]) => label),
      );
      const pairs = points
        .filter(([, label]) => label)
        .flatMap(([high]) => points.filter(([, label]) => !label).map(([low]) => high - low));
      if (pairs.length === 0) expect(auc.ok).toBe(false);
      else {
        const inOrder = pairs.reduce((sum, gap) => sum + (gap > 0 ? 1 : gap === 0 ? 0.5 : 0), 0);
        expect(auc.ok && auc.value.estimate).toBeCloseTo(inOrder / pairs.length, 10);
      }
    }),
  );
});
