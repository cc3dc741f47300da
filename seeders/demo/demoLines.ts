/** The lines that every demo borrower reports, in the order in which its sheets print them. */
import type { LineItemCode } from '../../src/core/statements/lineItems.ts';

export const INCOME_LINES = [
  'revenue',
  'cogs',
  'gross_profit',
  'other_operating_income',
  'sga',
  'research_development',
  'rent_expense',
  'other_operating_expense',
  'ebitda_reported',
  'depreciation',
  'amortisation',
  'ebit',
  'interest_expense',
  'interest_income',
  'profit_before_tax',
  'income_tax',
  'net_income',
] as const satisfies readonly LineItemCode[];

export const BALANCE_LINES = [
  'cash',
  'receivables',
  'inventory',
  'other_current_assets',
  'current_assets',
  'ppe_gross',
  'ppe_net',
  'intangibles',
  'goodwill',
  'total_assets',
  'payables',
  'accrued_liabilities',
  'tax_payable',
  'short_term_debt',
  'current_liabilities',
  'senior_debt',
  'junior_debt',
  'lease_liabilities',
  'total_liabilities',
  'retained_earnings',
  'equity',
  'revolver_drawn',
  'revolver_commitment',
  'collateral_value',
] as const satisfies readonly LineItemCode[];

export const CASH_FLOW_LINES = [
  'cfo',
  'capex',
  'capitalised_costs_paid',
  'cfi',
  'debt_drawn',
  'debt_repaid',
  'dividends_paid',
  'cff',
  'interest_paid',
  'tax_paid',
  'rent_paid',
  'scheduled_principal',
  'noi',
] as const satisfies readonly LineItemCode[];

export type DemoLine =
  (typeof INCOME_LINES)[number] | (typeof BALANCE_LINES)[number] | (typeof CASH_FLOW_LINES)[number];

/** One quarter, flows of the three months and balances at their end, in thousands. */
export interface DemoQuarter {
  readonly quarterEnd: `${number}-${number}-${number}`;
  readonly lines: Readonly<Record<DemoLine, number>>;
}
