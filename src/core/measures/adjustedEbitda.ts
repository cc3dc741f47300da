import { Decimal, ZERO } from '../money/decimal.ts';
import type { Reading } from '../statements/reading.ts';
import { addBacksWithinTwelveMonths, allowAddBacks } from './addBacks.ts';
import type { BridgeLine } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import { ebitdaOfTwelveMonths } from './ebitda.ts';

export interface Earnings {
  /** Adjusted EBITDA of twelve months, as the covenant defines it. */
  readonly reading: Reading;
  /** Add-backs taken, capped and uncapped together; nought where EBITDA is not known. */
  readonly addBacksTaken: Decimal;
  readonly bridge: readonly BridgeLine[];
}

/**
 * Adjusted EBITDA of the twelve months up to the day, with the bridge from net income. The cap is tested on the
 * twelve months, not quarter by quarter. Source: methods.md A3.
 *
 * @example adjustedEbitda({ ...request, addBacks: [buildAddBack('2026-09-30', 2e6)] }).reading.value // => 15000000
 */
export function adjustedEbitda(request: MeasureRequest): Earnings {
  const { book, date, definition } = request;
  const { ebitda, bridge } = ebitdaOfTwelveMonths(book, date);
  if (ebitda.kind !== 'value') return { reading: ebitda, addBacksTaken: ZERO, bridge };
  const addBacks = addBacksWithinTwelveMonths(request.addBacks, date);
  if (addBacks.length === 0) return { reading: ebitda, addBacksTaken: ZERO, bridge };
  const sumOf = (capped: boolean) =>
    Decimal.sum(0, ...addBacks.filter((one) => one.capped === capped).map(({ amount }) => amount));
  const uncapped = sumOf(false);
  const { allowed, disallowed, adjusted } = allowAddBacks({
    ebitda: ebitda.value,
    uncapped,
    capped: sumOf(true),
    terms: { cap: definition.addBackCap, basis: definition.addBackCapBasis },
  });
  return {
    reading: { kind: 'value', value: adjusted, inputs: ebitda.inputs },
    addBacksTaken: uncapped.plus(allowed),
    bridge: [
      ...bridge,
      ...addBacks.map(({ label, amount }): BridgeLine => ({ label, amount, kind: 'add-back', inputs: [] })),
      ...overCap(disallowed),
      { label: 'Adjusted EBITDA', amount: adjusted, kind: 'subtotal', inputs: [] },
    ],
  };
}

const overCap = (disallowed: Decimal): readonly BridgeLine[] =>
  disallowed.isZero()
    ? []
    : [{ label: 'Add-backs over the cap', amount: disallowed.negated(), kind: 'disallowed', inputs: [] }];
