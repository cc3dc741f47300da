import { Decimal, ZERO } from '../money/decimal.ts';
import { balanceAt } from '../statements/flows.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import { bridgeFigure, bridgeSubtotal } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import type { Measure } from './measured.ts';

/**
 * Liquidity = unrestricted cash + the undrawn commitments that can be drawn; none while drawing is stopped.
 *
 * Same currency unit throughout. Source: methods.md A3.
 *
 * @example liquidity({ cash: decimal(4), undrawn: decimal(3), drawStop: false }) // => 7
 */
export const liquidity = ({
  cash,
  undrawn,
  drawStop,
}: {
  readonly cash: Decimal;
  readonly undrawn: Decimal;
  readonly drawStop: boolean;
}): Decimal => (drawStop ? cash : cash.plus(undrawn));

/** Cash on the day, with undrawn commitments where the definition counts them. */
export const minimumLiquidity: Measure = {
  code: 'minimum-liquidity',
  label: 'Liquidity',
  unit: 'money',
  shape: 'amount',
  earningsSide: null,
  words: { subject: 'Liquidity', otherSide: null, carrier: 'liquidity', charge: 'charge' },
  measure: (request) => {
    const { book, date, definition } = request;
    const cash = balanceAt(book, 'cash', date);
    const undrawn = definition.undrawnCountsAsLiquidity ? undrawnOn(request) : null;
    const numerator = sumOfReadings(
      [cash, ...(undrawn ? [undrawn] : [])].map((reading) => ({ sign: 1 as const, reading })),
    );
    return {
      numerator,
      denominator: null,
      addBacksTaken: ZERO,
      bridge: [
        ...bridgeFigure('Cash', cash),
        ...(undrawn ? bridgeFigure('Undrawn commitments', undrawn) : []),
        ...bridgeSubtotal('Liquidity', numerator),
      ],
    };
  },
};

/** A commitment that is overdrawn has nothing left to draw; what is over it is debt, not less cash. */
function undrawnOn({ book, date }: MeasureRequest): Reading {
  const undrawn = sumOfReadings([
    { sign: 1, reading: balanceAt(book, 'revolver_commitment', date) },
    { sign: -1, reading: balanceAt(book, 'revolver_drawn', date) },
    { sign: -1, reading: balanceAt(book, 'letters_of_credit', date, 'optional') },
  ]);
  return undrawn.kind === 'value' ? { ...undrawn, value: Decimal.max(ZERO, undrawn.value) } : undrawn;
}
