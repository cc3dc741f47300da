/**
 * The standard lines that every borrower's accounts are placed on.
 *
 * Signs: every amount is positive in its natural direction (revenue +, costs +, assets +, liabilities +);
 * equity, results and `other_non_operating` carry their own sign. Cash-flow lines are signed: money in +, money
 * out -, so capex of 3 is stored as -3.
 */
export type StatementPart = 'income' | 'balance' | 'cash-flow' | 'memo';

export interface LineItem {
  readonly code: string;
  readonly label: string;
  readonly part: StatementPart;
  /** A sum of other lines, never added again. */
  readonly subtotal?: true;
  /** May be negative by nature; elsewhere a negative amount is remarked on. */
  readonly signed?: true;
}

export const LINE_ITEMS = [
  { code: 'revenue', label: 'Revenue', part: 'income' },
  { code: 'other_operating_income', label: 'Other operating income', part: 'income' },
  { code: 'cogs', label: 'Cost of sales', part: 'income' },
  { code: 'gross_profit', label: 'Gross profit', part: 'income', subtotal: true, signed: true },
  { code: 'sga', label: 'Selling, general and administrative', part: 'income' },
  { code: 'staff_costs', label: 'Personnel expense', part: 'income' },
  { code: 'research_development', label: 'Research and development', part: 'income' },
  { code: 'rent_expense', label: 'Rent', part: 'income' },
  { code: 'other_operating_expense', label: 'Other operating expense', part: 'income' },
  { code: 'capitalised_costs', label: 'Own work capitalised', part: 'income' },
  { code: 'ebitda_reported', label: 'EBITDA as stated', part: 'income', subtotal: true, signed: true },
  { code: 'depreciation', label: 'Depreciation', part: 'income' },
  { code: 'amortisation', label: 'Amortisation', part: 'income' },
  { code: 'depreciation_and_amortisation', label: 'Depreciation and amortisation', part: 'income' },
  { code: 'impairment', label: 'Impairment', part: 'income' },
  { code: 'ebit', label: 'Operating profit', part: 'income', subtotal: true, signed: true },
  { code: 'interest_expense', label: 'Interest expense', part: 'income' },
  { code: 'interest_income', label: 'Interest income', part: 'income' },
  { code: 'other_non_operating', label: 'Other non-operating result', part: 'income', signed: true },
  { code: 'profit_before_tax', label: 'Profit before tax', part: 'income', subtotal: true, signed: true },
  { code: 'income_tax', label: 'Income tax', part: 'income', signed: true },
  { code: 'net_income', label: 'Net income', part: 'income', subtotal: true, signed: true },
  { code: 'cash', label: 'Cash', part: 'balance' },
  { code: 'restricted_cash', label: 'Restricted cash', part: 'balance' },
  { code: 'receivables', label: 'Trade receivables', part: 'balance' },
  { code: 'inventory', label: 'Inventories', part: 'balance' },
  { code: 'other_current_assets', label: 'Other current assets', part: 'balance' },
  { code: 'current_assets', label: 'Current assets', part: 'balance', subtotal: true },
  { code: 'ppe_gross', label: 'Property, plant and equipment, gross', part: 'balance' },
  { code: 'ppe_net', label: 'Property, plant and equipment, net', part: 'balance' },
  { code: 'intangibles', label: 'Intangible assets', part: 'balance' },
  { code: 'goodwill', label: 'Goodwill', part: 'balance' },
  { code: 'investments', label: 'Investments', part: 'balance' },
  { code: 'deferred_tax_asset', label: 'Deferred tax asset', part: 'balance' },
  { code: 'other_non_current_assets', label: 'Other non-current assets', part: 'balance' },
  { code: 'total_assets', label: 'Total assets', part: 'balance', subtotal: true },
  { code: 'payables', label: 'Trade payables', part: 'balance' },
  { code: 'accrued_liabilities', label: 'Accrued liabilities', part: 'balance' },
  { code: 'tax_payable', label: 'Tax payable', part: 'balance' },
  { code: 'short_term_debt', label: 'Short-term debt', part: 'balance' },
  { code: 'current_liabilities', label: 'Current liabilities', part: 'balance', subtotal: true },
  { code: 'senior_debt', label: 'Senior debt, long-term', part: 'balance' },
  { code: 'junior_debt', label: 'Junior debt, long-term', part: 'balance' },
  { code: 'lease_liabilities', label: 'Lease liabilities', part: 'balance' },
  { code: 'shareholder_loans', label: 'Shareholder loans', part: 'balance' },
  { code: 'deferred_tax_liability', label: 'Deferred tax liability', part: 'balance' },
  { code: 'other_non_current_liabilities', label: 'Other non-current liabilities', part: 'balance' },
  { code: 'total_liabilities', label: 'Total liabilities', part: 'balance', subtotal: true },
  { code: 'retained_earnings', label: 'Retained earnings', part: 'balance', signed: true },
  { code: 'equity', label: 'Equity', part: 'balance', subtotal: true, signed: true },
  { code: 'cfo', label: 'Cash from operations', part: 'cash-flow', subtotal: true, signed: true },
  { code: 'capex', label: 'Capital expenditure', part: 'cash-flow', signed: true },
  { code: 'capitalised_costs_paid', label: 'Capitalised costs paid', part: 'cash-flow', signed: true },
  { code: 'acquisitions_paid', label: 'Acquisitions paid', part: 'cash-flow', signed: true },
  { code: 'cfi', label: 'Cash from investing', part: 'cash-flow', subtotal: true, signed: true },
  { code: 'debt_drawn', label: 'Debt drawn', part: 'cash-flow', signed: true },
  { code: 'debt_repaid', label: 'Debt repaid', part: 'cash-flow', signed: true },
  { code: 'dividends_paid', label: 'Dividends paid', part: 'cash-flow', signed: true },
  { code: 'equity_issued', label: 'Equity issued', part: 'cash-flow', signed: true },
  { code: 'cff', label: 'Cash from financing', part: 'cash-flow', subtotal: true, signed: true },
  { code: 'fx_on_cash', label: 'Currency effect on cash', part: 'cash-flow', signed: true },
  { code: 'interest_paid', label: 'Interest paid', part: 'cash-flow', signed: true },
  { code: 'tax_paid', label: 'Tax paid', part: 'cash-flow', signed: true },
  { code: 'rent_paid', label: 'Rent paid', part: 'cash-flow', signed: true },
  { code: 'scheduled_principal', label: 'Scheduled principal', part: 'memo' },
  { code: 'revolver_drawn', label: 'Revolver drawn', part: 'memo' },
  { code: 'revolver_commitment', label: 'Revolver commitment', part: 'memo' },
  { code: 'letters_of_credit', label: 'Letters of credit', part: 'memo' },
  { code: 'collateral_value', label: 'Collateral value', part: 'memo' },
  { code: 'noi', label: 'Net operating income of the property', part: 'memo', signed: true },
] as const satisfies readonly LineItem[];

export type LineItemCode = (typeof LINE_ITEMS)[number]['code'];

export const LINE_ITEM_CODES: readonly LineItemCode[] = LINE_ITEMS.map((item) => item.code);

const BY_CODE: ReadonlyMap<string, LineItem> = new Map(LINE_ITEMS.map((item) => [item.code, item]));

/**
 * Whether text is the code of a standard line.
 *
 * @example isLineItemCode('revenue') // => true
 */
export const isLineItemCode = (text: string): text is LineItemCode => BY_CODE.has(text);

/**
 * A standard line by its code.
 *
 * @example lineItem('cogs').label // => 'Cost of sales'
 */
export function lineItem(code: LineItemCode): LineItem {
  const item = BY_CODE.get(code);
  if (!item) throw new Error(`no line item ${code}`);
  return item;
}
