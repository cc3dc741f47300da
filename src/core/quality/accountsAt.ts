import { monthsBefore } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { ebitdaOfTwelveMonths } from '../measures/ebitda.ts';
import { toSample } from '../money/toSample.ts';
import { lastTwelveMonths, quarterFlow } from '../statements/flows.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import type { InputUsed, Reading } from '../statements/reading.ts';
import type { Statement } from '../statements/statement.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import { samplesOf, type Route } from './samples.ts';

/** Years and quarters before the quarter end that is looked at. */
export interface Back {
  readonly months: number;
}
export const NOW: Back = { months: 0 };
export const YEAR_AGO: Back = { months: 12 };
export const QUARTER_AGO: Back = { months: 3 };
export const TWO_YEARS_AGO: Back = { months: 24 };

/** A borrower's accounts around one quarter end, read as points of a sample; undefined where a figure is missing. */
export interface AccountsAt {
  readonly twelveMonths: (line: LineItemCode, back?: Back) => number | undefined;
  readonly quarter: (line: LineItemCode, back?: Back) => number | undefined;
  readonly balance: (line: LineItemCode, back?: Back) => number | undefined;
  /** The same, nought for a line that the borrower had never carried by then. */
  readonly optionalTwelveMonths: (line: LineItemCode, back?: Back) => number | undefined;
  readonly optionalQuarter: (line: LineItemCode, back?: Back) => number | undefined;
  readonly optionalBalance: (line: LineItemCode, back?: Back) => number | undefined;
  readonly ebitda: () => number | undefined;
  readonly hasBalanceSheet: (back: Back) => boolean;
  readonly hasQuarter: (line: LineItemCode, back?: Back) => boolean;
  /** Nobody gave it, as against figures that contradict each other. */
  readonly isMissing: (line: LineItemCode) => boolean;
  readonly sample: (reading: Reading) => number | undefined;
  /** The statements that any figure read so far rests on. */
  readonly used: () => readonly Statement[];
  /** The cells that they came from. */
  readonly cells: () => readonly InputUsed[];
}

/**
 * A borrower's accounts around one quarter end: flows of twelve months and of the quarter, balances, each now or so many
 * months back. Units as in the statements; undefined where a figure is missing or has no meaning.
 *
 * @example accountsAt(book, '2026-09-30').twelveMonths('revenue') // => 90000000
 */
export function accountsAt(book: StatementBook, quarterEnd: PlainDate): AccountsAt {
  const read: (readonly InputUsed[])[] = [];
  // Put together only where it is asked for: most figures are read more than once.
  const usedIds = (): ReadonlySet<number> => {
    const ids = new Set<number>();
    for (const inputs of new Set(read)) for (const { statementId } of inputs) ids.add(statementId);
    return ids;
  };
  const sample = (reading: Reading): number | undefined => {
    if (reading.kind !== 'value') return undefined;
    read.push(reading.inputs);
    return toSample(reading.value);
  };
  const samples = samplesOf(book);
  const dates = new Map<number, PlainDate>();
  const dateOf = (months: number): PlainDate => {
    const known = dates.get(months);
    if (known !== undefined) return known;
    const date = monthsBefore(quarterEnd, months);
    dates.set(months, date);
    return date;
  };
  const figure =
    (route: Route) =>
    (line: LineItemCode, back: Back = NOW): number | undefined => {
      const found = samples(route, line, dateOf(back.months));
      if (found === null) return undefined;
      read.push(found.inputs);
      return found.value;
    };
  return {
    twelveMonths: figure('twelve months'),
    quarter: figure('quarter'),
    balance: figure('balance'),
    optionalTwelveMonths: figure('twelve months, optional'),
    optionalQuarter: figure('quarter, optional'),
    optionalBalance: figure('balance, optional'),
    ebitda: () => sample(ebitdaOfTwelveMonths(book, quarterEnd).ebitda),
    hasQuarter: (line, back = NOW) => quarterFlow(book, line, dateOf(back.months)).kind === 'value',
    hasBalanceSheet: ({ months }) => book.statementOf(dateOf(months), 0) !== null,
    isMissing: (line) => lastTwelveMonths(book, line, quarterEnd).kind === 'missing',
    sample,
    used: () => [...usedIds()].flatMap((id) => book.statementById(id) ?? []),
    cells: () => read.flat(),
  };
}

/**
 * The result of a calculation whose every operand is there.
 *
 * @example ifAll({ one: 1, other: undefined }, ({ one, other }) => one + other) // => undefined
 */
export function ifAll<Names extends string>(
  operands: Readonly<Record<Names, number | undefined>>,
  calculate: (operands: Readonly<Record<Names, number>>) => number | undefined,
): number | undefined {
  return Object.values(operands).every((value) => value !== undefined)
    ? calculate(operands as Readonly<Record<Names, number>>)
    : undefined;
}
