import type { PlainDate } from '../calendar/plainDate.ts';
import { ZERO, type Decimal } from '../money/decimal.ts';
import type { LineItemCode } from './lineItems.ts';

/** A missing input, by the line and the period that lacks it; 'statement' where no statement of that period is there. */
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

/**
 * The sum of readings, each times its sign. Missing where any part is missing, with every gap named; not
 * meaningful where a part has no meaning.
 *
 * @example sumOfReadings([{ sign: 1, reading: { kind: 'value', value: ZERO, inputs: [] } }, { sign: -1, reading: { kind: 'missing', missing: [] } }]).kind // => 'value'
 */
export function sumOfReadings(
  parts: readonly { readonly sign: 1 | -1; readonly reading: Reading }[],
): Reading {
  const missing = parts.flatMap(({ reading }) => (reading.kind === 'missing' ? reading.missing : []));
  if (missing.length > 0) return { kind: 'missing', missing };
  const inputs = parts.flatMap(({ sign, reading }) =>
    reading.kind === 'missing' ? [] : reading.inputs.map((input) => withSign(input, sign)),
  );
  const without = parts.find(({ reading }) => reading.kind === 'not-meaningful')?.reading;
  if (without?.kind === 'not-meaningful') return { kind: 'not-meaningful', reason: without.reason, inputs };
  return { kind: 'value', value: sumOfInputs(inputs), inputs };
}

/**
 * What the inputs of an additive result add up to.
 *
 * @example sumOfInputs([{ sign: 1, amount: decimal(84) }, { sign: -1, amount: decimal(60) }]) // => 24
 */
export const sumOfInputs = (inputs: readonly InputUsed[]): Decimal =>
  inputs.reduce((sum, input) => sum.plus(input.amount.times(input.sign)), ZERO);

const withSign = (input: InputUsed, sign: 1 | -1): InputUsed =>
  sign === 1 ? input : { ...input, sign: input.sign === 1 ? -1 : 1 };
