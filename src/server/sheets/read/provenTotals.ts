/** Lines that sums prove for rows whose wording does not: the arithmetic names them. */
import type { LineItemCode } from '#core/statements/lineItems.ts';
import type { Run } from './statements.ts';
import type { Line } from './wordings/lines.ts';

/** What each total is made of: all of `needs`, and nothing beyond `allows`. */
const TOTALS: readonly {
  readonly line: LineItemCode;
  readonly needs: readonly Line[];
  readonly allows: readonly Line[];
}[] = [
  { line: 'net_income', needs: ['profit_before_tax', 'income_tax'], allows: [] },
  { line: 'gross_profit', needs: ['revenue', 'cogs'], allows: [] },
  {
    line: 'profit_before_tax',
    needs: ['ebit', 'interest_expense'],
    allows: ['interest_income', 'net_finance_result', 'other_non_operating'],
  },
  { line: 'ppe_net', needs: ['ppe_gross', 'accumulated_depreciation'], allows: [] },
  { line: 'total_assets', needs: ['current_assets', 'total_non_current_assets'], allows: [] },
  { line: 'total_liabilities', needs: ['current_liabilities', 'total_non_current_liabilities'], allows: [] },
];

/** The line of a row without a known wording that adds up from known ones; null where the run has that line already. */
export function provenLine(run: Run, index: number): LineItemCode | null {
  const parts = run.signed.sums.sums.get(index);
  if (!parts) return null;
  const lines = parts.map((part) => run.rows[part]?.line ?? null);
  const found = TOTALS.find(
    ({ needs, allows }) =>
      needs.every((line) => lines.includes(line)) &&
      lines.every((line) => line !== null && (needs.includes(line) || allows.includes(line))),
  );
  return found && !run.rows.some(({ line }) => line === found.line) ? found.line : null;
}

/** 'Total overheads' over rows of which none has a line of its own stands for all of them. */
export function isOverheads(run: Run, index: number): boolean {
  const parts = run.signed.sums.sums.get(index) ?? [];
  return (
    run.rows[index]?.line === 'total_operating_costs' &&
    parts.length >= 2 &&
    parts.every((part) => run.rows[part]?.line === null)
  );
}
