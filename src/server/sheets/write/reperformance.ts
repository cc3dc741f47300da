/** One test as a workbook of live formulas: "Test" refers to "Lines", "Lines" to "Cells". No value is stored with a formula. */
import ExcelJS from 'exceljs';
import { THE_AGREEMENT_GOVERNS } from '../../../core/cautions.ts';
import { Decimal } from '../../../core/money/decimal.ts';
import type { WorkedCell, WorkedLine, WorkedRow, WorkedTest } from '../../../core/reperformance/worked.ts';
import { BORDERS, FONTS } from './cellStyle.ts';
import { figureFormat, put, writtenDay, writtenText } from './cellValue.ts';
import { pageSetup } from './printSetup.ts';
import { LINE_POINTS, linesOf } from './reviewGrid.ts';

export interface ReperformanceSheet {
  readonly borrowerName: string;
  /** "Net leverage, clause 20.2(a), tested on 30 Sep 2026, at most 3.50x" */
  readonly title: string;
  readonly basisLine: string;
  readonly privateSide: string | null;
  readonly currency: string;
  readonly madeAt: string;
  readonly worked: WorkedTest;
}

/** Where every row's value stands, for formulas to refer to. */
type Addresses = ReadonlyMap<string, string>;

interface Column {
  readonly label: string;
  readonly width: number;
}

const HEAD_ROW = 4;

export async function writeReperformance(sheet: ReperformanceSheet): Promise<Uint8Array> {
  const workbook = new ExcelJS.Workbook();
  workbook.creator = 'Underkeel';
  workbook.created = new Date(sheet.madeAt);
  workbook.modified = workbook.created;
  workbook.calcProperties.fullCalcOnLoad = true;
  const addresses = addressesOf(sheet.worked);
  writeTest(workbook, sheet, addresses);
  writeLines(workbook, sheet, addresses);
  writeCells(workbook, sheet);
  return new Uint8Array(await workbook.xlsx.writeBuffer());
}

const cellsOf = ({
  lines,
}: WorkedTest): readonly { readonly line: WorkedLine; readonly cell: WorkedCell }[] =>
  lines.flatMap((line) => line.cells.map((cell) => ({ line, cell })));
const rowsOf = ({ bridge, result }: WorkedTest): readonly WorkedRow[] => [...bridge, ...result];

function addressesOf(worked: WorkedTest): Addresses {
  return new Map([
    ...cellsOf(worked).map(({ cell }, at) => [cell.key, `Cells!$H$${HEAD_ROW + 1 + at}`] as const),
    ...worked.lines.map(({ key }, at) => [key, `Lines!$E$${HEAD_ROW + 1 + at}`] as const),
    ...rowsOf(worked).map(({ key }, at) => [key, `$B$${HEAD_ROW + 1 + at}`] as const),
  ]);
}

const resolved = (formula: string, addresses: Addresses): string =>
  formula.replaceAll(/\{(\w+)\}/g, (_, key: string) => {
    const address = addresses.get(key);
    if (!address) throw new Error(`the formula ${formula} refers to ${key}, which has no cell`);
    return address;
  });

const TEST_COLUMNS: readonly Column[] = [
  { label: 'Step', width: 46 },
  { label: 'Worked out here', width: 22 },
  { label: 'As computed by Underkeel', width: 22 },
  { label: 'Difference', width: 14 },
  { label: 'Note', width: 50 },
];

function writeTest(workbook: ExcelJS.Workbook, sheet: ReperformanceSheet, addresses: Addresses): void {
  const worksheet = begin(workbook, sheet, 'Test', TEST_COLUMNS);
  const rows = rowsOf(sheet.worked);
  rows.forEach((row, at) => writeRow(worksheet, HEAD_ROW + 1 + at, row, addresses));
  const foot = HEAD_ROW + rows.length + 2;
  worksheet.mergeCells(foot, 1, foot, TEST_COLUMNS.length);
  put(worksheet.getCell(foot, 1), writtenText(THE_AGREEMENT_GOVERNS), {
    font: FONTS.caution,
    border: BORDERS.caution,
    alignment: { wrapText: true, vertical: 'top' },
  });
  worksheet.getRow(foot).height = LINE_POINTS * 3;
}

function writeRow(
  worksheet: ExcelJS.Worksheet,
  at: number,
  { label, unit, value, formula, isOpen, note }: WorkedRow,
  addresses: Addresses,
): void {
  const style = { border: BORDERS.row, alignment: { vertical: 'top', wrapText: true } } as const;
  const figure = { ...style, alignment: { ...style.alignment, horizontal: 'right' } } as const;
  const numFmt = formatOf(unit);
  put(worksheet.getCell(at, 1), writtenText(label), { ...style, font: FONTS.body });
  const worked = formula === null ? cellValue(value) : { formula: resolved(formula, addresses) };
  write(worksheet.getCell(at, 2), worked, numFmt, { ...figure, font: FONTS.name });
  write(worksheet.getCell(at, 3), cellValue(value), numFmt, { ...figure, font: FONTS.second });
  if (formula !== null && value !== null)
    write(
      worksheet.getCell(at, 4),
      { formula: differenceOf(at, unit) },
      unit === 'words' ? '@' : '0.000000',
      {
        ...figure,
        font: FONTS.second,
      },
    );
  const remark = isOpen ? 'As computed; not worked out here.' : formula === null ? 'As recorded.' : '';
  const said = [remark, note].filter((part) => part !== '').join(' ');
  put(worksheet.getCell(at, 5), writtenText(said), { ...style, font: FONTS.second });
  worksheet.getRow(at).height =
    Math.max(linesOf(label, TEST_COLUMNS[0]!.width), linesOf(said, TEST_COLUMNS[4]!.width)) * LINE_POINTS + 3;
}

/** Words agree or differ; figures differ by so much, binary rounding apart. */
const differenceOf = (at: number, unit: WorkedRow['unit']): string =>
  unit === 'words' ? `IF(B${at}=C${at},"same","differs")` : differs(`B${at}-C${at}`);

const differs = (difference: string): string => `IF(ROUND(${difference},6)=0,"same",${difference})`;

const cellValue = (value: WorkedRow['value']): ExcelJS.CellValue =>
  value instanceof Decimal ? value.toNumber() : (value ?? 'none');

function formatOf(unit: WorkedRow['unit']): string {
  switch (unit) {
    case 'money':
      return figureFormat({ unit: 'money', places: 2, before: '' });
    case 'times':
      return '0.0000"x"';
    case 'share':
      return '0.00%';
    case 'words':
      return '@';
  }
}

const LINE_COLUMNS: readonly Column[] = [
  { label: 'Line', width: 34 },
  { label: 'Months', width: 9 },
  { label: 'Period end', width: 12 },
  { label: 'One unit of the sheet is worth', width: 16 },
  { label: 'Amount', width: 20 },
  { label: 'As accepted', width: 20 },
  { label: 'Difference', width: 14 },
  { label: 'Note', width: 40 },
];

function writeLines(workbook: ExcelJS.Workbook, sheet: ReperformanceSheet, addresses: Addresses): void {
  const worksheet = begin(workbook, sheet, 'Lines', LINE_COLUMNS);
  const money = formatOf('money');
  sheet.worked.lines.forEach((line, place) => {
    const at = HEAD_ROW + 1 + place;
    const style = { border: BORDERS.row, font: FONTS.body };
    const sum = line.cells.map(({ key }) => `{${key}}`).join('+');
    const isWorked = line.factor !== null;
    put(worksheet.getCell(at, 1), writtenText(line.label), style);
    write(worksheet.getCell(at, 2), line.months, '0', style);
    put(worksheet.getCell(at, 3), writtenDay(line.periodEnd), style);
    if (line.factor) write(worksheet.getCell(at, 4), line.factor.toNumber(), '#,##0.00', style);
    const amount = isWorked ? { formula: resolved(`(${sum})*$D$${at}`, addresses) } : line.amount.toNumber();
    write(worksheet.getCell(at, 5), amount, money, { ...style, font: FONTS.name });
    write(worksheet.getCell(at, 6), line.amount.toNumber(), money, { ...style, font: FONTS.second });
    if (isWorked) write(worksheet.getCell(at, 7), { formula: differs(`E${at}-F${at}`) }, '0.000000', style);
    put(
      worksheet.getCell(at, 8),
      writtenText(isWorked ? '' : 'As accepted: entered, or put together by an answer.'),
      { ...style, font: FONTS.second },
    );
  });
}

const CELL_COLUMNS: readonly Column[] = [
  { label: 'Line', width: 30 },
  { label: 'Period end', width: 12 },
  { label: 'File', width: 30 },
  { label: 'SHA-256 of the file', width: 36 },
  { label: 'Sheet', width: 18 },
  { label: 'Cell', width: 8 },
  { label: 'As in the cell', width: 16 },
  { label: 'Number', width: 16 },
];

function writeCells(workbook: ExcelJS.Workbook, sheet: ReperformanceSheet): void {
  const worksheet = begin(workbook, sheet, 'Cells', CELL_COLUMNS);
  cellsOf(sheet.worked).forEach(({ line, cell }, place) => {
    const at = HEAD_ROW + 1 + place;
    const style = { border: BORDERS.row, font: FONTS.body };
    put(worksheet.getCell(at, 1), writtenText(line.label), style);
    put(worksheet.getCell(at, 2), writtenDay(line.periodEnd), style);
    const texts = [cell.fileName ?? 'no file', cell.sha256 ?? '', cell.sheet, cell.cell, cell.rawText];
    texts.forEach((text, column) => put(worksheet.getCell(at, 3 + column), writtenText(text), style));
    if (cell.number) write(worksheet.getCell(at, 8), cell.number.toNumber(), 'General', style);
  });
}

function begin(
  workbook: ExcelJS.Workbook,
  sheet: ReperformanceSheet,
  name: string,
  columns: readonly Column[],
): ExcelJS.Worksheet {
  const worksheet = workbook.addWorksheet(name, {
    ...pageSetup(sheet, { titleRows: `1:${HEAD_ROW}` }),
    views: [{ state: 'frozen', ySplit: HEAD_ROW, showGridLines: false }],
  });
  worksheet.columns = columns.map(({ width }) => ({ width }));
  put(worksheet.getCell(1, 1), writtenText(`${sheet.title}: ${sheet.borrowerName}`), { font: FONTS.title });
  put(worksheet.getCell(2, 1), writtenText(`${sheet.basisLine}. Amounts in whole ${sheet.currency}.`), {
    font: FONTS.second,
  });
  columns.forEach(({ label }, place) =>
    put(worksheet.getCell(HEAD_ROW, place + 1), writtenText(label), {
      font: FONTS.second,
      border: BORDERS.head,
    }),
  );
  return worksheet;
}

function write(
  cell: ExcelJS.Cell,
  value: ExcelJS.CellValue | { readonly formula: string },
  numFmt: string,
  style: Partial<ExcelJS.Style>,
): void {
  cell.value = value;
  cell.style = { ...style, numFmt };
}
