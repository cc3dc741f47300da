import { monthsBefore } from '../calendar/fiscalYear.ts';
import { cashCover, type CashItem } from './cashCover.ts';
import { capitalExpenditureIn, netCashInterest } from './charges.ts';
import type { MeasureRequest } from './definition.ts';
import type { Measure } from './measured.ts';
import { balanceIn, flowIn } from './readLines.ts';
import { turned } from './turned.ts';
import { workingCapitalIncrease } from './workingCapital.ts';

/**
 * EBITDA less cash tax, capital expenditure and the increase in working capital, over cash interest and scheduled
 * principal, all of twelve months. Final repayments and the revolver are left out, opening cash counts where the
 * agreement says so. Source: methods.md A3.
 */
export const debtServiceCover: Measure = {
  code: 'debt-service-cover',
  label: 'Debt service cover',
  unit: 'times',
  shape: 'cover',
  earningsSide: 'numerator',
  withoutCharge: 'the agreement decides',
  words: { subject: 'EBITDA', otherSide: 'debt service', carrier: 'earnings', charge: 'charge' },
  measure: (request) =>
    cashCover(request, {
      cash: {
        label: 'Cash for debt service',
        items: [
          { label: 'Tax paid', sign: -1, reading: turned(flowIn(request, 'tax_paid')) },
          {
            label: 'Capital expenditure, none of it counted as financed',
            sign: -1,
            reading: capitalExpenditureIn(request).reading,
          },
          { label: 'Increase in working capital', sign: -1, reading: workingCapitalIncrease(request) },
          ...openingCash(request),
        ],
      },
      charges: { label: 'Debt service', items: debtServiceItems(request) },
    }),
};

/**
 * Cash interest and scheduled principal, as both cash covers take them.
 *
 * @example debtServiceItems(request).map(({ label }) => label) // => ['Net cash interest', 'Scheduled principal']
 */
export const debtServiceItems = (request: MeasureRequest): readonly CashItem[] => [
  { label: 'Net cash interest', sign: 1, reading: netCashInterest(request).reading },
  { label: 'Scheduled principal', sign: 1, reading: flowIn(request, 'scheduled_principal') },
];

/** No least cash is recorded, so that what lay there at the beginning counts whole. */
const openingCash = (request: MeasureRequest): readonly CashItem[] =>
  request.definition.openingCashInDebtService
    ? [
        {
          label: 'Opening cash',
          sign: 1,
          reading: balanceIn(request, 'cash', monthsBefore(request.date, request.months)),
          isBalance: true,
        },
      ]
    : [];
