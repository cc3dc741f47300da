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
  /** What one unit of the statement's currency counts in the covenant's; left out where they are the same. */
  readonly rate?: Decimal;
}

/** A measured amount or ratio. There is no number where there is no meaning. */
export type Reading =
  | { readonly kind: 'value'; readonly value: Decimal; readonly inputs: readonly InputUsed[] }
  | { readonly kind: 'not-meaningful'; readonly reason: string; readonly inputs: readonly InputUsed[] }
  | { readonly kind: 'missing'; readonly missing: readonly MissingLine[] };

export interface SignedReading {
  readonly sign: 1 | -1;
  readonly reading: Reading;
}

/**
 * The sum of readings, each times its sign. Missing where any part is missing, with every gap named; not
 * meaningful where a part has no meaning.
 *
 * @example sumOfReadings([{ sign: 1, reading: { kind: 'value', value: decimal(84), inputs: [] } }, { sign: -1, reading: { kind: 'value', value: decimal(60), inputs: [] } }]).value // => 24
 */
export function sumOfReadings(parts: readonly SignedReading[]): Reading {
  const missing: MissingLine[] = [];
  const inputs: InputUsed[] = [];
  let value: Decimal | null = null;
  let reason: string | null = null;
  for (const { sign, reading } of parts) {
    if (reading.kind === 'missing') {
      missing.push(...reading.missing);
      continue;
    }
    for (const input of reading.inputs) inputs.push(withSign(input, sign));
    if (reading.kind === 'value') value = added(value, sign, reading.value);
    else reason ??= reading.reason;
  }
  if (missing.length > 0) return { kind: 'missing', missing };
  return reason === null
    ? { kind: 'value', value: value ?? ZERO, inputs }
    : { kind: 'not-meaningful', reason, inputs };
}

/**
 * What the inputs of an additive result add up to.
 *
 * @example sumOfInputs([{ sign: 1, amount: decimal(84) }, { sign: -1, amount: decimal(60) }]) // => 24
 */
export function sumOfInputs(inputs: readonly InputUsed[]): Decimal {
  let sum: Decimal | null = null;
  for (const { sign, amount, rate } of inputs) sum = added(sum, sign, rate ? amount.times(rate) : amount);
  return sum ?? ZERO;
}

/** The first amount is the sum, without adding it to nought: most lines have one. */
function added(sum: Decimal | null, sign: 1 | -1, amount: Decimal): Decimal {
  if (sum === null) return sign === 1 && !amount.isZero() ? amount : signed(sign, amount);
  return sign === 1 ? sum.plus(amount) : sum.minus(amount);
}

const signed = (sign: 1 | -1, amount: Decimal): Decimal =>
  sign === 1 ? ZERO.plus(amount) : ZERO.minus(amount);

const withSign = (input: InputUsed, sign: 1 | -1): InputUsed =>
  sign === 1 ? input : { ...input, sign: input.sign === 1 ? -1 : 1 };
