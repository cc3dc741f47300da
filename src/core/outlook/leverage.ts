import type { PlainDate } from '../calendar/plainDate.ts';
import { netLeverage } from '../measures/netLeverage.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { plainRequest } from './plainRequest.ts';

/** Enough to tell thirds apart; the figure is stored for every test of the book. */
const DIGITS = 6;

/**
 * Net debt over EBITDA of twelve months as reported, by which a borrower is put into a third of its sector. Null
 * where the figures are not there or earnings are not positive. Net cash is below nought and stands lowest.
 *
 * @example leverageOn(book, '2026-09-30') // => 3
 */
export function leverageOn(book: StatementBook, date: PlainDate): number | null {
  const { numerator: debt, denominator: ebitda } = netLeverage.measure(plainRequest(book, date));
  if (debt.kind !== 'value' || ebitda?.kind !== 'value' || ebitda.value.lte(0)) return null;
  return Number(debt.value.div(ebitda.value).toNumber().toPrecision(DIGITS));
}
