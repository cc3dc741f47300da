import { cashCover, type CashItem } from './cashCover.ts';
import { capitalExpenditureIn } from './charges.ts';
import { debtServiceItems } from './debtServiceCover.ts';
import type { MeasureRequest } from './definition.ts';
import { leaseRentIn } from './leaseRent.ts';
import type { Measure } from './measured.ts';
import { flowIn } from './readLines.ts';
import { turned } from './turned.ts';

/**
 * EBITDA before rent, less capital expenditure and cash tax, over cash interest, scheduled principal and rent, all
 * of twelve months; dividends are a charge where the agreement says so. Source: methods.md A3.
 */
export const fixedChargeCover: Measure = {
  code: 'fixed-charge-cover',
  label: 'Fixed-charge cover',
  unit: 'times',
  shape: 'cover',
  earningsSide: 'numerator',
  withoutCharge: 'the agreement decides',
  words: { subject: 'EBITDA', otherSide: 'fixed charges', carrier: 'earnings', charge: 'charge' },
  measure: (request) => {
    const rent = rentItems(request);
    return cashCover(request, {
      cash: {
        label: 'Cash for fixed charges',
        items: [
          ...rent,
          {
            label: 'Capital expenditure, none of it counted as financed',
            sign: -1,
            reading: capitalExpenditureIn(request).reading,
          },
          { label: 'Tax paid', sign: -1, reading: turned(flowIn(request, 'tax_paid')) },
        ],
      },
      charges: {
        label: 'Fixed charges',
        items: [...debtServiceItems(request), ...rent, ...dividends(request)],
      },
    });
  },
};

/** The rent that EBITDA bears: in the income statement, and by frozen rules that of leases too. */
function rentItems(request: MeasureRequest): readonly CashItem[] {
  const ofLeases = leaseRentIn(request);
  return [
    { label: 'Rent', sign: 1, reading: flowIn(request, 'rent_expense', 'optional') },
    ...(ofLeases ? [{ label: 'Rent of leases', sign: 1 as const, reading: ofLeases }] : []),
  ];
}

const dividends = (request: MeasureRequest): readonly CashItem[] =>
  request.definition.dividendsInFixedCharges
    ? [{ label: 'Dividends paid', sign: 1, reading: turned(flowIn(request, 'dividends_paid')) }]
    : [];
