/** Turns a workbook that has passed the gate into grids, by the whole reader of exceljs. Runs in a worker. */
import ExcelJS from 'exceljs';
import { isPlainDate, type PlainDate } from '#core/calendar/plainDate.ts';
import { decimalFromDouble, ZERO, type Decimal } from '#core/money/decimal.ts';
import { decimalMarkOf, readAmountText, type DecimalMark } from './amountText.ts';
import {
  columnNumber,
  type CellComment,
  type MergedArea,
  type SheetCell,
  type SheetGrid,
  type WorkbookGrid,
} from './cells.ts';
import { formatShape, printNumber } from './numberFormat.ts';
import { refusal, Refused } from './refusals.ts';
import { withSerialHeadings } from './serialHeadings.ts';
import { LAST_COLUMN, LAST_ROW, WorkbookValues } from './workbookValues.ts';

export async function workbookGrid(bytes: Buffer): Promise<WorkbookGrid> {
  const workbook = new ExcelJS.Workbook();
  try {
    await workbook.xlsx.load(bytes as unknown as ExcelJS.Buffer);
  } catch (error) {
    const text = error instanceof Error ? error.message : String(error);
    throw new Refused(refusal('damaged', null, `its parts do not fit together (${text.slice(0, 120)})`));
  }
  const mark = decimalMarkOf(textsOf(workbook));
  const values = new WorkbookValues(workbook, mark);
  const { date1904 } = workbook.properties;
  return {
    kind: 'xlsx',
    sheets: workbook.worksheets.map((sheet) =>
      withSerialHeadings(sheetGrid(sheet, mark, values), date1904 === true),
    ),
  };
}

function* textsOf(workbook: ExcelJS.Workbook): Generator<string> {
  for (const sheet of workbook.worksheets) {
    for (const cell of filledCells(sheet)) if (typeof cell.value === 'string') yield cell.value;
  }
}

/** Sparse by nature: a sheet whose last cell is XFD1048576 has few filled cells. */
function* filledCells(sheet: ExcelJS.Worksheet): Generator<ExcelJS.Cell> {
  const cells: ExcelJS.Cell[] = [];
  sheet.eachRow({ includeEmpty: false }, (row, number) => {
    if (number > LAST_ROW) return;
    row.eachCell({ includeEmpty: false }, (cell, column) => {
      if (column <= LAST_COLUMN && !(cell.isMerged && cell.master !== cell)) cells.push(cell);
    });
  });
  yield* cells;
}

function sheetGrid(sheet: ExcelJS.Worksheet, mark: DecimalMark, values: WorkbookValues): SheetGrid {
  const rows = new Map<number, Map<number, SheetCell>>();
  const hiddenRows = new Set<number>();
  const comments: CellComment[] = [];
  for (const cell of filledCells(sheet)) {
    const comment = commentOf(cell);
    if (comment !== '') comments.push({ cell: cell.address, text: comment });
    const read = sheetCell(sheet.name, cell, mark, values);
    if (!read) continue;
    const row = rows.get(read.row) ?? new Map<number, SheetCell>();
    rows.set(read.row, row.set(read.column, read));
    if (sheet.getRow(read.row).hidden) hiddenRows.add(read.row);
  }
  const columns = new Set([...rows.values()].flatMap((row) => [...row.keys()]));
  return {
    name: sheet.name,
    hidden: sheet.state !== 'visible',
    rows,
    hiddenRows,
    hiddenColumns: new Set([...columns].filter((column) => sheet.getColumn(column).hidden)),
    merges: sheet.model.merges.map(mergedArea),
    pictures: sheet.getImages().map(({ range }) => cornerOf(range)),
    comments,
  };
}

function commentOf(cell: ExcelJS.Cell): string {
  const note: unknown = cell.note;
  const words =
    typeof note === 'string' ? note : textOf({ richText: (note as ExcelJS.Comment | undefined)?.texts });
  return words.replace(/\s+/g, ' ').trim();
}

const cornerOf = (range: ExcelJS.ImageRange): string => {
  const corner = range.tl;
  return `${String.fromCharCode(65 + Math.min(25, corner.nativeCol))}${corner.nativeRow + 1}`;
};

function mergedArea(range: string): MergedArea {
  const [from = '', to = from] = range.split(':');
  const rowOf = (name: string) => Number(/\d+/.exec(name)?.[0] ?? 0);
  const columnOf = (name: string) => columnNumber(/[A-Z]+/i.exec(name)?.[0] ?? '');
  return { top: rowOf(from), left: columnOf(from), bottom: rowOf(to), right: columnOf(to) };
}

type Style = Pick<SheetCell, 'numberFormat' | 'bold' | 'red' | 'indent'>;
type Place = Pick<SheetCell, 'sheet' | 'row' | 'column'>;
const PLAIN = {
  amount: null,
  date: null,
  fromFormula: false,
  workedOut: false,
  fromText: false,
  formatScale: 1,
  decimals: 0,
  ambiguous: false,
  recomputed: null,
} as const;

function sheetCell(
  sheet: string,
  cell: ExcelJS.Cell,
  mark: DecimalMark,
  values: WorkbookValues,
): SheetCell | null {
  const place: Place = { sheet, row: Number(cell.row), column: Number(cell.col) };
  const style = styleOf(cell);
  const isFormula = cell.type === ExcelJS.ValueType.Formula;
  const stored: unknown = isFormula ? cell.result : cell.value;
  if (isFormula && (stored === undefined || stored === null)) {
    const amount = values.ofFormula(cell, sheet);
    return amount
      ? { ...numberCell(place, style, amount), fromFormula: true, workedOut: true }
      : { ...PLAIN, ...place, ...style, kind: 'uncalculated', text: `=${cell.formula}`, fromFormula: true };
  }
  const read = storedCell(place, style, stored, mark);
  if (!read || !isFormula) return read;
  return { ...read, fromFormula: true, recomputed: values.recomputed(cell, sheet) };
}

function storedCell(place: Place, style: Style, stored: unknown, mark: DecimalMark): SheetCell | null {
  if (typeof stored === 'number') {
    if (!Number.isFinite(stored)) {
      return { ...PLAIN, ...place, ...style, kind: 'error', text: '#NUM!' };
    }
    return numberCell(place, style, decimalFromDouble(stored));
  }
  if (stored instanceof Date) return dateCell(place, style, stored);
  if (isErrorValue(stored)) return { ...PLAIN, ...place, ...style, kind: 'error', text: stored.error };
  const text = textOf(stored);
  return text.trim() === '' ? null : textCell(place, style, text, mark);
}

function numberCell(place: Place, style: Style, stored: Decimal): SheetCell {
  const { percent, scale } = formatShape(style.numberFormat);
  const amount = stored.div(scale);
  return {
    ...PLAIN,
    ...place,
    ...style,
    kind: percent ? 'percent' : 'amount',
    amount: percent ? null : amount,
    text: printNumber(amount, style.numberFormat, percent),
    formatScale: scale,
    decimals: Math.max(0, stored.decimalPlaces()),
  };
}

function dateCell(place: Place, style: Style, stored: Date): SheetCell | null {
  if (Number.isNaN(stored.getTime())) return null;
  const day = stored.toISOString().slice(0, 10);
  if (!isPlainDate(day)) return null;
  return { ...PLAIN, ...place, ...style, kind: 'date', date: day satisfies PlainDate, text: day };
}

/** A cell of text, which may hold a number; also every field of a text file. */
export function textCell(place: Place, style: Style, text: string, mark: DecimalMark): SheetCell {
  const meaning = readAmountText(text, mark);
  const cell = { ...PLAIN, ...place, ...style, text: text.replace(/\s+$/, '') };
  if (meaning.kind === 'amount') {
    return { ...cell, kind: 'amount', amount: meaning.amount, decimals: meaning.decimals, fromText: true };
  }
  if (meaning.kind === 'zero') return { ...cell, kind: 'amount', amount: ZERO };
  if (meaning.kind === 'error') return { ...cell, kind: 'error', text: text.trim() };
  if (meaning.kind === 'ambiguous') return { ...cell, kind: 'text', ambiguous: true };
  return { ...cell, kind: meaning.kind === 'percent' ? 'percent' : 'text' };
}

function styleOf(cell: ExcelJS.Cell): Style {
  const colour = cell.font?.color?.argb;
  return {
    numberFormat: cell.numFmt ?? 'General',
    bold: cell.font?.bold === true,
    red: colour !== undefined && isRed(colour),
    indent: cell.alignment?.indent ?? 0,
  };
}

/** Red by far more than green and blue. */
function isRed(argb: string): boolean {
  const [red, green, blue] = [2, 4, 6].map((at) => parseInt(argb.slice(at, at + 2), 16)) as [
    number,
    number,
    number,
  ];
  return red >= 150 && green <= 90 && blue <= 90;
}

const isErrorValue = (stored: unknown): stored is { error: string } =>
  typeof stored === 'object' && stored !== null && 'error' in stored && typeof stored.error === 'string';

function textOf(stored: unknown): string {
  if (typeof stored === 'string') return stored;
  if (typeof stored === 'boolean') return stored ? 'TRUE' : 'FALSE';
  if (typeof stored !== 'object' || stored === null) return '';
  if ('richText' in stored && Array.isArray(stored.richText)) {
    return (stored.richText as { text?: string }[]).map((run) => run.text ?? '').join('');
  }
  return 'text' in stored ? textOf(stored.text) : '';
}
