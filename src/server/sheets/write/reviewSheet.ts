import ExcelJS from 'exceljs';
import { GRID_COLUMNS, type ReviewSheet } from '../../../core/reviewSheet.ts';
import { FONTS } from './cellStyle.ts';
import { put, writtenText } from './cellValue.ts';
import { pageSetup } from './printSetup.ts';
import { GRID_WIDTH, writeSection, type Cursor } from './reviewGrid.ts';
import { writeSources } from './sourcesSheet.ts';

const TITLE_ROWS = 2;

/** The review sheet as a workbook: "Review" in the order of its sections, "Sources" with every figure behind it. */
export async function writeReviewSheet(sheet: ReviewSheet): Promise<Uint8Array> {
  const workbook = new ExcelJS.Workbook();
  workbook.creator = 'Underkeel';
  workbook.created = new Date(sheet.madeAt);
  workbook.modified = workbook.created;
  writeReview(workbook, sheet);
  writeSources(workbook, sheet);
  return new Uint8Array(await workbook.xlsx.writeBuffer());
}

function writeReview(workbook: ExcelJS.Workbook, sheet: ReviewSheet): void {
  const worksheet = workbook.addWorksheet('Review', {
    ...pageSetup(sheet, { titleRows: `1:${TITLE_ROWS}` }),
    views: [{ state: 'frozen', ySplit: TITLE_ROWS, showGridLines: false }],
  });
  worksheet.columns = Array.from({ length: GRID_COLUMNS }, () => ({ width: GRID_WIDTH }));
  put(worksheet.getCell(1, 1), writtenText(`Review sheet: ${sheet.borrowerName}`), { font: FONTS.title });
  put(worksheet.getCell(1, GRID_COLUMNS), writtenText('DRAFT'), {
    font: FONTS.draft,
    alignment: { horizontal: 'right' },
  });
  const mark = sheet.privateSide === null ? '' : ` ${sheet.privateSide}`;
  put(worksheet.getCell(2, 1), writtenText(`DRAFT, ${sheet.basisLine}.${mark}`), { font: FONTS.second });
  const cursor: Cursor = { worksheet, row: TITLE_ROWS + 1 };
  for (const section of sheet.sections) writeSection(cursor, section);
}
