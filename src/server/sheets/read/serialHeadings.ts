/** Days in a heading that stand as bare numbers, because the sheet's format for days was lost. */
import { addDays, daysInMonth, type PlainDate } from '#core/calendar/plainDate.ts';
import type { SheetCell, SheetGrid } from './cells.ts';
import { readHeadingText, saysPeriod } from './headingText.ts';
import { lineOf, PARTS } from './labels.ts';

/** Day 0 of the two systems in which spreadsheets count days. */
const [DAY_ZERO_1900, DAY_ZERO_1904] = ['1899-12-30', '1904-01-01'] as [PlainDate, PlainDate];
const [FIRST_YEAR, LAST_YEAR] = [2000, 2050];

/** Only the first row of numbers, where all of them are last days of months and no heading above names a period. */
export function withSerialHeadings(sheet: SheetGrid, from1904: boolean): SheetGrid {
  const numbers = [...sheet.rows.keys()].sort((one, other) => one - other);
  const first = numbers.find((number) => amountsIn(sheet, number).length > 0);
  const row = first === undefined ? undefined : sheet.rows.get(first);
  if (!row || first === undefined) return sheet;
  const above = numbers
    .filter((number) => number < first)
    .flatMap((number) => [...(sheet.rows.get(number)?.values() ?? [])]);
  if (above.some((cell) => row.has(cell.column) && cell.column > 1 && namesPeriod(cell))) return sheet;
  const dated = new Map<number, SheetCell>();
  for (const cell of row.values()) {
    if (cell.kind !== 'amount') {
      if (cell.kind === 'text' && isLine(cell.text)) return sheet;
      continue;
    }
    const day = monthEndOf(cell, from1904);
    if (!day) return sheet;
    dated.set(cell.column, { ...cell, kind: 'date', amount: null, date: day, text: day });
  }
  const rows = new Map(sheet.rows);
  rows.set(first, new Map([...row, ...dated]));
  return { ...sheet, rows };
}

const amountsIn = (sheet: SheetGrid, number: number): SheetCell[] =>
  [...(sheet.rows.get(number)?.values() ?? [])].filter(({ kind }) => kind === 'amount');

const namesPeriod = ({ kind, text }: SheetCell): boolean =>
  kind === 'date' || saysPeriod(readHeadingText(text));

const isLine = (label: string): boolean => PARTS.some((part) => lineOf(label, part, null) !== null);

function monthEndOf({ amount, fromText }: SheetCell, from1904: boolean): PlainDate | null {
  if (!amount?.isInteger() || fromText || amount.lt(30_000) || amount.gt(60_000)) return null;
  const day = addDays(from1904 ? DAY_ZERO_1904 : DAY_ZERO_1900, amount.toNumber());
  const [year, month, date] = day.split('-').map(Number) as [number, number, number];
  return year >= FIRST_YEAR && year <= LAST_YEAR && date === daysInMonth(year, month) ? day : null;
}
