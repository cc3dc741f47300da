import { Decimal, ZERO } from '../money/decimal.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import { bridgeFigure, bridgeSubtotal } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import { WITHOUT_EARNINGS, type Measure } from './measured.ts';
import { balanceIn } from './readLines.ts';

/** Unrestricted cash on the day, with the undrawn commitments where the definition counts them. Source: methods.md A3. */
export const minimumLiquidity: Measure = {
  code: 'minimum-liquidity',
  label: 'Liquidity',
  unit: 'money',
  shape: 'amount',
  earningsSide: null,
  withoutCharge: null,
  words: { subject: 'Liquidity', otherSide: null, carrier: 'liquidity', charge: 'charge' },
  measure: (request) => {
    const cash = balanceIn(request, 'cash', request.date);
    const undrawn = request.definition.undrawnCountsAsLiquidity ? undrawnOn(request) : null;
    const numerator = sumOfReadings(
      [cash, ...(undrawn ? [undrawn] : [])].map((reading) => ({ sign: 1 as const, reading })),
    );
    return {
      numerator,
      denominator: null,
      bridge: [
        ...bridgeFigure('Cash', cash),
        ...(undrawn ? bridgeFigure('Undrawn commitments', undrawn) : []),
        ...bridgeSubtotal('Liquidity', numerator),
      ],
      ...WITHOUT_EARNINGS,
    };
  },
};

/** A commitment that is overdrawn has nothing left to draw; what is over it is debt, not less cash. */
function undrawnOn(request: MeasureRequest): Reading {
  const undrawn = sumOfReadings([
    { sign: 1, reading: balanceIn(request, 'revolver_commitment', request.date) },
    { sign: -1, reading: balanceIn(request, 'revolver_drawn', request.date) },
    { sign: -1, reading: balanceIn(request, 'letters_of_credit', request.date, 'optional') },
  ]);
  return undrawn.kind === 'value' ? { ...undrawn, value: Decimal.max(ZERO, undrawn.value) } : undrawn;
}
