/** Turns a table whose periods run down the rows, so that they run across columns as everywhere else. */
import { cellAt, type SheetCell } from './cells.ts';
import { readHeadingText, saysPeriod } from './headingText.ts';
import { lineOf, PARTS } from './labels.ts';
import { isAmount } from './segments.ts';
import { type Table, type TableColumn, type TableRow } from './tables.ts';

const FIELDS = {
  months: /^(?:months?|no\.? of months|period months|length|monate|mois|meses)$/i,
  currency: /^(?:currency|ccy|währung|devise|moneda|valuta)$/i,
  unit: /^(?:units?|scale|einheit|unité|unidad|in)$/i,
  period:
    /^(?:period|period end(?:ing)?|quarter end(?:ed|ing)?|year end(?:ed|ing)?|date|as at|stichtag|periode|période|fecha|periodo)$/i,
  scenario: /^(?:scenario|version|type|basis|actual\/budget)$/i,
} as const;
type Field = keyof typeof FIELDS;

const MIN_LINES = 3;
const MIN_PERIODS = 1;

export function oriented(table: Table): Table {
  const headings = table.columns.map(({ headings: cells }) =>
    cells
      .map(({ text }) => text)
      .join(' ')
      .trim(),
  );
  const fields = headings.map(fieldOf);
  const lines = headings.filter((heading, at) => !fields[at] && isLine(heading)).length;
  if (lines < MIN_LINES || lines * 2 < headings.filter((_, at) => !fields[at]).length) return table;
  const records = table.rows.filter((row) => saysItsPeriod(table, row, fields));
  return records.length < MIN_PERIODS ? table : turned(table, headings, fields, records);
}

const fieldOf = (heading: string): Field | null =>
  (Object.keys(FIELDS) as Field[]).find((field) => FIELDS[field].test(heading)) ?? null;

const isLine = (heading: string): boolean => PARTS.some((part) => lineOf(heading, part, null) !== null);

function saysItsPeriod(table: Table, row: TableRow, fields: readonly (Field | null)[]): boolean {
  return recordHeadings(table, row, fields).some((cell) => saysPeriod(readHeadingText(cell.text)));
}

/** The label cells of a record, and its fields worded so that a heading is read from them. */
function recordHeadings(table: Table, row: TableRow, fields: readonly (Field | null)[]): SheetCell[] {
  const labels = table.labelColumns.flatMap((column) => cellAt(table.sheet, row.number, column) ?? []);
  const worded = row.cells.flatMap((cell, at) => {
    const field = fields[at];
    if (!cell || !field) return [];
    return [field === 'months' ? { ...cell, text: `${cell.text} months` } : cell];
  });
  return [...labels, ...worded];
}

function turned(
  table: Table,
  headings: readonly string[],
  fields: readonly (Field | null)[],
  records: readonly TableRow[],
): Table {
  const columns: TableColumn[] = records.map((record) => ({
    key: String(record.number),
    headings: recordHeadings(table, record, fields),
    hidden: record.hidden,
  }));
  const rows: TableRow[] = headings.flatMap((label, at) => {
    const [first] = table.columns[at]?.headings ?? [];
    if (fields[at] || !first) return [];
    return [
      {
        number: first.column,
        label,
        indent: 0,
        bold: false,
        hidden: table.columns[at]?.hidden === true,
        cells: records.map((record) => record.cells[at] ?? null),
      },
    ];
  });
  const filled = rows.filter(({ cells }) => cells.some((cell) => cell !== null && isAmount(cell)));
  return { ...table, columns, rows: filled, transposed: true };
}
