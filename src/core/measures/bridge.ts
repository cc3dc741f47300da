import { ZERO, type Decimal } from '../money/decimal.ts';
import type { InputUsed, Reading } from '../statements/reading.ts';

export const BRIDGE_KINDS = ['figure', 'subtotal', 'add-back', 'disallowed', 'check', 'rate'] as const;

/**
 * One line of the way from the statements' lines to a tested amount; the lines above a subtotal add up to it, apart
 * from those that stand beside the sum: a check (EBITDA as stated, by the other route) and a currency rate.
 */
export interface BridgeLine {
  readonly label: string;
  /** Currency units of the covenant; of a rate, how many of them one unit is worth. */
  readonly amount: Decimal;
  readonly kind: (typeof BRIDGE_KINDS)[number];
  readonly inputs: readonly InputUsed[];
  /** Of an add-back its reason, evidence and approver; of what is over the cap the cap; of a rate its source. */
  readonly note?: string;
}

/**
 * A figure taken with its sign, where the accounts have it: a line that the borrower does not have is no nought.
 *
 * @example bridgeFigure('Income tax', { kind: 'missing', missing: [] }) // => []
 */
export const bridgeFigure = (label: string, reading: Reading, sign: 1 | -1 = 1): readonly BridgeLine[] =>
  reading.kind === 'value' && reading.inputs.length > 0
    ? [{ label, amount: signed(reading.value, sign), kind: 'figure', inputs: reading.inputs }]
    : [];

/** Taken from nought, not turned: a nought that is turned prints as -0. */
const signed = (value: Decimal, sign: 1 | -1): Decimal => (sign === 1 ? value : ZERO.minus(value));

/**
 * A sum of the lines above it, where it is known.
 *
 * @example bridgeSubtotal('EBITDA', { kind: 'missing', missing: [] }) // => []
 */
export const bridgeSubtotal = (label: string, reading: Reading): readonly BridgeLine[] =>
  reading.kind === 'value' ? [{ label, amount: reading.value, kind: 'subtotal', inputs: [] }] : [];
