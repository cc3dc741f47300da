/** What checks of a table have in common. */
import type { IdentityResult } from '#core/statements/identities.ts';
import type { ReadCheck } from '#core/statements/workbookReading.ts';
import type { EntityColumns } from './entities.ts';
import type { SettledColumn, StatementTable } from './statements.ts';
import type { SettledScale } from './units.ts';

export interface CheckedTable {
  readonly table: StatementTable;
  readonly scale: SettledScale;
}

/** Columns of a length that is still open are checked as well: sums hold at any length. */
const isActual = ({ scenario }: SettledColumn): boolean => scenario === 'actual';

/** All entities while none is chosen, each for itself. */
export function checkedColumns(table: StatementTable, entities: EntityColumns): readonly SettledColumn[] {
  const chosen = (entities.columns.get(table) ?? []).filter(isActual);
  return chosen.length > 0 ? chosen : (entities.all.get(table) ?? []).filter(isActual);
}

export function checkOf(
  code: string,
  text: string,
  result: IdentityResult,
  period: { readonly end: string; readonly months: number },
): ReadCheck {
  return {
    code,
    text,
    outcome: result.outcome,
    difference: result.difference.toFixed(),
    tolerance: result.tolerance.toFixed(),
    periodEnd: period.end,
    months: period.months,
  };
}
