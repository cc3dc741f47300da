import type { PlainDate } from '../calendar/plainDate.ts';
import { PLAIN_DEFINITION, type MeasureRequest } from '../measures/definition.ts';
import { translationInto } from '../measures/translation.ts';
import type { StatementBook } from '../statements/statementBook.ts';

/**
 * Asks for a measure as the accounts have it: no agreement's definition, no add-backs, the accounts' own currency.
 *
 * @example plainRequest(book, '2026-09-30').addBacks // => []
 */
export const plainRequest = (book: StatementBook, date: PlainDate): MeasureRequest => ({
  book,
  date,
  definition: PLAIN_DEFINITION,
  addBacks: [],
  months: 12,
  translation: translationInto(book.current.at(-1)?.currency ?? '', []),
});
