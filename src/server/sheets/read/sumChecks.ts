/** Totals against the rows they are made of. */
import { decimal, type Decimal } from '#core/money/decimal.ts';
import { identity } from '#core/statements/identities.ts';
import type { ReadCheck } from '#core/statements/workbookReading.ts';
import { checkedColumns, checkOf, type CheckedTable } from './checkedTables.ts';
import type { EntityColumns } from './entities.ts';
import { COST_LINES } from './lineNature.ts';
import type { Run, SettledColumn } from './statements.ts';
import type { SettledScale } from './units.ts';
import type { Line } from './wordings/lines.ts';

const INCOME_CODES: Readonly<Partial<Record<Line, string>>> = {
  gross_profit: 'gross-profit',
  profit_before_tax: 'pbt',
  net_income: 'net-income',
};

/** Totals against their parts, as arithmetic found them or as they should have been. */
export function sumChecks({ table, scale }: CheckedTable, entities: EntityColumns): ReadCheck[] {
  return table.runs.flatMap((run) =>
    checkedColumns(table, entities).flatMap((column) =>
      [...run.signed.sums.sums, ...run.signed.sums.untied].flatMap(([index, parts]) => {
        const result = sumCheck(run, index, parts, column);
        return result ? [scaled(result, scale)] : [];
      }),
    ),
  );
}

const scaled = (found: ReadCheck, { unit }: SettledScale): ReadCheck => ({
  ...found,
  difference: decimal(found.difference)
    .times(unit ?? 1)
    .toFixed(),
  tolerance: decimal(found.tolerance)
    .times(unit ?? 1)
    .toFixed(),
});

function sumCheck(
  run: Run,
  index: number,
  parts: readonly number[],
  column: SettledColumn,
): ReadCheck | null {
  const total = run.rows[index];
  const given = run.amounts[index]?.[column.index];
  const code = total?.line ? INCOME_CODES[total.line] : undefined;
  const untied = run.signed.sums.untied.has(index);
  if (!total || !given || (!code && !untied) || (untied && !isWhole(run, total.line, parts))) return null;
  const contributions = parts.flatMap((part) => {
    const amount = run.amounts[part]?.[column.index];
    return amount ? [amount.times(contributionOf(run, part))] : [];
  });
  if (contributions.length < 2) return null;
  const reference = referenceOf(run, column) ?? given.abs();
  const result = identity({
    given: given.times(contributionOf(run, index)),
    parts: contributions,
    reference,
    roundingUnit: run.step,
  });
  const period = { end: column.end, months: run.part === 'balance' ? 0 : (column.months ?? 0) };
  return checkOf(code ?? 'subtotal', `${total.row.label} against the rows it is made of`, result, period);
}

/** How a printed row goes into its total: costs lower it. */
function contributionOf(run: Run, index: number): 1 | -1 {
  const line = run.rows[index]?.line ?? null;
  const factor = run.part === 'balance' ? 1 : run.signed.factorOf(index, line);
  return (line && COST_LINES.has(line) ? -factor : factor) as 1 | -1;
}

/** A short table that leaves lines out proves nothing of its totals. */
function isWhole(run: Run, line: Line | null, parts: readonly number[]): boolean {
  const lines = parts.map((part) => run.rows[part]?.line);
  if (line === 'profit_before_tax')
    return lines.includes('interest_expense') || lines.includes('net_finance_result');
  if (line === 'net_income') return lines.includes('income_tax') && lines.includes('profit_before_tax');
  if (line === 'gross_profit') return lines.includes('revenue') && lines.includes('cogs');
  if (line === 'ebit') return parts.length >= 3;
  return parts.length >= 2;
}

function referenceOf(run: Run, column: SettledColumn): Decimal | null {
  const wanted: readonly Line[] =
    run.part === 'income' ? ['revenue'] : ['total_assets', 'total_equity_and_liabilities'];
  const index = run.rows.findIndex(({ line }) => line !== null && wanted.includes(line));
  return run.amounts[index]?.[column.index]?.abs() ?? null;
}
