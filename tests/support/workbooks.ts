/**
 * Workbooks as borrowers send them, written from given figures: three sheets, periods across the columns, labels and
 * layout of a plain management pack. Figures are invented by the caller; what ties is the caller’s to see to.
 */
import ExcelJS from 'exceljs';
import type { LineItemCode } from '../../src/core/statements/lineItems.ts';

export interface WorkbookPeriod {
  /** 'YYYY-MM-DD' */
  readonly end: string;
  readonly months: number;
  /** In whole currency units, plain decimal text or a number; a line left out leaves its cell blank. */
  readonly amounts: Readonly<Partial<Record<LineItemCode | SupportingLine, number | string>>>;
}

/** Rows of a pack that are no standard line. */
export type SupportingLine =
  | 'share_capital'
  | 'total_non_current_assets'
  | 'total_non_current_liabilities'
  | 'total_equity_and_liabilities'
  | 'working_capital_change'
  | 'net_change_in_cash'
  | 'opening_cash'
  | 'closing_cash';

export interface BorrowerWorkbook {
  readonly borrower: string;
  readonly periods: readonly WorkbookPeriod[];
  readonly statements?: readonly StatementName[];
  /** Units that one printed figure stands for; null leaves the unit unstated. */
  readonly unit?: 1 | 1000 | 1_000_000 | null;
  /** ISO 4217; null leaves the currency unstated. */
  readonly currency?: string | null;
  readonly costsNegative?: boolean;
  /** A last look at the workbook before it is written: to spoil a cell, to hide a row. */
  readonly change?: (workbook: ExcelJS.Workbook) => void;
}

export type StatementName = 'income' | 'balance' | 'cash-flow';
type Row = readonly [label: string, line: LineItemCode | SupportingLine | null, kind?: 'total' | 'cost'];

const SHEETS: Readonly<Record<StatementName, { readonly name: string; readonly rows: readonly Row[] }>> = {
  income: {
    name: 'Income statement',
    rows: [
      ['Revenue', 'revenue'],
      ['Cost of sales', 'cogs', 'cost'],
      ['Gross profit', 'gross_profit', 'total'],
      ['Other operating income', 'other_operating_income'],
      ['Selling, general and administrative expenses', 'sga', 'cost'],
      ['Other operating expenses', 'other_operating_expense', 'cost'],
      ['EBITDA', 'ebitda_reported', 'total'],
      ['Depreciation', 'depreciation', 'cost'],
      ['Amortisation', 'amortisation', 'cost'],
      ['Operating profit', 'ebit', 'total'],
      ['Finance costs', 'interest_expense', 'cost'],
      ['Finance income', 'interest_income'],
      ['Other non-operating items', 'other_non_operating'],
      ['Profit before tax', 'profit_before_tax', 'total'],
      ['Income tax', 'income_tax', 'cost'],
      ['Profit for the period', 'net_income', 'total'],
    ],
  },
  balance: {
    name: 'Balance sheet',
    rows: [
      ['Non-current assets', null],
      ['Property, plant and equipment', 'ppe_net'],
      ['Intangible assets', 'intangibles'],
      ['Goodwill', 'goodwill'],
      ['Other non-current assets', 'other_non_current_assets'],
      ['Total non-current assets', 'total_non_current_assets', 'total'],
      ['Current assets', null],
      ['Inventories', 'inventory'],
      ['Trade receivables', 'receivables'],
      ['Other current assets', 'other_current_assets'],
      ['Cash and cash equivalents', 'cash'],
      ['Total current assets', 'current_assets', 'total'],
      ['Total assets', 'total_assets', 'total'],
      ['Equity', null],
      ['Share capital', 'share_capital'],
      ['Retained earnings', 'retained_earnings'],
      ['Total equity', 'equity', 'total'],
      ['Non-current liabilities', null],
      ['Term loan', 'senior_debt'],
      ['Subordinated loan', 'junior_debt'],
      ['Lease liabilities', 'lease_liabilities'],
      ['Total non-current liabilities', 'total_non_current_liabilities', 'total'],
      ['Current liabilities', null],
      ['Short-term borrowings', 'short_term_debt'],
      ['Trade payables', 'payables'],
      ['Income tax payable', 'tax_payable'],
      ['Accruals and other liabilities', 'accrued_liabilities'],
      ['Total current liabilities', 'current_liabilities', 'total'],
      ['Total liabilities', 'total_liabilities', 'total'],
      ['Total equity and liabilities', 'total_equity_and_liabilities', 'total'],
    ],
  },
  'cash-flow': {
    name: 'Cash flow',
    rows: [
      ['Profit for the period', 'net_income'],
      ['Depreciation and amortisation', 'depreciation_and_amortisation'],
      ['Change in working capital', 'working_capital_change'],
      ['Net cash from operating activities', 'cfo', 'total'],
      ['Purchase of property, plant and equipment', 'capex'],
      ['Capitalised development costs', 'capitalised_costs_paid'],
      ['Acquisition of subsidiaries', 'acquisitions_paid'],
      ['Net cash used in investing activities', 'cfi', 'total'],
      ['New borrowings', 'debt_drawn'],
      ['Repayment of borrowings', 'debt_repaid'],
      ['Dividends paid', 'dividends_paid'],
      ['Net cash from financing activities', 'cff', 'total'],
      ['Net change in cash', 'net_change_in_cash', 'total'],
      ['Cash at beginning of period', 'opening_cash'],
      ['Cash at end of period', 'closing_cash', 'total'],
    ],
  },
};
const UNIT_WORDS: Readonly<Record<number, string>> = {
  1: 'in whole units',
  1000: 'thousand',
  1_000_000: 'million',
};
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** The bytes of an .xlsx file. Rows whose line no period gives are left out. */
export async function buildWorkbook(given: BorrowerWorkbook): Promise<Buffer> {
  const workbook = new ExcelJS.Workbook();
  for (const name of given.statements ?? (['income', 'balance', 'cash-flow'] as const))
    addSheet(workbook, name, given);
  given.change?.(workbook);
  return Buffer.from(await workbook.xlsx.writeBuffer());
}

function addSheet(workbook: ExcelJS.Workbook, name: StatementName, given: BorrowerWorkbook): void {
  const { name: title, rows } = SHEETS[name];
  const sheet = workbook.addWorksheet(title);
  sheet.getColumn(1).width = 44;
  sheet.getCell('A1').value = given.borrower;
  sheet.getCell('A1').font = { bold: true };
  sheet.getCell('A2').value = title;
  const unit = given.unit === undefined ? 1000 : given.unit;
  const currency = given.currency === undefined ? 'EUR' : given.currency;
  sheet.getCell('A4').value =
    [currency, unit === null ? null : UNIT_WORDS[unit]].filter(Boolean).join(' ') || null;
  given.periods.forEach((period, at) => {
    const heading = sheet.getCell(4, at + 2);
    heading.value =
      name === 'balance' ? dayText(period.end) : `${period.months} months to ${dayText(period.end)}`;
    heading.font = { bold: true };
    sheet.getColumn(at + 2).width = 22;
  });
  let row = 5;
  for (const [label, line, kind] of rows) {
    const amounts = given.periods.map((period) => (line === null ? undefined : period.amounts[line]));
    if (line !== null && amounts.every((amount) => amount === undefined)) continue;
    writeRow(sheet, row, label, amounts, kind, unit ?? 1000, given.costsNegative === true);
    row += 1;
  }
}

function writeRow(
  sheet: ExcelJS.Worksheet,
  row: number,
  label: string,
  amounts: readonly (number | string | undefined)[],
  kind: 'total' | 'cost' | undefined,
  unit: number,
  costsNegative: boolean,
): void {
  sheet.getCell(row, 1).value = label;
  sheet.getCell(row, 1).font = { bold: kind === 'total' };
  amounts.forEach((amount, at) => {
    if (amount === undefined) return;
    const cell = sheet.getCell(row, at + 2);
    cell.value = (Number(amount) / unit) * (kind === 'cost' && costsNegative ? -1 : 1);
    cell.numFmt = '#,##0';
    cell.font = { bold: kind === 'total' };
  });
}

function dayText(day: string): string {
  const [year, month, date] = day.split('-').map(Number) as [number, number, number];
  return `${date} ${MONTHS[month - 1]} ${year}`;
}
