import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { LineItemCode } from './lineItems.ts';

export const STATEMENT_BASES = ['audited', 'reviewed', 'management', 'forecast'] as const;
export type StatementBasis = (typeof STATEMENT_BASES)[number];

export const STATEMENT_SCOPES = ['group', 'stand-alone'] as const;
export type StatementScope = (typeof STATEMENT_SCOPES)[number];

/** How far the statement's identities hold; see identities.ts for the tolerances. */
export const TIES = ['ties', 'warning', 'does-not-tie', 'not-checked'] as const;
export type Tie = (typeof TIES)[number];

/** Amounts in whole currency units. A line that is not there is missing; a zero is a zero. */
export type Amounts = Readonly<Partial<Record<LineItemCode, Decimal>>>;

/**
 * One version of one borrower's figures for one period.
 *
 * `months` is 0 for a balance sheet (start and end are the balance date) and the number of months for income and
 * cash flow. A balance sheet and the flows that end on its day are two statements, so that a quarter and a year
 * to date can share one balance sheet.
 */
export interface Statement {
  readonly id: number;
  readonly periodStart: PlainDate;
  readonly periodEnd: PlainDate;
  readonly months: number;
  readonly basis: StatementBasis;
  readonly scope: StatementScope;
  readonly framework: string;
  readonly currency: string;
  /** The unit the sheet was rounded to: '1', '1000', '1000000'. */
  readonly roundingUnit: Decimal;
  readonly amounts: Amounts;
  readonly tie: Tie;
  /** Counts up from 1 within one period, basis and scope. */
  readonly version: number;
  readonly receivedOn: PlainDate;
  readonly importId: number | null;
}
