import ExcelJS from 'exceljs';
import type { DemoQuarter } from './demoLines.ts';
import { columnLetter, filledSheet, SHEETS, type FilledSheet } from './workbookLayout.ts';

export interface WorkbookContent {
  readonly borrowerName: string;
  /** 'EUR thousands'; null leaves the sheets without a unit, as some borrowers do. */
  readonly unit: string | null;
  readonly quarters: readonly DemoQuarter[];
  /** The day of making, which a workbook carries inside. */
  readonly madeOn: string;
}

/** An .xlsx as a borrower would send it, amounts in thousands. */
export async function demoWorkbook(content: WorkbookContent): Promise<Uint8Array> {
  const workbook = new ExcelJS.Workbook();
  workbook.creator = content.borrowerName;
  workbook.created = new Date(`${content.madeOn}T08:00:00Z`);
  workbook.modified = workbook.created;
  for (const layout of SHEETS) writeSheet(workbook, filledSheet(layout, content));
  return new Uint8Array(await workbook.xlsx.writeBuffer());
}

function writeSheet(workbook: ExcelJS.Workbook, { layout, headingRow, headings, rows }: FilledSheet): void {
  const sheet = workbook.addWorksheet(layout.name, {
    views: [{ state: 'frozen', xSplit: 1, ySplit: headingRow }],
    pageSetup: { orientation: 'landscape', fitToPage: true, fitToWidth: 1, fitToHeight: 0 },
  });
  sheet.getColumn(1).width = 44;
  headings.forEach((heading, index) => {
    sheet.getColumn(index + 2).width = 19;
    const cell = sheet.getCell(`${columnLetter(index)}${headingRow}`);
    cell.value = heading;
    cell.font = { bold: true };
    cell.alignment = { horizontal: 'right' };
  });
  for (const row of rows) {
    const label = sheet.getCell(`A${row.row}`);
    if ('text' in row) {
      label.value = row.text;
      label.font = { bold: true };
      continue;
    }
    label.value = row.label;
    row.amounts.forEach((amount, index) => {
      const cell = sheet.getCell(`${columnLetter(index)}${row.row}`);
      cell.value = amount;
      cell.numFmt = '#,##0';
    });
  }
}
