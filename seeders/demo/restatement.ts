/** Figures as first reported, where the borrower later took back revenue that was not its own to show. */
import type { DemoQuarter } from './demoLines.ts';
import { quarterEbitda } from './ratios.ts';

/** Share of each quarter's EBITDA that was reported too much. */
const OVERSTATED_SHARE = 0.07;

/**
 * The four quarters of a year as first reported: revenue too high and receivables too high by the same, so that
 * cash, tax and cash flow are the ones that happened and both versions tie.
 */
export function asFirstReported(yearOfQuarters: readonly DemoQuarter[]): DemoQuarter[] {
  let overstated = 0;
  return yearOfQuarters.map((quarter) => {
    const excess = Math.round(quarterEbitda(quarter) * OVERSTATED_SHARE);
    overstated += excess;
    const { lines } = quarter;
    return {
      ...quarter,
      lines: {
        ...lines,
        revenue: lines.revenue + excess,
        gross_profit: lines.gross_profit + excess,
        ebit: lines.ebit + excess,
        profit_before_tax: lines.profit_before_tax + excess,
        net_income: lines.net_income + excess,
        receivables: lines.receivables + overstated,
        current_assets: lines.current_assets + overstated,
        total_assets: lines.total_assets + overstated,
        retained_earnings: lines.retained_earnings + overstated,
        equity: lines.equity + overstated,
      },
    };
  });
}
