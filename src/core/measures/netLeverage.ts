import { adjustedEbitda } from './adjustedEbitda.ts';
import { netDebtOn } from './debt.ts';
import type { Measure } from './measured.ts';

/** Net debt over adjusted EBITDA of twelve months. Source: methods.md A3. */
export const netLeverage: Measure = {
  code: 'net-leverage',
  label: 'Net leverage',
  unit: 'times',
  shape: 'burden',
  earningsSide: 'denominator',
  words: { subject: 'EBITDA', otherSide: 'net debt', carrier: 'earnings', charge: 'charge' },
  measure: (request) => {
    const [debt, earnings] = [netDebtOn(request), adjustedEbitda(request)];
    return {
      numerator: debt.reading,
      denominator: earnings.reading,
      addBacksTaken: earnings.addBacksTaken,
      bridge: [...earnings.bridge, ...debt.bridge],
    };
  },
};
