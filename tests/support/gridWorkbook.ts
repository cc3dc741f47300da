/** Workbooks written cell by cell: each sheet is rows of values, as a borrower would have typed them. */
import ExcelJS from 'exceljs';

export type Typed =
  | string
  | number
  | null
  | Date
  | { readonly formula: string; readonly result?: number }
  | { readonly error: string };
export type TypedSheets = Readonly<Record<string, readonly (readonly Typed[])[]>>;

export async function gridWorkbook(
  sheets: TypedSheets,
  change: (workbook: ExcelJS.Workbook) => void = () => undefined,
): Promise<Buffer> {
  const workbook = new ExcelJS.Workbook();
  for (const [name, rows] of Object.entries(sheets)) {
    const sheet = workbook.addWorksheet(name);
    rows.forEach((row, at) => {
      row.forEach((value, column) => {
        if (value !== null) sheet.getCell(at + 1, column + 1).value = value as ExcelJS.CellValue;
      });
    });
  }
  change(workbook);
  return Buffer.from(await workbook.xlsx.writeBuffer());
}
