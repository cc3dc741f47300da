import { expect, test } from 'vitest';
import { BOOK_PATTERN_SETTINGS, bookPattern } from './bookPattern.ts';
import { buildBook, buildEvenBook } from './headroomBook.fixture.ts';
import type { HeadroomRow } from './headroomRow.ts';
import { leadingTest } from './leadingTest.ts';

const leading = (rows: readonly HeadroomRow[]) => {
  const found = bookPattern(rows, { ...BOOK_PATTERN_SETTINGS, draws: 10, seed: 1 });
  if (!found.ok) throw new Error(found.error.kind);
  return { pattern: found.value, ...leadingTest(found.value) };
};

test('below 1,000 tests the sign test speaks, from 1,000 on the standardized difference', () => {
  expect([999, 1_000, 1_001].map((count) => leading(buildEvenBook(count)).test)).toEqual([
    'approximate sign test',
    'standardized difference',
    'standardized difference',
  ]);
});

test('it rejects at 5 %', () => {
  const book = buildBook({ seed: 3, borrowers: 300, quarters: 20, lifters: 0.35, lifting: 0.9 });
  const { pattern, pValue, rejects } = leading(book);
  expect(pValue).toBe(pattern.headline.pRight);
  expect(rejects).toBe(true);
  const at = (pRight: number | null) =>
    leadingTest({ ...pattern, headline: { ...pattern.headline, pRight } }).rejects;
  expect([at(0.049), at(0.05), at(0.051), at(null)]).toEqual([true, true, false, false]);
});

test('a sign test that cannot be made says nothing', () => {
  const { pattern } = leading(buildEvenBook(900));
  const none = leadingTest({ ...pattern, signTest: { ok: false, error: { kind: 'no-spread' } } });
  expect(none).toEqual({ test: 'approximate sign test', pValue: null, rejects: false });
});
