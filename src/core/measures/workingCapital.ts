import { monthsBefore } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import { balanceAt } from '../statements/flows.ts';
import type { MeasureRequest } from './definition.ts';
import { atAverageOfMonths } from './readLines.ts';

/**
 * The increase in working capital over the request's months, tax left out because cash tax stands on its own; in
 * another currency at the average rate of the months, as every cash flow. Source: methods.md A3.
 *
 * @example workingCapitalIncrease(request).kind // => 'missing'
 */
export function workingCapitalIncrease(request: MeasureRequest): Reading {
  const { date, months } = request;
  const increase = sumOfReadings([
    { sign: 1, reading: workingCapitalOn(request, date) },
    { sign: -1, reading: workingCapitalOn(request, monthsBefore(date, months)) },
  ]);
  return increase.kind === 'value' ? atAverageOfMonths(request, increase) : increase;
}

/** Current assets without cash less current liabilities without debt and tax; by its parts where totals are not given. */
function workingCapitalOn({ book }: MeasureRequest, date: PlainDate): Reading {
  const byTotals = sumOfReadings([
    { sign: 1, reading: balanceAt(book, 'current_assets', date) },
    { sign: -1, reading: balanceAt(book, 'cash', date) },
    { sign: -1, reading: balanceAt(book, 'restricted_cash', date, 'optional') },
    { sign: -1, reading: balanceAt(book, 'current_liabilities', date) },
    { sign: 1, reading: balanceAt(book, 'short_term_debt', date, 'optional') },
    { sign: 1, reading: balanceAt(book, 'tax_payable', date, 'optional') },
  ]);
  if (byTotals.kind === 'value') return byTotals;
  const byParts = sumOfReadings([
    { sign: 1, reading: balanceAt(book, 'receivables', date) },
    { sign: 1, reading: balanceAt(book, 'inventory', date, 'optional') },
    { sign: 1, reading: balanceAt(book, 'other_current_assets', date, 'optional') },
    { sign: -1, reading: balanceAt(book, 'payables', date) },
    { sign: -1, reading: balanceAt(book, 'accrued_liabilities', date, 'optional') },
  ]);
  return byParts.kind === 'value' ? byParts : byTotals;
}
