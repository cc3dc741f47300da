import type { Decimal } from '../money/decimal.ts';
import { bridgeFigure } from './bridge.ts';
import { WITHOUT_EARNINGS, type Measure } from './measured.ts';
import { balanceIn } from './readLines.ts';

/** Current assets over current liabilities. Source: methods.md A3. */
export const currentRatio: Measure = {
  code: 'current-ratio',
  label: 'Current ratio',
  unit: 'times',
  shape: 'cover',
  earningsSide: null,
  withoutCharge: 'met',
  words: {
    subject: 'Current assets',
    otherSide: 'current liabilities',
    carrier: 'current assets',
    charge: 'current liabilities',
  },
  measure: (request) => {
    const numerator = balanceIn(request, 'current_assets', request.date);
    const denominator = balanceIn(request, 'current_liabilities', request.date);
    return {
      numerator,
      denominator,
      bridge: [
        ...bridgeFigure('Current assets', numerator),
        ...bridgeFigure('Current liabilities', denominator),
      ],
      ...WITHOUT_EARNINGS,
    };
  },
};

/**
 * Current liabilities as the agreement counts them: a loan that a failed test made due on demand turns current and
 * can fail this test too, unless the agreement leaves the facility out. Source: methods.md A6.
 *
 * @example currentLiabilitiesCounted({ currentLiabilities: decimal(20), loanTurnedCurrent: decimal(45), leavesFacilityOut: false }) // => 65
 */
export const currentLiabilitiesCounted = ({
  currentLiabilities,
  loanTurnedCurrent,
  leavesFacilityOut,
}: {
  /** Without the loan that turned current. */
  readonly currentLiabilities: Decimal;
  readonly loanTurnedCurrent: Decimal;
  readonly leavesFacilityOut: boolean;
}): Decimal => (leavesFacilityOut ? currentLiabilities : currentLiabilities.plus(loanTurnedCurrent));
