import { ZERO } from '../money/decimal.ts';
import type { LineItemCode } from './lineItems.ts';
import type { Reading } from './reading.ts';
import type { StatementBook } from './statementBook.ts';

const NONE: Reading = { kind: 'value', value: ZERO, inputs: [] };

/**
 * A reading of a line that many borrowers do not have: nought where none of the borrower's statements ever carried
 * it. Where some carried it and this one leaves it out, the line stays missing: blank is not zero.
 *
 * Desk practice, no source.
 *
 * @example orNoneIfNeverCarried(book, 'junior_debt', { kind: 'missing', missing: [] }).value // => 0
 */
export const orNoneIfNeverCarried = (book: StatementBook, line: LineItemCode, reading: Reading): Reading =>
  reading.kind === 'missing' && !book.carries(line) ? NONE : reading;
