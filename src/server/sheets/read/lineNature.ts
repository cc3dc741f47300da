/** What kind of row a line is: which way it goes into totals, and what it closes. */
import { COST_LINES as COST_LINES_OF_STATEMENTS } from '#core/statements/costSigns.ts';
import { LINE_ITEMS, type LineItemCode } from '#core/statements/lineItems.ts';
import type { Line } from './wordings/lines.ts';

/** Costs as the core counts them, and what a sheet has besides. */
export const COST_LINES: ReadonlySet<Line> = new Set<Line>([
  ...COST_LINES_OF_STATEMENTS,
  'income_tax',
  'total_operating_costs',
]);
export const OUTFLOW_LINES: ReadonlySet<Line> = new Set<Line>([
  'capex',
  'capitalised_costs_paid',
  'acquisitions_paid',
  'debt_repaid',
  'dividends_paid',
  'interest_paid',
  'tax_paid',
  'rent_paid',
  'lease_repaid',
]);
export const LIABILITY_LINES: ReadonlySet<Line> = new Set<Line>([
  'payables',
  'accrued_liabilities',
  'tax_payable',
  'short_term_debt',
  'current_liabilities',
  'senior_debt',
  'junior_debt',
  'lease_liabilities',
  'shareholder_loans',
  'deferred_tax_liability',
  'other_non_current_liabilities',
  'total_non_current_liabilities',
  'total_liabilities',
]);
export const EQUITY_LINES: ReadonlySet<Line> = new Set<Line>([
  'equity',
  'retained_earnings',
  'share_capital',
  'other_equity',
]);
export const FREE_SIGNS: ReadonlySet<Line> = new Set<Line>([
  'other_non_operating',
  'net_finance_result',
  'inventory_change',
  'interest_expense',
  'interest_income',
  'income_tax',
]);
export const ASIDE: ReadonlySet<Line> = new Set<Line>([
  'memo',
  'adjusted_ebitda',
  'total_debt',
  'net_debt',
  'attributable_result',
]);
const SUBTOTALS: ReadonlySet<Line> = new Set<Line>([
  ...LINE_ITEMS.filter((item) => 'subtotal' in item).map((item) => item.code),
  'total_operating_costs',
  'total_income',
  'gross_operating_surplus',
  'total_non_current_assets',
  'total_non_current_liabilities',
  'total_equity_and_liabilities',
  'net_current_assets',
  'assets_less_current_liabilities',
  'net_change_in_cash',
  'closing_cash',
  'operating_subtotal',
]);
export const CLOSES_ALL: ReadonlySet<Line> = new Set<Line>([
  'gross_profit',
  'ebit',
  'profit_before_tax',
  'net_income',
]);
export const CLOSES_SECTION: ReadonlySet<Line> = new Set<Line>([
  'current_assets',
  'total_non_current_assets',
  'current_liabilities',
  'total_non_current_liabilities',
  'equity',
  'cfo',
  'cfi',
  'cff',
]);
export const BARRIERS: ReadonlySet<Line> = new Set<Line>([
  'total_assets',
  'total_equity_and_liabilities',
  'net_income',
]);
export const isSubtotal = (line: Line | null): boolean => line !== null && SUBTOTALS.has(line);

export const isStandardLine = (line: Line | null): line is LineItemCode =>
  line !== null && LINE_ITEMS.some((item) => item.code === line);
