import { ifAll, type AccountsAt, type Back } from './accountsAt.ts';

/**
 * Operating working capital on a balance sheet: current assets without cash less current liabilities without debt;
 * where the totals are not given, its parts.
 *
 * Source: methods.md A3 and B1 item 10.
 *
 * @example workingCapital(accounts, { months: 0 }) // => 4000000
 */
export function workingCapital(accounts: AccountsAt, back: Back): number | undefined {
  const byTotals = ifAll(
    {
      currentAssets: accounts.balance('current_assets', back),
      cash: accounts.balance('cash', back),
      restricted: accounts.optionalBalance('restricted_cash', back),
      currentLiabilities: accounts.balance('current_liabilities', back),
      shortTermDebt: accounts.optionalBalance('short_term_debt', back),
    },
    (sums) =>
      sums.currentAssets - sums.cash - sums.restricted - (sums.currentLiabilities - sums.shortTermDebt),
  );
  if (byTotals !== undefined) return byTotals;
  return ifAll(
    {
      receivables: accounts.balance('receivables', back),
      inventory: accounts.optionalBalance('inventory', back),
      otherAssets: accounts.optionalBalance('other_current_assets', back),
      payables: accounts.balance('payables', back),
      accrued: accounts.optionalBalance('accrued_liabilities', back),
      tax: accounts.optionalBalance('tax_payable', back),
    },
    (parts) =>
      parts.receivables + parts.inventory + parts.otherAssets - parts.payables - parts.accrued - parts.tax,
  );
}
