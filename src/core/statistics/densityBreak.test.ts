import { expect, test } from 'vitest';
import { densityBreak } from './densityBreak.ts';
import { normalQuantile } from './normalQuantile.ts';

const sample = Array.from({ length: 200 }, (_, i) => normalQuantile((i + 0.5) / 200) + 0.3);
const shifted = sample.map((value) => (value > -0.15 && value < 0 ? -value : value));

const zOf = (values: readonly number[], given = {}) => {
  const found = densityBreak(values, 0, given);
  return found.ok ? found.value.statistic : found.error.kind;
};

test('sees eleven of two hundred values lifted over the cut-off, at any of the usual bandwidths', () => {
  // R rdd 0.57 gives z from 2.97 to 3.44 over bandwidths for this sample.
  expect(zOf(shifted)).toBeGreaterThan(2.9);
  expect(zOf(shifted, { binWidth: 0.2, bandwidth: 1 })).toBeGreaterThan(2.5);
  expect(Math.abs(Number(zOf(sample)))).toBeLessThan(0.3);
});

test('mirrored values jump the other way', () => {
  const given = { binWidth: 0.2, bandwidth: 1 };
  expect(
    zOf(
      shifted.map((value) => -value),
      given,
    ),
  ).toBeCloseTo(-Number(zOf(shifted, given)), 8);
});

test('takes the units of the values', () => {
  const tenfold = densityBreak(
    shifted.map((value) => 10 * value),
    0,
  );
  const plain = densityBreak(shifted, 0);
  if (!tenfold.ok || !plain.ok) throw new Error('no result');
  expect(tenfold.value.statistic).toBeCloseTo(plain.value.statistic, 8);
  expect(tenfold.value.bandwidth).toBeCloseTo(10 * plain.value.bandwidth, 8);
});

test('says why it cannot be given', () => {
  expect(zOf([1, 2, 3])).toBe('cut-off outside the values');
  expect(zOf([1])).toBe('too-few-points');
  expect(zOf([1, 1])).toBe('no-spread');
  expect(zOf([-2, -1, 1, 2])).toBe('too-few-points');
  expect(zOf([-9, -8, 8, 9], { binWidth: 1, bandwidth: 3 })).toBe('too-few-points');
  // Only the far bins of the left side hold values: the line through them is below nought at the cut-off.
  const falling = [...Array.from({ length: 50 }, () => -4.5), ...Array.from({ length: 50 }, () => 0.5), 4.5];
  expect(zOf(falling, { binWidth: 1, bandwidth: 5 })).toBe('no density at the cut-off');
});
