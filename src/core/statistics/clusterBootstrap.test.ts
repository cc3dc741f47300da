import { expect, test } from 'vitest';
import { clusterBootstrap } from './clusterBootstrap.ts';
import { seededRandom } from './seededRandom.ts';

const random = seededRandom(5);
const values = Array.from({ length: 200 }, () => random.share());
const meanOf = (drawn: readonly number[]) => drawn.reduce((sum, value) => sum + value, 0) / drawn.length;

test('finds the standard error of a mean', () => {
  const found = clusterBootstrap(values, meanOf, { draws: 2_000, seed: 1 });
  if (!found.ok) throw new Error(found.error.kind);
  const mean = meanOf(values);
  const wanted = Math.sqrt(meanOf(values.map((value) => (value - mean) ** 2)) / values.length);
  expect(found.value.standardError / wanted).toBeGreaterThan(0.94);
  expect(found.value.standardError / wanted).toBeLessThan(1.06);
  expect(found.value.low).toBeLessThan(mean - 1.7 * wanted);
  expect(found.value.high).toBeGreaterThan(mean + 1.7 * wanted);
});

test('rows that repeat within a cluster add no precision', () => {
  const fours = values.map((value) => [value, value, value, value]);
  const over = (drawn: readonly (readonly number[])[]) => meanOf(drawn.flat());
  const settings = { draws: 300, seed: 9 };
  const [clustered, plain] = [
    clusterBootstrap(fours, over, settings),
    clusterBootstrap(values, meanOf, settings),
  ];
  expect(clustered.ok && clustered.value.standardError).toBeCloseTo(
    plain.ok ? plain.value.standardError : 0,
    10,
  );
});

test('is the same for the same seed and needs two clusters', () => {
  const at = (seed: number) => clusterBootstrap(values, meanOf, { draws: 50, seed });
  expect(at(3)).toEqual(at(3));
  expect(at(3)).not.toEqual(at(4));
  expect(clusterBootstrap([1], meanOf, { draws: 50, seed: 1 })).toEqual({
    ok: false,
    error: { kind: 'too-few-points', needed: 2, given: 1 },
  });
});
