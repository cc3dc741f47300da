import { expect, test } from 'vitest';
import { decimal } from '#core/money/decimal.ts';
import { findSums, type SumRow } from './arithmetic.ts';

const row = (values: readonly number[], given: Partial<SumRow> = {}): SumRow => ({
  values: values.map((value) => decimal(value)),
  sign: 1,
  eitherSign: false,
  role: 'part',
  closes: 'nothing',
  barrier: false,
  ...given,
});
const total = (values: readonly number[], closes: SumRow['closes'] = 'since-total') =>
  row(values, { role: 'total', closes });
const STEP = decimal(1);

test('totals of sections and of the whole are found, each from its own parts', () => {
  const found = findSums(
    [row([10, 12]), row([20, 22]), total([30, 34]), row([5, 6]), total([5, 6]), total([35, 40])],
    STEP,
  );
  expect([...found.sums]).toEqual([
    [2, [0, 1]],
    [4, [3]],
    [5, [2, 4]],
  ]);
});

test('a row whose sign is open gets the one that makes its total come out', () => {
  const rows = [row([100]), row([30], { eitherSign: true }), total([70], 'all')];
  expect(findSums(rows, STEP).signs.get(1)).toBe(-1);
});

test('rounding of each part is allowed for: half a step a row, and no more', () => {
  const rows = (sum: number) => [row([10]), row([20]), total([sum])];
  expect(findSums(rows(31), STEP).sums.size).toBe(1);
  expect(findSums(rows(32), STEP).sums.size).toBe(0);
});

test('a typed total that is wrong is found out by the wider total that its parts fit', () => {
  const found = findSums(
    [row([10]), row([20]), total([45]), row([7]), row([3]), total([10]), total([40])],
    STEP,
  );
  expect([...found.untied]).toEqual([[2, [0, 1]]]);
  expect([...found.contradicted]).toEqual([2]);
});

test('a result that equals the row above it is not taken for its total', () => {
  const found = findSums(
    [row([100]), row([60], { sign: -1 }), total([40], 'all'), row([20], { sign: -1 }), total([20], 'all')],
    STEP,
  );
  expect(found.sums.get(4)).toEqual([2, 3]);
});
