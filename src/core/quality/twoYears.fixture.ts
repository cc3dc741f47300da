/** One invented firm over three year ends, in whole units: the firm of the reference vectors q-022 to q-025. */
import { plainDate } from '../calendar/plainDate.ts';
import { decimal } from '../money/decimal.ts';
import type { LineItemCode } from '../statements/lineItems.ts';
import { buildStatement } from '../statements/statement.fixture.ts';
import type { Statement } from '../statements/statement.ts';
import { bookOf } from '../statements/statementBook.ts';
import { accountsAt } from './accountsAt.ts';

export const LATEST = plainDate('2025-12-31');
const BEFORE = plainDate('2024-12-31');
const TWO_BEFORE = plainDate('2023-12-31');

export type Lines = Readonly<Partial<Record<LineItemCode, number>>>;

export const CLOSING: Lines = {
  cash: 7,
  receivables: 27,
  inventory: 19,
  other_current_assets: 3.5,
  current_assets: 56.5,
  ppe_net: 42,
  ppe_gross: 70,
  intangibles: 11.5,
  total_assets: 110,
  payables: 15,
  accrued_liabilities: 6.5,
  tax_payable: 1.2,
  short_term_debt: 6,
  current_liabilities: 28.7,
  senior_debt: 36.8,
  other_non_current_liabilities: 2,
  total_liabilities: 67.5,
  retained_earnings: 30,
  equity: 42.5,
};
export const OPENING: Lines = {
  cash: 8,
  receivables: 20,
  inventory: 15,
  other_current_assets: 3,
  current_assets: 46,
  ppe_net: 40,
  ppe_gross: 64,
  intangibles: 10,
  total_assets: 96,
  payables: 14,
  accrued_liabilities: 6,
  tax_payable: 1,
  short_term_debt: 5,
  current_liabilities: 26,
  senior_debt: 30,
  other_non_current_liabilities: 2,
  total_liabilities: 58,
  retained_earnings: 25.5,
  equity: 38,
};
/** Two years back the vectors imply receivables of 18 and assets of 92; the rest of it nobody reads. */
export const EARLIER: Lines = { ...OPENING, receivables: 18, total_assets: 92 };

export const YEAR: Lines = {
  revenue: 132,
  cogs: 88,
  sga: 22,
  net_income: 5.5,
  income_tax: 1.3,
  interest_expense: 1.2,
  profit_before_tax: 6.8,
  ebit: 8,
  depreciation: 6,
  depreciation_and_amortisation: 6,
  cfo: 1.7,
  capex: -9.5,
  cfi: -9.5,
  debt_drawn: 6.8,
  debt_repaid: 0,
  equity_issued: 0,
  dividends_paid: -1,
  interest_paid: -2.6,
  tax_paid: -1.6,
};
export const YEAR_BEFORE: Lines = {
  ...YEAR,
  revenue: 118,
  cogs: 80,
  sga: 20,
  net_income: 4.7,
  cfo: 4,
  debt_drawn: 0,
};

export interface Firm {
  readonly closing?: Lines;
  readonly opening?: Lines;
  readonly earlier?: Lines | null;
  readonly year?: Lines;
  readonly yearBefore?: Lines;
  readonly given?: Partial<Statement>;
}

/** Statements in millions of units. */
export const statementsOfFirm = (firm: Firm = {}): Statement[] => {
  const balance = (date: typeof LATEST, lines: Lines) => buildStatement(date, 0, millions(lines), firm.given);
  const flows = (date: typeof LATEST, lines: Lines) => buildStatement(date, 12, millions(lines), firm.given);
  return [
    ...(firm.earlier === null ? [] : [balance(TWO_BEFORE, firm.earlier ?? EARLIER)]),
    balance(BEFORE, firm.opening ?? OPENING),
    balance(LATEST, firm.closing ?? CLOSING),
    flows(BEFORE, firm.yearBefore ?? YEAR_BEFORE),
    flows(LATEST, firm.year ?? YEAR),
  ];
};

export const accountsOfFirm = (firm: Firm = {}) => accountsAt(bookOf(statementsOfFirm(firm), 12), LATEST);

/** The lines but for those named. */
export const without = (lines: Lines, ...left: readonly LineItemCode[]): Lines =>
  Object.fromEntries(Object.entries(lines).filter(([line]) => !left.includes(line as LineItemCode)));

const millions = (lines: Lines): Partial<Record<LineItemCode, string>> =>
  Object.fromEntries(
    Object.entries(lines).map(([line, value]) => [line, decimal(value).times(1_000_000).toFixed()]),
  );
