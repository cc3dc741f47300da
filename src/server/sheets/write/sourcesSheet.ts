/** The sheet "Sources": every figure behind the review sheet, down to its cell. */
import type ExcelJS from 'exceljs';
import type { ReviewSheet, SheetSource } from '../../../core/reviewSheet.ts';
import { BORDERS, FONTS } from './cellStyle.ts';
import { put, writtenAmount, writtenDay, writtenText } from './cellValue.ts';
import { pageSetup } from './printSetup.ts';

interface Column {
  readonly label: string;
  readonly width: number;
  readonly isNumeric?: true;
  readonly value: (source: SheetSource) => ReturnType<typeof writtenText>;
}

const COLUMNS: readonly Column[] = [
  { label: 'Used in', width: 26, value: ({ usedIn }) => writtenText(usedIn) },
  { label: 'Line', width: 30, value: ({ line }) => writtenText(line) },
  { label: 'Period', width: 24, value: ({ period }) => writtenText(period) },
  { label: 'Period end', width: 12, value: ({ periodEnd }) => writtenDay(periodEnd) },
  { label: 'Amount', width: 14, isNumeric: true, value: ({ amount }) => writtenAmount(amount) },
  { label: 'Currency', width: 9, value: ({ currency }) => writtenText(currency) },
  { label: 'Standing', width: 26, value: ({ standing }) => writtenText(standing) },
  { label: 'Received on', width: 12, value: ({ receivedOn }) => writtenDay(receivedOn) },
  { label: 'File', width: 30, value: ({ fileName }) => writtenText(fileName ?? 'no file') },
  { label: 'Sheet', width: 18, value: ({ sheet }) => writtenText(sheet) },
  { label: 'Cell', width: 10, value: ({ cells }) => writtenText(cells) },
  { label: 'As it stands in the cell', width: 20, value: ({ rawText }) => writtenText(rawText) },
  { label: 'SHA-256 of the file', width: 36, value: ({ sha256 }) => writtenText(sha256 ?? '') },
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
  const alignment = ({ isNumeric }: Column) =>
    ({ horizontal: isNumeric ? 'right' : 'left', vertical: 'top', wrapText: true }) as const;
  for (const [place, column] of COLUMNS.entries())
    put(worksheet.getCell(HEAD_ROW, place + 1), writtenText(column.label), {
      font: FONTS.second,
      border: BORDERS.head,
      alignment: { ...alignment(column), vertical: 'bottom' },
    });
  for (const [row, source] of sheet.sources.entries())
    for (const [place, column] of COLUMNS.entries())
      put(worksheet.getCell(HEAD_ROW + 1 + row, place + 1), column.value(source), {
        font: column.isNumeric ? FONTS.name : FONTS.body,
        border: BORDERS.row,
        alignment: alignment(column),
      });
  if (sheet.sources.length > 0)
    worksheet.autoFilter = {
      from: { row: HEAD_ROW, column: 1 },
      to: { row: HEAD_ROW + sheet.sources.length, column: COLUMNS.length },
    };
}
