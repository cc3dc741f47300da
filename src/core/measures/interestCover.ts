import { lastTwelveMonths } from '../statements/flows.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import { adjustedEbitda } from './adjustedEbitda.ts';
import { bridgeFigure, bridgeSubtotal, type BridgeLine } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import type { Measure } from './measured.ts';

/**
 * Adjusted EBITDA over net cash interest, both of twelve months. Source: methods.md A3.
 *
 * Cash interest paid is taken where the cash flow statement gives it for all twelve months, without netting:
 * interest received has no line of its own there. Where it is missing, or comes in and so contradicts its name,
 * interest expense less interest income stands in.
 */
export const interestCover: Measure = {
  code: 'interest-cover',
  label: 'Interest cover',
  unit: 'times',
  shape: 'cover',
  earningsSide: 'numerator',
  words: { subject: 'EBITDA', otherSide: 'interest', carrier: 'earnings', charge: 'charge' },
  measure: (request) => {
    const [earnings, interest] = [adjustedEbitda(request), netCashInterest(request)];
    return {
      numerator: earnings.reading,
      denominator: interest.reading,
      addBacksTaken: earnings.addBacksTaken,
      bridge: [...earnings.bridge, ...interest.bridge],
    };
  },
};

function netCashInterest({ book, date }: MeasureRequest): {
  readonly reading: Reading;
  readonly bridge: readonly BridgeLine[];
} {
  const paid = sumOfReadings([{ sign: -1, reading: lastTwelveMonths(book, 'interest_paid', date) }]);
  if (paid.kind === 'value' && paid.value.gte(0))
    return { reading: paid, bridge: bridgeFigure('Cash interest paid', paid) };
  const expense = lastTwelveMonths(book, 'interest_expense', date);
  const income = lastTwelveMonths(book, 'interest_income', date, 'optional');
  const reading = sumOfReadings([
    { sign: 1, reading: expense },
    { sign: -1, reading: income },
  ]);
  return {
    reading,
    bridge: [
      ...bridgeFigure('Interest expense', expense),
      ...bridgeFigure('Interest income', income, -1),
      ...bridgeSubtotal('Net interest', reading),
    ],
  };
}
