import { ZERO, type Decimal } from '../money/decimal.ts';
import { balanceAt } from '../statements/flows.ts';
import { bridgeFigure } from './bridge.ts';
import type { Measure } from './measured.ts';

/** Current assets over current liabilities. Source: methods.md A3. */
export const currentRatio: Measure = {
  code: 'current-ratio',
  label: 'Current ratio',
  unit: 'times',
  shape: 'cover',
  earningsSide: null,
  words: {
    subject: 'Current assets',
    otherSide: 'current liabilities',
    carrier: 'current assets',
    charge: 'current liabilities',
  },
  measure: ({ book, date }) => {
    const numerator = balanceAt(book, 'current_assets', date);
    const denominator = balanceAt(book, 'current_liabilities', date);
    return {
      numerator,
      denominator,
      addBacksTaken: ZERO,
      bridge: [
        ...bridgeFigure('Current assets', numerator),
        ...bridgeFigure('Current liabilities', denominator),
      ],
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

/**
 * Cash and trade receivables, over current liabilities the quick ratio. Source: methods.md A3.
 *
 * @example quickAssets(decimal(6), decimal(14)) // => 20
 */
export const quickAssets = (cash: Decimal, receivables: Decimal): Decimal => cash.plus(receivables);
