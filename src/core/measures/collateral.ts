/** What the loan is held against: the latest valuation that the statements carry. */
import type { PlainDate } from '../calendar/plainDate.ts';
import type { Statement } from '../statements/statement.ts';
import type { StatementBook } from '../statements/statementBook.ts';

/** A valuation, and the day it was first shown on. */
export interface Valuation {
  readonly statement: Statement;
  readonly valuedOn: PlainDate;
}

/**
 * The latest valuation up to a day. A value that statement after statement repeats to the unit was carried forward:
 * it is as old as the first one that shows it. Null where none was ever given. Desk practice, no source.
 *
 * @example latestValuation(book, '2026-09-30') // => null
 */
export function latestValuation(book: StatementBook, date: PlainDate): Valuation | null {
  const valued = book.current.filter(
    ({ amounts, periodEnd, months }) => amounts.collateral_value && months === 0 && periodEnd <= date,
  );
  const statement = valued.at(-1);
  const value = statement?.amounts.collateral_value;
  if (!statement || !value) return null;
  const before = valued.findLastIndex(({ amounts }) => !amounts.collateral_value?.eq(value));
  return { statement, valuedOn: (valued[before + 1] ?? statement).periodEnd };
}
