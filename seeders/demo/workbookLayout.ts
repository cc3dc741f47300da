/** How a demo borrower's workbook is laid out: three sheets, a row a line, a column a quarter. */
import { plainDate } from '../../src/core/calendar/plainDate.ts';
import type { StatementPart } from '../../src/core/statements/lineItems.ts';
import {
  BALANCE_LINES,
  CASH_FLOW_LINES,
  INCOME_LINES,
  type DemoLine,
  type DemoQuarter,
} from './demoLines.ts';

/** Rows that sheets print besides the standard lines, so that every total is the sum of what stands above it. */
const FURTHER_AMOUNTS = {
  non_current: ({ ppe_net, intangibles, goodwill }) => ppe_net + intangibles + goodwill,
  share_capital: ({ equity, retained_earnings }) => equity - retained_earnings,
  equity_and_liabilities: ({ equity, total_liabilities }) => equity + total_liabilities,
} as const satisfies Record<string, (lines: DemoQuarter['lines']) => number>;

type SheetLine = DemoLine | keyof typeof FURTHER_AMOUNTS;

const amountOf = (line: SheetLine, { lines }: DemoQuarter): number =>
  line in FURTHER_AMOUNTS
    ? FURTHER_AMOUNTS[line as keyof typeof FURTHER_AMOUNTS](lines)
    : lines[line as DemoLine];

const LABELS: Readonly<Record<SheetLine, string>> = {
  non_current: 'Total non-current assets',
  share_capital: 'Share capital',
  equity_and_liabilities: 'Total equity and liabilities',
  revenue: 'Revenue',
  cogs: 'Cost of sales',
  gross_profit: 'Gross profit',
  other_operating_income: 'Other operating income',
  sga: 'Selling, general and administrative expenses',
  research_development: 'Research and development',
  rent_expense: 'Rent',
  other_operating_expense: 'Other operating expenses',
  ebitda_reported: 'EBITDA',
  depreciation: 'Depreciation',
  amortisation: 'Amortisation',
  ebit: 'Operating profit',
  interest_expense: 'Interest expense',
  interest_income: 'Interest income',
  profit_before_tax: 'Profit before tax',
  income_tax: 'Income tax',
  net_income: 'Net income',
  cash: 'Cash and cash equivalents',
  receivables: 'Trade receivables',
  inventory: 'Inventories',
  other_current_assets: 'Other current assets',
  current_assets: 'Total current assets',
  ppe_gross: 'Property, plant and equipment, gross',
  ppe_net: 'Property, plant and equipment, net',
  intangibles: 'Intangible assets',
  goodwill: 'Goodwill',
  total_assets: 'Total assets',
  payables: 'Trade payables',
  accrued_liabilities: 'Accrued liabilities',
  tax_payable: 'Tax payable',
  short_term_debt: 'Short-term debt',
  current_liabilities: 'Total current liabilities',
  senior_debt: 'Long-term borrowings',
  junior_debt: 'Subordinated loan',
  lease_liabilities: 'Lease liabilities',
  total_liabilities: 'Total liabilities',
  retained_earnings: 'Retained earnings',
  equity: 'Total equity',
  revolver_drawn: 'Revolver drawn',
  revolver_commitment: 'Revolver commitment',
  collateral_value: 'Property, latest valuation',
  cfo: 'Net cash from operating activities',
  capex: 'Capital expenditure',
  capitalised_costs_paid: 'Capitalised development costs',
  cfi: 'Net cash from investing activities',
  debt_drawn: 'Debt drawn',
  debt_repaid: 'Debt repaid',
  dividends_paid: 'Dividends paid',
  cff: 'Net cash from financing activities',
  interest_paid: 'Interest paid',
  tax_paid: 'Tax paid',
  rent_paid: 'Rent paid',
  scheduled_principal: 'Scheduled principal',
  noi: 'Net operating income of the property',
};

interface SheetLayout {
  readonly name: string;
  readonly part: StatementPart;
  readonly title: string;
  /** 0 is a balance at an instant. */
  readonly months: 0 | 3;
  readonly lines: readonly SheetLine[];
  /** Lines from here on stand under a heading "Memorandum". */
  readonly memorandumFrom: SheetLine | null;
}

const MEMORANDUM: readonly SheetLine[] = [
  'ppe_gross',
  'revolver_drawn',
  'revolver_commitment',
  'collateral_value',
];

const BALANCE_LINES_AS_PRINTED: readonly SheetLine[] = [
  ...BALANCE_LINES.filter((line) => !MEMORANDUM.includes(line)).flatMap((line): SheetLine[] => {
    if (line === 'total_assets') return ['non_current', line];
    if (line === 'retained_earnings') return ['share_capital', line];
    return line === 'equity' ? [line, 'equity_and_liabilities'] : [line];
  }),
  ...MEMORANDUM,
];

export const SHEETS: readonly SheetLayout[] = [
  {
    name: 'Income statement',
    part: 'income',
    title: 'Income statement for the 3 months ended',
    months: 3,
    lines: INCOME_LINES,
    memorandumFrom: null,
  },
  {
    name: 'Balance sheet',
    part: 'balance',
    title: 'Balance sheet at',
    months: 0,
    lines: BALANCE_LINES_AS_PRINTED,
    memorandumFrom: 'ppe_gross',
  },
  {
    name: 'Cash flow',
    part: 'cash-flow',
    title: 'Cash flow statement for the 3 months ended',
    months: 3,
    lines: CASH_FLOW_LINES,
    memorandumFrom: 'interest_paid',
  },
];

/** One row of a sheet as it is written: a text, or a line with its amounts in thousands. */
type SheetRow =
  | { readonly row: number; readonly text: string }
  | {
      readonly row: number;
      readonly line: SheetLine;
      readonly label: string;
      readonly amounts: readonly number[];
    };

export interface FilledSheet {
  readonly layout: SheetLayout;
  readonly headingRow: number;
  /** From column B on. */
  readonly headings: readonly string[];
  readonly rows: readonly SheetRow[];
}

const HEADING_ROW = 5;

/** What the analyst answered for the rows of the memorandum, by the reader's question keys. */
export const MEMORANDUM_PLACEMENTS: Readonly<Record<string, DemoLine>> = {
  [`placement:Balance sheet:${LABELS.revolver_drawn}`]: 'revolver_drawn',
  [`placement:Balance sheet:${LABELS.revolver_commitment}`]: 'revolver_commitment',
  [`placement:Balance sheet:${LABELS.collateral_value}`]: 'collateral_value',
  [`placement:Cash flow:${LABELS.scheduled_principal}`]: 'scheduled_principal',
  [`placement:Cash flow:${LABELS.noi}`]: 'noi',
};

/** Lines that a borrower without them has no row for; any other line is printed, with zeros where it is nothing. */
const ONLY_WHERE_CARRIED: readonly SheetLine[] = [
  'research_development',
  'inventory',
  'junior_debt',
  'lease_liabilities',
  'capitalised_costs_paid',
  'ebitda_reported',
  'rent_paid',
  'collateral_value',
  'noi',
];

/** The sheet's rows, headings apart. */
export function filledSheet(
  layout: SheetLayout,
  {
    borrowerName,
    unit,
    quarters,
  }: { borrowerName: string; unit: string | null; quarters: readonly DemoQuarter[] },
): FilledSheet {
  const rows: SheetRow[] = [borrowerName, layout.title, ...(unit === null ? [] : [unit])].map(
    (text, index) => ({
      row: index + 1,
      text,
    }),
  );
  let row = HEADING_ROW + 1;
  for (const line of layout.lines) {
    const amounts = quarters.map((quarter) => amountOf(line, quarter));
    if (ONLY_WHERE_CARRIED.includes(line) && amounts.every((amount) => amount === 0)) continue;
    if (line === layout.memorandumFrom) {
      rows.push({ row: row + 1, text: 'Memorandum' });
      row += 2;
    }
    rows.push({ row, line, label: LABELS[line], amounts });
    row += 1;
  }
  return {
    layout,
    headingRow: HEADING_ROW,
    headings: quarters.map(({ quarterEnd }) => dayInWords(quarterEnd)),
    rows,
  };
}

const MONTHS = ['March', 'June', 'September', 'December'] as const;

/** '30 September 2026'. */
function dayInWords(quarterEnd: string): string {
  const [year, month, day] = plainDate(quarterEnd).split('-').map(Number);
  return `${day} ${MONTHS[(month ?? 3) / 3 - 1]} ${year}`;
}

/** 'B' is 0. */
export function columnLetter(index: number): string {
  const letter = String.fromCharCode('B'.charCodeAt(0) + index);
  if (!/^[B-Z]$/.test(letter)) throw new RangeError(`column ${index} lies beyond Z`);
  return letter;
}
