/** The sheet "Sources": every figure behind the review sheet, down to its cell. */
import type ExcelJS from 'exceljs';
import type { ReviewSheet, SheetSource } from '../../../core/reviewSheet.ts';
import { BORDERS, FONTS } from './cellStyle.ts';
import { put, writtenAmount, writtenDay, writtenText } from './cellValue.ts';
import { pageSetup } from './printSetup.ts';
import { LINE_POINTS, linesOf } from './reviewGrid.ts';

interface Column {
  readonly label: string;
  readonly width: number;
  readonly isNumeric?: true;
  readonly value: (source: SheetSource) => ReturnType<typeof writtenText>;
}

const COLUMNS: readonly Column[] = [
  { label: 'Used in', width: 20, value: ({ usedIn }) => writtenText(usedIn) },
  { label: 'Line', width: 26, value: ({ line }) => writtenText(line) },
  { label: 'Period', width: 22, value: ({ period }) => writtenText(period) },
  { label: 'Period end', width: 10, value: ({ periodEnd }) => writtenDay(periodEnd) },
  { label: 'Amount', width: 13, isNumeric: true, value: ({ amount }) => writtenAmount(amount) },
  { label: 'Currency', width: 9, value: ({ currency }) => writtenText(currency) },
  { label: 'Standing', width: 24, value: ({ standing }) => writtenText(standing) },
  { label: 'Received on', width: 11, value: ({ receivedOn }) => writtenDay(receivedOn) },
  { label: 'File', width: 24, value: ({ fileName }) => writtenText(fileName ?? 'no file') },
  { label: 'Sheet', width: 16, value: ({ sheet }) => writtenText(sheet) },
  { label: 'Cell', width: 8, value: ({ cells }) => writtenText(cells) },
  { label: 'As in the cell', width: 12, value: ({ rawText }) => writtenText(rawText) },
  { label: 'SHA-256 of the file', width: 35, value: ({ sha256 }) => writtenText(sha256 ?? '') },
];

const HEAD_ROW = 3;

export function writeSources(workbook: ExcelJS.Workbook, sheet: ReviewSheet): void {
  const worksheet = workbook.addWorksheet('Sources', {
    ...pageSetup(sheet, { titleRows: `1:${HEAD_ROW}` }),
    views: [{ state: 'frozen', xSplit: 2, ySplit: HEAD_ROW }],
  });
  worksheet.columns = COLUMNS.map(({ width }) => ({ width }));
  put(worksheet.getCell(1, 1), writtenText(`Sources of the review sheet: ${sheet.borrowerName}`), {
    font: FONTS.title,
  });
  put(
    worksheet.getCell(2, 1),
    writtenText(`DRAFT, ${sheet.basisLine}. Figures behind the latest test of each covenant.`),
    {
      font: FONTS.second,
    },
  );
  for (const [place, column] of COLUMNS.entries())
    put(worksheet.getCell(HEAD_ROW, place + 1), writtenText(column.label), {
      font: FONTS.second,
      border: BORDERS.head,
      alignment: { ...alignmentOf(place), vertical: 'bottom' },
    });
  for (const [at, source] of sheet.sources.entries()) writeSource(worksheet, HEAD_ROW + 1 + at, source);
  if (sheet.sources.length > 0)
    worksheet.autoFilter = {
      from: { row: HEAD_ROW, column: 1 },
      to: { row: HEAD_ROW + sheet.sources.length, column: COLUMNS.length },
    };
}

function writeSource(worksheet: ExcelJS.Worksheet, row: number, source: SheetSource): void {
  let lines = 1;
  for (const [place, { isNumeric, width, value }] of COLUMNS.entries()) {
    const written = value(source);
    put(worksheet.getCell(row, place + 1), written, {
      font: isNumeric ? FONTS.name : FONTS.body,
      border: BORDERS.row,
      alignment: alignmentOf(place),
    });
    if (typeof written.value === 'string') lines = Math.max(lines, linesOf(written.value, width));
  }
  worksheet.getRow(row).height = lines * LINE_POINTS + 3;
}

const alignmentOf = (place: number): Partial<ExcelJS.Alignment> => ({
  horizontal: COLUMNS[place]?.isNumeric ? 'right' : 'left',
  indent: COLUMNS[place - 1]?.isNumeric ? 1 : 0,
  vertical: 'top',
  wrapText: true,
});
