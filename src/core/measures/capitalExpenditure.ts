import { fiscalPosition } from '../calendar/fiscalYear.ts';
import { bridgeSubtotal } from './bridge.ts';
import { capitalExpenditureIn } from './charges.ts';
import { WITHOUT_EARNINGS, type Measure } from './measured.ts';

/**
 * Capital expenditure of the financial year up to the test date, against the limit of the whole year. The months of
 * the year are what they are: nothing is annualised. Source: methods.md A3.
 */
export const capitalExpenditure: Measure = {
  code: 'capital-expenditure',
  label: 'Capital expenditure',
  unit: 'money',
  shape: 'amount',
  earningsSide: null,
  withoutCharge: null,
  words: {
    subject: 'Capital expenditure',
    otherSide: null,
    carrier: 'capital expenditure',
    charge: 'charge',
    room: { may: 'may rise', past: 'over' },
  },
  measure: (request) => {
    const months = fiscalPosition(request.date, request.book.fiscalYearEndMonth).monthsIntoYear;
    const { reading, bridge } = capitalExpenditureIn({ ...request, months });
    return {
      numerator: reading,
      denominator: null,
      bridge: [...bridge, ...bridgeSubtotal(`Capital expenditure of ${months} months`, reading)],
      ...WITHOUT_EARNINGS,
    };
  },
};
