import { bridgeFigure } from './bridge.ts';
import { annualised, annualisedRemark } from './annualised.ts';
import { loanOn } from './debt.ts';
import { WITHOUT_EARNINGS, type Measure } from './measured.ts';
import { flowIn } from './readLines.ts';

/** Net operating income of the property, of twelve months, over the loan. Source: methods.md A3. */
export const debtYield: Measure = {
  code: 'debt-yield',
  label: 'Debt yield',
  unit: 'share',
  shape: 'cover',
  earningsSide: null,
  withoutCharge: 'met',
  words: { subject: 'Net operating income', otherSide: 'loan', carrier: 'income', charge: 'loan' },
  measure: (request) => {
    const noi = flowIn(request, 'noi');
    const income = annualised(request.months, 'Net operating income, annualised', {
      reading: noi,
      bridge: bridgeFigure('Net operating income', noi),
    });
    const loan = loanOn(request);
    return {
      numerator: income.reading,
      denominator: loan.reading,
      bridge: [...income.bridge, ...loan.bridge],
      ...WITHOUT_EARNINGS,
      remarks: annualisedRemark(request.months),
    };
  },
};
