import { expect, test } from 'vitest';
import { headroomHistogram } from './headroomHistogram.ts';

test('an interval begins at the limit: exactly at the level is on the passing side', () => {
  const { counts, from } = headroomHistogram([-0.02, -1e-9, 0, 0.0199, 0.02], 0.02);
  expect(from).toBe(-0.3);
  expect(counts.slice(13, 18)).toEqual([0, 2, 2, 1, 0]);
});

test.each([0.01, 0.02, 0.03])('multiples of %s fall to the right of their edge', (width) => {
  const bins = Math.round(0.9 / width);
  const edges = Array.from({ length: bins }, (_, k) => Number((-0.3 + k * width).toFixed(12)));
  expect(headroomHistogram(edges, width).counts).toEqual(edges.map(() => 1));
});

test('what ends beyond 30 % on the failing and 60 % on the passing side is counted apart', () => {
  const { counts, below, above } = headroomHistogram([-142, -0.3001, -0.3, 0.5999, 0.6, 1], 0.02);
  expect([below, above]).toEqual([2, 2]);
  expect([counts[0], counts.at(-1)]).toEqual([1, 1]);
});
