/** Values of cells as formulas need them: stored, or worked out where the file holds none. */
import ExcelJS from 'exceljs';
import { decimal, decimalFromDouble, ZERO, type Decimal } from '#core/money/decimal.ts';
import { readAmountText, type DecimalMark } from './amountText.ts';
import { workOut } from './formulas.ts';

/** Cells beyond these hold no statement. */
export const LAST_ROW = 50_000;
export const LAST_COLUMN = 500;
/** Formulas that name formulas without a value, and so on. */
const MAX_FORMULA_DEPTH = 60;
/** Beyond so many, stored values are taken without working them out again. */
const MAX_RECOMPUTED = 5_000;

export class WorkbookValues {
  private readonly sheets: ReadonlyMap<string, ExcelJS.Worksheet>;
  private readonly mark: DecimalMark;
  private readonly known = new Map<string, Decimal | undefined>();
  private depth = 0;
  private checked = 0;

  constructor(workbook: ExcelJS.Workbook, mark: DecimalMark) {
    this.sheets = new Map(workbook.worksheets.map((sheet) => [sheet.name.toLowerCase(), sheet]));
    this.mark = mark;
  }

  ofFormula(cell: ExcelJS.Cell, sheet: string): Decimal | undefined {
    const key = `${sheet}!${cell.address}`;
    if (this.known.has(key)) return this.known.get(key);
    if (this.depth >= MAX_FORMULA_DEPTH || !cell.formula) return undefined;
    this.known.set(key, undefined);
    this.depth += 1;
    const value = workOut(cell.formula, sheet, (name, row, column) => this.ofCell(name, row, column));
    this.depth -= 1;
    this.known.set(key, value);
    return value;
  }

  /** What a simple formula gives now, where that is not the value that the file holds for it. */
  recomputed(cell: ExcelJS.Cell, sheet: string): Decimal | null {
    if (this.checked >= MAX_RECOMPUTED || typeof cell.result !== 'number' || !cell.formula) return null;
    this.checked += 1;
    const value = workOut(cell.formula, sheet, (name, row, column) => this.ofCell(name, row, column));
    if (!value || !Number.isFinite(cell.result)) return null;
    const stored = decimal(decimalFromDouble(cell.result));
    const allowed = stored.abs().times('0.000001').plus('0.005');
    return value.minus(stored).abs().lte(allowed) ? null : value;
  }

  private ofCell(name: string, row: number, column: number): Decimal | undefined {
    const sheet = this.sheets.get(name.toLowerCase());
    if (!sheet || row > LAST_ROW || column > LAST_COLUMN) return undefined;
    const cell = sheet.findCell(row, column);
    if (!cell || cell.value === null) return ZERO;
    const isFormula = cell.type === ExcelJS.ValueType.Formula;
    const stored: unknown = isFormula ? cell.result : cell.value;
    if (isFormula && (stored === undefined || stored === null)) return this.ofFormula(cell, sheet.name);
    if (typeof stored === 'number' && Number.isFinite(stored)) return decimal(decimalFromDouble(stored));
    if (typeof stored !== 'string') return undefined;
    const meaning = readAmountText(stored, this.mark);
    if (meaning.kind === 'amount') return meaning.amount;
    return meaning.kind === 'zero' ? ZERO : undefined;
  }
}
