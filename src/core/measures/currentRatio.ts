import { ZERO } from '../money/decimal.ts';
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
  measure: ({ statements, date }) => {
    const numerator = balanceAt(statements, 'current_assets', date);
    const denominator = balanceAt(statements, 'current_liabilities', date);
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
