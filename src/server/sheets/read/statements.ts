/** A table read as statements: its columns with their words, its rows with their lines, its scale. */
import type { PlainDate } from '#core/calendar/plainDate.ts';
import type { Decimal } from '#core/money/decimal.ts';
import { isLineItemCode } from '#core/statements/lineItems.ts';
import type { Asking } from './asking.ts';
import { cellName, type SheetGrid } from './cells.ts';
import { columnWords, titlePeriod, type ColumnWords } from './columns.ts';
import { oriented } from './orientation.ts';
import { withWholeDays } from './monthDays.ts';
import type { PeriodText } from './periodText.ts';
import type { ColumnPeriod } from './periods.ts';
import { readRows, type ReadRow } from './rows.ts';
import { tableScale, type TableScale } from './scale.ts';
import { printedStep, signRows, withEvenCosts, type Signed, type Values } from './signs.ts';
import { tablesOf, type Table, type TableRow } from './tables.ts';
import type { Line } from './wordings/lines.ts';

/** Rows of one part of the statements that stand together. */
export interface Run {
  readonly part: ReadRow['part'];
  readonly rows: readonly ReadRow[];
  /** Printed amounts, by row and by column of the table; costs in one convention throughout. */
  readonly amounts: Values;
  readonly signed: Signed;
  readonly step: Decimal;
}

export interface StatementTable {
  readonly table: Table;
  readonly columns: readonly ColumnWords[];
  readonly title: PeriodText;
  readonly scale: TableScale;
  readonly runs: readonly Run[];
  readonly isTrialBalance: boolean;
}

export type SettledColumn = ColumnWords & ColumnPeriod & { readonly end: PlainDate };

/** The columns of a table that have a last day; `months` is null where the length of their flows is open. */
export type SettledColumns = ReadonlyMap<StatementTable, readonly SettledColumn[]>;

export const LEAVE_OUT = 'leave-out';
export const placementKey = (sheet: string, label: string): string =>
  `placement:${sheet}:${label}`.slice(0, 190);

export function statementTables(sheet: SheetGrid, asking: Asking): StatementTable[] {
  return tablesOf(sheet)
    .map(oriented)
    .map((table) => statementTable(table, asking));
}

function statementTable(table: Table, asking: Asking): StatementTable {
  const title = titlePeriod(table);
  const columns = withWholeDays(columnWords(table), title);
  const rows = readRows(table, (row) => answeredLine(table, row, asking));
  const counted = columns.filter(({ role, scenario }) => role === 'period' && scenario === 'actual');
  return {
    table,
    columns,
    title,
    scale: tableScale(table),
    runs: runsOf(rows, counted),
    isTrialBalance:
      columns.some(({ role }) => role === 'debit') && columns.some(({ role }) => role === 'credit'),
  };
}

/** A label that the analyst leaves out is a memo: no part of sums, no fact. */
function answeredLine(table: Table, row: TableRow, asking: Asking): Line | null {
  const answer = asking.answerTo(placementKey(table.sheet.name, row.label));
  if (answer === LEAVE_OUT) return 'memo';
  return answer !== null && isLineItemCode(answer) ? answer : null;
}

function runsOf(rows: readonly ReadRow[], counted: readonly ColumnWords[]): Run[] {
  const groups: ReadRow[][] = [];
  for (const row of rows) {
    const current = groups.at(-1);
    if (current && current[0]?.part === row.part) current.push(row);
    else groups.push([row]);
  }
  return groups.map((group) => {
    const printed = group.map(({ row }) => row.cells.map((cell) => cell?.amount ?? null));
    const amounts = withEvenCosts(
      group,
      printed,
      counted.map(({ index }) => index),
    );
    const values = amounts.map((row) => counted.map(({ index }) => row[index] ?? null));
    const step = printedStep(values.flat());
    return {
      part: group[0]?.part ?? null,
      rows: group,
      amounts,
      step,
      signed: signRows(group, values, step),
    };
  });
}

/** Where a row's label stands, to point at it. */
export function rowPlace(table: Table, row: TableRow): { sheet: string; cell: string } {
  const first = row.cells.find((cell) => cell !== null);
  return { sheet: table.sheet.name, cell: first ? cellName(first) : `A${row.number}` };
}

/** Last days that headings of balance sheets name outright. */
export function endsOfHeadings(tables: readonly StatementTable[]): PlainDate[] {
  return tables
    .filter(
      ({ runs }) =>
        runs.some(({ part }) => part === 'balance') && runs.every(({ part }) => part !== 'income'),
    )
    .flatMap(({ columns }) =>
      columns.flatMap(({ role, period }) => (role === 'period' && period.end ? [period.end] : [])),
    );
}
