import type { SqlValues } from './sql.ts';

/** The desks whose borrowers a person reaches: every desk, some, or none. */
export type DeskScope = 'all' | readonly number[];

/** The scope as a condition on the desk of the borrower aliased `b`; no desks match nothing. */
export const inScope = (scope: DeskScope): { readonly sql: string; readonly values: SqlValues } =>
  scope === 'all'
    ? { sql: 'true', values: {} }
    : { sql: 'b.desk_id in (:scopeDesks)', values: { scopeDesks: scope } };
