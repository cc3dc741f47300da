import { expect, test } from 'vitest';
import { bookParts, type BookPart } from './bookParts.ts';
import { buildEvenBook } from './headroomBook.fixture.ts';

const named = (parts: readonly BookPart[]) =>
  parts.map(({ measure, sector, pattern }) => [
    measure,
    sector,
    pattern.ok ? pattern.value.n : `${pattern.error.kind}: ${pattern.error.given}`,
  ]);

test('the whole book, each type, each sector, each type in each sector', () => {
  const rows = [
    ...buildEvenBook(600, { sector: 'paper', measure: 'interest-cover' }),
    ...buildEvenBook(400, { sector: 'paper' }),
    ...buildEvenBook(240, { sector: 'glass' }),
  ];
  expect(named(bookParts(rows, 1))).toEqual([
    [null, null, 1_240],
    ['interest-cover', null, 600],
    ['net-leverage', null, 640],
    [null, 'paper', 1_000],
    [null, 'glass', 'too few tests near the limit: 80'],
    ['interest-cover', 'paper', 600],
    ['net-leverage', 'paper', 400],
    ['net-leverage', 'glass', 'too few tests near the limit: 80'],
  ]);
});

test('a part of fewer than five borrowers is refused, whatever it holds', () => {
  const of = (borrowers: number) =>
    bookParts(
      buildEvenBook(900).map((row, k) => ({ ...row, borrowerId: k % borrowers })),
      1,
    )[0]!.pattern;
  expect(of(4)).toEqual({ ok: false, error: { kind: 'too few borrowers', needed: 5, given: 4 } });
  expect([of(5).ok, of(6).ok]).toEqual([true, true]);
});

test('borrowers of whom every test is removed are nobody', () => {
  const rows = buildEvenBook(900).map((row, k) => ({
    ...row,
    borrowerId: k % 5,
    removal: k % 5 === 0 ? ('waived' as const) : null,
  }));
  expect(bookParts(rows, 1)[0]!.pattern).toMatchObject({ ok: false, error: { given: 4 } });
});

test('the same seed draws the same interval, and everything is plain JSON', () => {
  const rows = buildEvenBook(900);
  const parts = bookParts(rows, 7);
  expect(bookParts(rows, 7)).toEqual(parts);
  expect(JSON.parse(JSON.stringify(parts))).toEqual(parts);
});
