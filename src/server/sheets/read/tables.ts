/**
 * Finds the tables of a sheet by their content: which columns hold amounts, which rows above them are headings,
 * where the labels stand. A table ends where the next heading begins; tables side by side are taken apart.
 */
import type { SheetCell, SheetGrid } from './cells.ts';
import { columnLetters } from './cells.ts';
import { readHeadingText, saysPeriod } from './headingText.ts';
import { lineOf, PARTS } from './labels.ts';
import { couldBeYear, isAmount, segmentsOf, type Segment } from './segments.ts';

export interface TableColumn {
  /** 'E', or the row number where periods run down the rows. */
  readonly key: string;
  /** From the top down, each merged heading spread over its span. */
  readonly headings: readonly SheetCell[];
  readonly hidden: boolean;
}

export interface TableRow {
  readonly number: number;
  readonly label: string;
  readonly indent: number;
  readonly bold: boolean;
  readonly hidden: boolean;
  /** One for each column of the table, null for a blank cell. */
  readonly cells: readonly (SheetCell | null)[];
}

export interface Table {
  readonly sheet: SheetGrid;
  /** Texts that stand above the amounts or beside the headings, top down; footnotes behind them. */
  readonly titles: readonly SheetCell[];
  readonly footnotes: readonly SheetCell[];
  readonly columns: readonly TableColumn[];
  readonly rows: readonly TableRow[];
  readonly labelColumns: readonly number[];
  /** Periods run down the rows of the sheet; here they are columns all the same. */
  readonly transposed: boolean;
}

const MAX_HEADING_ROWS = 6;

export function tablesOf(sheet: SheetGrid): Table[] {
  return segmentsOf(sheet).flatMap((segment) => tablesOfSegment(sheet, segment));
}

function tablesOfSegment(sheet: SheetGrid, segment: Segment): Table[] {
  const rowNumbers = [...sheet.rows.keys()].sort((one, other) => one - other);
  const heads = headingGroups(sheet, segment, rowNumbers);
  const tables: Table[] = [];
  heads.forEach((head, index) => {
    const next = heads[index + 1]?.[0] ?? Infinity;
    const last = head.at(-1) ?? 0;
    const body = rowNumbers.filter((number) => number > last && number < next);
    const above = index === 0 ? 0 : (lastAmountRow(sheet, segment, rowNumbers, head[0] ?? 0) ?? 0);
    const titleRows = rowNumbers.filter((number) => number > above && number <= last);
    tables.push(tableOf(sheet, segment, head, titleRows, body));
  });
  return tables.filter(({ columns, rows }) => columns.length > 0 && rows.length > 0);
}

function lastAmountRow(
  sheet: SheetGrid,
  segment: Segment,
  numbers: readonly number[],
  before: number,
): number | undefined {
  return numbers.filter((number) => number < before && amountsOf(sheet, segment, number).length > 0).at(-1);
}

const valuesOf = (sheet: SheetGrid, segment: Segment, row: number): SheetCell[] =>
  segment.values.flatMap((column) => sheet.rows.get(row)?.get(column) ?? []);

const amountsOf = (sheet: SheetGrid, segment: Segment, row: number): SheetCell[] =>
  valuesOf(sheet, segment, row).filter(isAmount);

/** Groups of heading rows. A row of headings holds no amounts, or years and nothing else. */
function headingGroups(sheet: SheetGrid, segment: Segment, rowNumbers: readonly number[]): number[][] {
  const groups: number[][] = [];
  let open: number[] = [];
  let bodySeen = false;
  for (const number of rowNumbers) {
    const cells = valuesOf(sheet, segment, number);
    if (cells.length === 0) continue;
    if (isHeadingRow(cells, bodySeen) && !isLineWithYears(sheet, segment, number, cells)) {
      open.push(number);
      if (open.length > MAX_HEADING_ROWS) open.shift();
      continue;
    }
    if (cells.some(isAmount)) {
      if (open.length > 0) groups.push(open);
      else if (!bodySeen) groups.push([number - 0.5]);
      open = [];
      bodySeen = true;
    }
  }
  return groups;
}

function isHeadingRow(cells: readonly SheetCell[], bodySeen: boolean): boolean {
  const amounts = cells.filter(isAmount);
  const years = amounts.filter(couldBeYear);
  if (amounts.length > years.length) return false;
  if (years.length > 0)
    return cells.every((cell) => couldBeYear(cell) || !isAmount(cell)) && areYears(years, bodySeen);
  if (!bodySeen) return true;
  return cells.some(
    ({ kind, text }) => kind === 'date' || (kind === 'text' && saysPeriod(readHeadingText(text))),
  );
}

/** 'Current portion of debt 2000 2001' is a row of amounts, whatever its amounts look like. */
function isLineWithYears(
  sheet: SheetGrid,
  segment: Segment,
  row: number,
  cells: readonly SheetCell[],
): boolean {
  const labels = segment.labels.flatMap((column) => sheet.rows.get(row)?.get(column)?.text ?? []);
  return cells.some(isAmount) && PARTS.some((part) => lineOf(labels.join(' '), part, null) !== null);
}

/** 2025 and 2024 head columns; 2,011 and 1,998 beside a label may be amounts, and then do not fall evenly. */
function areYears(years: readonly SheetCell[], bodySeen: boolean): boolean {
  const numbers = years.map(({ amount }) => amount?.toNumber() ?? 0);
  const even = numbers.every((year, at) => at === 0 || Math.abs(year - (numbers[at - 1] ?? 0)) === 1);
  const plain = years.every(({ text }) => /^\d{4}$/.test(text));
  return even && plain && (!bodySeen || years.length > 1);
}

function tableOf(
  sheet: SheetGrid,
  segment: Segment,
  head: readonly number[],
  titleRows: readonly number[],
  body: readonly number[],
): Table {
  const columns = segment.values.map((column) => ({
    key: columnLetters(column),
    headings: head.flatMap((row) => headingAt(sheet, segment, row, column) ?? []),
    hidden: sheet.hiddenColumns.has(column),
  }));
  const rows = body.map((number) => rowOf(sheet, segment, number));
  const cellsOf = (numbers: readonly number[], which: readonly number[]) =>
    numbers.flatMap((number) => which.flatMap((column) => sheet.rows.get(number)?.get(column) ?? []));
  const aboveHead = titleRows.filter((number) => number < (head[0] ?? 0));
  return {
    sheet,
    titles: [
      ...cellsOf(aboveHead, [...segment.labels, ...segment.values]),
      ...cellsOf(head, segment.labels),
    ].filter((cell) => !isAmount(cell)),
    footnotes: rows.flatMap(({ number, cells }) =>
      cells.every((cell) => cell === null) ? cellsOf([number], segment.labels) : [],
    ),
    columns,
    rows,
    labelColumns: segment.labels,
    transposed: false,
  };
}

/** The heading over a column: its own, or that of the merged area, or the one to the left in a row of group headings. */
function headingAt(sheet: SheetGrid, segment: Segment, row: number, column: number): SheetCell | null {
  const own = sheet.rows.get(row)?.get(column);
  if (own) return own;
  const area = sheet.merges.find(
    ({ top, bottom, left, right }) => row >= top && row <= bottom && column >= left && column <= right,
  );
  if (area) {
    const spread = sheet.rows.get(area.top)?.get(area.left);
    return spread && segment.values.includes(area.left) ? spread : null;
  }
  if (!isGroupRow(sheet, segment, row)) return null;
  const left = segment.values.filter((other) => other < column).reverse();
  for (const other of left) {
    const cell = sheet.rows.get(row)?.get(other);
    if (cell) return sheet.merges.some((merge) => merge.top === row && merge.left === other) ? null : cell;
  }
  return null;
}

/** Few headings over more columns, with a full row of headings below: 'Actual' once above three periods. */
function isGroupRow(sheet: SheetGrid, segment: Segment, row: number): boolean {
  const here = valuesOf(sheet, segment, row).length;
  const below = valuesOf(sheet, segment, row + 1);
  return here > 0 && below.length > here && below.every((cell) => !isAmount(cell) || couldBeYear(cell));
}

function rowOf(sheet: SheetGrid, segment: Segment, number: number): TableRow {
  const labels = segment.labels.flatMap((column) => sheet.rows.get(number)?.get(column) ?? []);
  const texts = labels.map(({ text }) => text);
  const [first] = labels;
  const spaces = /^[\s\u00a0]*/.exec(texts[0] ?? '')?.[0].length ?? 0;
  const offset = first ? segment.labels.indexOf(first.column) : 0;
  return {
    number,
    label: texts.map((text) => text.trim()).join(' '),
    indent: (first?.indent ?? 0) + Math.ceil(spaces / 2) + offset,
    bold: labels.some(({ bold }) => bold),
    hidden: sheet.hiddenRows.has(number),
    cells: segment.values.map((column) => sheet.rows.get(number)?.get(column) ?? null),
  };
}
