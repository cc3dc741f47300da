import fc from 'fast-check';
import { expect, test } from 'vitest';
import { linearPercentile, medianOf, middleOf, midRank, rankCounts, withoutMember } from './percentile.ts';

test('reads percentiles as R type 7: quantile(c(1, 3, 4, 10), c(.01, .25, .5, .99))', () => {
  const sample = [1, 3, 4, 10];
  // Worked by hand from the definition: position 3p between neighbours.
  expect(linearPercentile(sample, 0.01)).toBeCloseTo(1.06, 12);
  expect(linearPercentile(sample, 0.25)).toBeCloseTo(2.5, 12);
  expect(linearPercentile(sample, 0.5)).toBeCloseTo(3.5, 12);
  expect(linearPercentile(sample, 0.99)).toBeCloseTo(9.82, 12);
  expect(linearPercentile([7], 0.99)).toBe(7);
  expect(() => linearPercentile([], 0.5)).toThrow('at least one point');
});

test('counts a tie half', () => {
  expect(midRank(rankCounts([1, 2, 2, 3], 2))).toBe(0.5);
  expect(midRank(rankCounts([1, 2, 2, 3], 0))).toBe(0);
  expect(midRank(rankCounts([1, 2, 2, 3], 4))).toBe(1);
  expect(midRank(rankCounts([], 4))).toBeNull();
});

const sample = fc.array(fc.integer({ min: -5, max: 5 }), { minLength: 1, maxLength: 40 });

test('leaving a member out is the same as never having had it', () => {
  fc.assert(
    fc.property(sample, fc.nat(), fc.integer({ min: -6, max: 6 }), (values, pick, value) => {
      const member = values[pick % values.length]!;
      const sorted = [...values].sort((a, b) => a - b);
      const others = [...sorted];
      others.splice(others.indexOf(member), 1);
      expect(withoutMember(rankCounts(sorted, value), value, member)).toEqual(rankCounts(others, value));
      const leftOut = rankCounts(sorted, member).below;
      expect(medianOf(middleOf(sorted), leftOut)).toBe(
        others.length === 0 ? null : linearPercentile(others, 0.5),
      );
      expect(medianOf(middleOf(sorted), null)).toBe(linearPercentile(sorted, 0.5));
    }),
  );
});

test('a percentile and that of the mirrored sample add up to one', () => {
  fc.assert(
    fc.property(sample, fc.integer({ min: -6, max: 6 }), (values, value) => {
      const sorted = [...values].sort((a, b) => a - b);
      const mirrored = sorted.map((each) => -each).reverse();
      expect(midRank(rankCounts(sorted, value))! + midRank(rankCounts(mirrored, -value))!).toBeCloseTo(1, 12);
    }),
  );
});
