import { annualEarnings } from './adjustedEbitda.ts';
import { annualised, annualisedRemark } from './annualised.ts';
import { netCashInterest } from './charges.ts';
import type { Measure } from './measured.ts';

/** Adjusted EBITDA over net cash interest, both of twelve months. Source: methods.md A3. */
export const interestCover: Measure = {
  code: 'interest-cover',
  label: 'Interest cover',
  unit: 'times',
  shape: 'cover',
  earningsSide: 'numerator',
  withoutCharge: 'the agreement decides',
  words: { subject: 'EBITDA', otherSide: 'interest', carrier: 'earnings', charge: 'charge' },
  measure: (request) => {
    const earnings = annualEarnings(request);
    const interest = annualised(request.months, 'Annualised interest', netCashInterest(request));
    return {
      numerator: earnings.reading,
      denominator: interest.reading,
      earnings: earnings.reading,
      addBacksTaken: earnings.addBacksTaken,
      bridge: [...earnings.bridge, ...interest.bridge],
      remarks: annualisedRemark(request.months),
    };
  },
};
