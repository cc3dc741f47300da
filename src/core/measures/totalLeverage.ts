import { adjustedEbitda } from './adjustedEbitda.ts';
import { totalDebt } from './debt.ts';
import type { Measure } from './measured.ts';

/** Total debt over adjusted EBITDA of twelve months. Source: methods.md A3. */
export const totalLeverage: Measure = {
  code: 'total-leverage',
  label: 'Total leverage',
  unit: 'times',
  shape: 'burden',
  earningsSide: 'denominator',
  words: { subject: 'EBITDA', otherSide: 'debt', carrier: 'earnings', charge: 'charge' },
  measure: (request) => {
    const [debt, earnings] = [totalDebt(request), adjustedEbitda(request)];
    return {
      numerator: debt.reading,
      denominator: earnings.reading,
      addBacksTaken: earnings.addBacksTaken,
      bridge: [...earnings.bridge, ...debt.bridge],
    };
  },
};
