/** Statements for tests: what matters is named, the rest is ordinary. */
import { addDays, addMonthsToMonthEnd, type PlainDate } from '../calendar/plainDate.ts';
import { decimal } from '../money/decimal.ts';
import type { LineItemCode } from './lineItems.ts';
import type { Amounts, Statement } from './statement.ts';

let lastId = 0;

export function buildStatement(
  periodEnd: PlainDate,
  months: number,
  figures: Readonly<Partial<Record<LineItemCode, number | string | undefined>>>,
  given: Partial<Statement> = {},
): Statement {
  lastId += 1;
  const amounts = Object.fromEntries(
    Object.entries(figures).flatMap(([line, value]) => (value === undefined ? [] : [[line, decimal(value)]])),
  ) as Amounts;
  return {
    id: lastId,
    periodStart: months === 0 ? periodEnd : addDays(addMonthsToMonthEnd(periodEnd, -months), 1),
    periodEnd,
    months,
    basis: 'management',
    scope: 'group',
    framework: 'IFRS',
    currency: 'EUR',
    roundingUnit: decimal(1),
    amounts,
    tie: 'ties',
    version: 1,
    receivedOn: addDays(periodEnd, 40),
    importId: null,
    ...given,
  };
}
