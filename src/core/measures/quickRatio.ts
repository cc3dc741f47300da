import { sumOfReadings } from '../statements/reading.ts';
import { bridgeFigure, bridgeSubtotal } from './bridge.ts';
import { WITHOUT_EARNINGS, type Measure } from './measured.ts';
import { balanceIn } from './readLines.ts';

/** Cash and trade receivables over current liabilities. Source: methods.md A3. */
export const quickRatio: Measure = {
  code: 'quick-ratio',
  label: 'Quick ratio',
  unit: 'times',
  shape: 'cover',
  earningsSide: null,
  withoutCharge: 'met',
  words: {
    subject: 'Quick assets',
    otherSide: 'current liabilities',
    carrier: 'quick assets',
    charge: 'current liabilities',
  },
  measure: (request) => {
    const cash = balanceIn(request, 'cash', request.date);
    const receivables = balanceIn(request, 'receivables', request.date);
    const numerator = sumOfReadings([
      { sign: 1, reading: cash },
      { sign: 1, reading: receivables },
    ]);
    const denominator = balanceIn(request, 'current_liabilities', request.date);
    return {
      numerator,
      denominator,
      bridge: [
        ...bridgeFigure('Cash', cash),
        ...bridgeFigure('Trade receivables', receivables),
        ...bridgeSubtotal('Quick assets', numerator),
        ...bridgeFigure('Current liabilities', denominator),
      ],
      ...WITHOUT_EARNINGS,
    };
  },
};
