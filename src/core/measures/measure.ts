import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { LineItemCode } from '../statements/lineItems.ts';

/** A missing input, by the line and the period that lacks it. */
export interface MissingLine {
  readonly line: LineItemCode | 'statement';
  readonly periodEnd: PlainDate;
  readonly months: number;
}

/** One figure that a result rests on, so that the result can be walked back to its cells. */
export interface InputUsed {
  readonly statementId: number;
  readonly line: LineItemCode;
  /** +1 or -1: how the amount enters the sum (LTM takes the prior year to date away). */
  readonly sign: 1 | -1;
  readonly amount: Decimal;
  readonly periodEnd: PlainDate;
  readonly months: number;
}

/** A measured amount or ratio. There is no number where there is no meaning. */
export type Reading =
  | { readonly kind: 'value'; readonly value: Decimal; readonly inputs: readonly InputUsed[] }
  | { readonly kind: 'not-meaningful'; readonly reason: string; readonly inputs: readonly InputUsed[] }
  | { readonly kind: 'missing'; readonly missing: readonly MissingLine[] };

export const MEASURE_CODES = [
  'total-leverage',
  'net-leverage',
  'interest-cover',
  'current-ratio',
  'minimum-liquidity',
] as const;
export type MeasureCode = (typeof MEASURE_CODES)[number];

export type MeasureUnit = 'times' | 'money';
