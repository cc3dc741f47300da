import { annualEarnings } from './adjustedEbitda.ts';
import { annualisedRemark } from './annualised.ts';
import type { Measure } from './measured.ts';

/** Adjusted EBITDA of twelve months as an amount against its floor. Source: methods.md A4. */
export const minimumEbitda: Measure = {
  code: 'minimum-ebitda',
  label: 'EBITDA',
  unit: 'money',
  shape: 'amount',
  earningsSide: 'numerator',
  withoutCharge: null,
  words: { subject: 'EBITDA', otherSide: null, carrier: 'earnings', charge: 'charge' },
  measure: (request) => {
    const { reading, addBacksTaken, bridge } = annualEarnings(request);
    return {
      numerator: reading,
      denominator: null,
      earnings: reading,
      addBacksTaken,
      bridge,
      remarks: annualisedRemark(request.months),
    };
  },
};
