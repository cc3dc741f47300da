/** A borrower's balance sheets cut as the published measures take them. */
import type { OperatingBalances } from '../accruals/balanceSheetAccruals.ts';
import type { OperatingBalanceSheet } from '../accruals/netOperatingAssets.ts';
import type { Back } from './accountsAt.ts';
import type { FigureReader } from './figureReader.ts';

const LONG_TERM_DEBT = ['senior_debt', 'junior_debt', 'lease_liabilities', 'shareholder_loans'] as const;

/**
 * Debt that falls due after a year: senior, junior, leases and shareholders' loans.
 *
 * @example longTermDebt(figureReader(accounts), { months: 0 }) // => 45000000
 */
export const longTermDebt = (figures: FigureReader, back: Back): number =>
  LONG_TERM_DEBT.reduce((sum, line) => sum + figures.optionalBalance(line, back), 0);

/**
 * Cash with what of it is restricted, as both stand within current assets.
 *
 * @example allCash(figureReader(accounts), { months: 0 }) // => 6000000
 */
export const allCash = (figures: FigureReader, back: Back): number =>
  figures.balance('cash', back) + figures.optionalBalance('restricted_cash', back);

/**
 * As Richardson et al. cut it; long-term investments may be nought (methods.md B2).
 *
 * @example operatingSheet(figureReader(accounts), { months: 0 }).longTermDebt // => 45000000
 */
export const operatingSheet = (figures: FigureReader, back: Back): OperatingBalanceSheet => ({
  currentAssets: figures.balance('current_assets', back),
  cash: allCash(figures, back),
  totalAssets: figures.balance('total_assets', back),
  longTermInvestments: figures.accounts.balance('investments', back) ?? 0,
  currentLiabilities: figures.balance('current_liabilities', back),
  shortTermDebt: figures.optionalBalance('short_term_debt', back),
  longTermDebt: longTermDebt(figures, back),
  totalLiabilities: figures.balance('total_liabilities', back),
});

/**
 * As Sloan cuts it; tax payable may be nought, and short-term debt where there was never any (methods.md B2).
 *
 * @example operatingBalances(figureReader(accounts), { months: 0 }).taxPayable // => 0
 */
export const operatingBalances = (figures: FigureReader, back: Back): OperatingBalances => ({
  currentAssets: figures.balance('current_assets', back),
  cash: allCash(figures, back),
  currentLiabilities: figures.balance('current_liabilities', back),
  shortTermDebt: figures.optionalBalance('short_term_debt', back),
  taxPayable: figures.accounts.balance('tax_payable', back) ?? 0,
  totalAssets: figures.balance('total_assets', back),
});
