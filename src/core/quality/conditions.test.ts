import { expect, test } from 'vitest';
import { buildStatement } from '../statements/statement.fixture.ts';
import { bookOf } from '../statements/statementBook.ts';
import { accountsAt } from './accountsAt.ts';
import { conditionsOf } from './conditions.ts';

const ENDS = ['2025-12-31', '2026-03-31', '2026-06-30', '2026-09-30'] as const;
const THREE = [{ score: 60 }, { score: 61 }, { score: 62 }];

function conditions(
  revenue: readonly number[],
  equity: number,
  quarters: readonly { score: number | null }[] = THREE,
) {
  const statements = [
    ...ENDS.map((end, k) => buildStatement(end, 3, { revenue: revenue[k] })),
    buildStatement('2026-09-30', 0, { equity }),
  ];
  return conditionsOf(accountsAt(bookOf(statements, 12), '2026-09-30'), quarters);
}

test('a third of the year in one quarter is not yet a season, more is', () => {
  expect(conditions([33, 33, 17, 17], 5)).toEqual([]);
  expect(conditions([34, 32, 17, 17], 5)).toEqual([
    "The business is seasonal: its strongest quarter brings 34\u00a0% of the year's revenue. Only twelve months and the same quarter a year before are compared.",
  ]);
});

test('equity below nought is said, nought is not', () => {
  expect(conditions([25, 25, 25, 25], 0)).toEqual([]);
  expect(conditions([25, 25, 25, 25], -1)[0]).toMatch(/^Equity is negative/);
});

test('fewer than three scored quarter ends are said, of a new borrower as of one that reports by halves', () => {
  const flat = [25, 25, 25, 25];
  expect(conditions(flat, 5, [{ score: 60 }])).toEqual([
    'Only 1 of the last three quarter ends is scored: the headline rests on it alone.',
  ]);
  expect(conditions(flat, 5, [{ score: null }, { score: 60 }, { score: 61 }])).toEqual([
    'Only 2 of the last three quarter ends are scored: the headline is their mean.',
  ]);
  expect(conditions(flat, 5, [{ score: null }])).toEqual([]);
});
