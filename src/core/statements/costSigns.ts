import { ZERO } from '../money/decimal.ts';
import type { LineItemCode } from './lineItems.ts';
import type { Amounts } from './statement.ts';

/** Lines that a sheet may write as negatives, all of them or none. */
export const COST_LINES = [
  'cogs',
  'sga',
  'staff_costs',
  'research_development',
  'rent_expense',
  'other_operating_expense',
  'depreciation',
  'amortisation',
  'depreciation_and_amortisation',
  'impairment',
  'interest_expense',
] as const satisfies readonly LineItemCode[];

/** Share of negative cells from which a block is written as negatives. Source: methods.md A1. */
export const NEGATIVE_SHARE = 0.8;

/**
 * Whether a sheet writes costs as negatives: at least 80 % of its cost cells are below nought. Then the whole block
 * is turned and the identities run again; single cells are never turned. Source: methods.md A1.
 *
 * @example writesCostsNegative([{ cogs: decimal(-50), sga: decimal(-10) }]) // => true
 */
export function writesCostsNegative(columns: readonly Amounts[]): boolean {
  const cells = columns.flatMap((column) => COST_LINES.flatMap((line) => column[line] ?? []));
  const filled = cells.filter((cell) => !cell.isZero());
  return filled.length > 0 && filled.filter((cell) => cell.lt(ZERO)).length / filled.length >= NEGATIVE_SHARE;
}

/**
 * The amounts with every cost turned, as one block.
 *
 * @example withCostsTurned({ revenue: decimal(80), cogs: decimal(-50) }) // => { revenue: 80, cogs: 50 }
 */
export function withCostsTurned(amounts: Amounts): Amounts {
  const turned = COST_LINES.flatMap((line) => {
    const amount = amounts[line];
    return amount ? [[line, amount.negated()] as const] : [];
  });
  return { ...amounts, ...Object.fromEntries(turned) };
}
