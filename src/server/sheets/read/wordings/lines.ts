/** The lines that rows are placed on: the standard lines, and lines that only help to check and to leave out. */
import type { LineItemCode, StatementPart } from '#core/statements/lineItems.ts';

/** Never a fact: a subtotal without a standard line, an entry within equity or cash flow, a figure that is no amount. */
export const HELPER_LINES = [
  'total_operating_costs',
  'total_income',
  'net_finance_result',
  'gross_operating_surplus',
  'adjusted_ebitda',
  'inventory_change',
  'attributable_result',
  'total_non_current_assets',
  'total_non_current_liabilities',
  'total_equity_and_liabilities',
  'net_current_assets',
  'assets_less_current_liabilities',
  'total_debt',
  'net_debt',
  'accumulated_depreciation',
  'share_capital',
  'other_equity',
  'minority_interests',
  'balancing_item',
  'opening_cash',
  'closing_cash',
  'net_change_in_cash',
  'operating_adjustment',
  'operating_subtotal',
  'asset_sales',
  'other_investing',
  'other_financing',
  'lease_repaid',
  'interest_received',
  'memo',
] as const;
export type HelperLine = (typeof HELPER_LINES)[number];
export type Line = LineItemCode | HelperLine;

export type Section =
  | 'assets'
  | 'current-assets'
  | 'non-current-assets'
  | 'equity'
  | 'liabilities'
  | 'current-liabilities'
  | 'non-current-liabilities'
  | 'operating'
  | 'investing'
  | 'financing';

/** Wordings in any language, parted by |. */
export type Wordings = Readonly<Partial<Record<Line, string>>>;

export interface PartWordings {
  readonly part: Exclude<StatementPart, 'memo'>;
  /** Wordings that mean one line wherever they stand in the part. */
  readonly anywhere: Wordings;
  /** Wordings that mean a line only within a section. */
  readonly within: Readonly<Partial<Record<Section, Wordings>>>;
}
