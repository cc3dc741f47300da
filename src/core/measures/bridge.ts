import type { Decimal } from '../money/decimal.ts';
import type { InputUsed, Reading } from '../statements/reading.ts';

/** One line of the way from the statements' lines to a tested amount; the lines above a subtotal add up to it. */
export interface BridgeLine {
  readonly label: string;
  readonly amount: Decimal;
  readonly kind: 'figure' | 'subtotal' | 'add-back' | 'disallowed';
  readonly inputs: readonly InputUsed[];
}

/**
 * A figure taken with its sign, where it is known.
 *
 * @example bridgeFigure('Income tax', { kind: 'missing', missing: [] }) // => []
 */
export const bridgeFigure = (label: string, reading: Reading, sign: 1 | -1 = 1): readonly BridgeLine[] =>
  reading.kind === 'value'
    ? [{ label, amount: reading.value.times(sign), kind: 'figure', inputs: reading.inputs }]
    : [];

/**
 * A sum of the lines above it, where it is known.
 *
 * @example bridgeSubtotal('EBITDA', { kind: 'missing', missing: [] }) // => []
 */
export const bridgeSubtotal = (label: string, reading: Reading): readonly BridgeLine[] =>
  reading.kind === 'value' ? [{ label, amount: reading.value, kind: 'subtotal', inputs: [] }] : [];
