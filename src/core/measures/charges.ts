/** What a borrower has to pay out of its earnings: methods.md A3. Paid items are positive here. */
import { sumOfReadings } from '../statements/reading.ts';
import type { Lined } from './annualised.ts';
import { bridgeFigure, bridgeSubtotal } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import { flowIn } from './readLines.ts';
import { turned } from './turned.ts';

/**
 * Net cash interest of the request's months.
 *
 * Cash interest paid is taken where the cash flow statement gives it for all of them, without netting: interest
 * received has no line of its own there. Where it is missing, or comes in and so contradicts its name, interest
 * expense less interest income stands in.
 *
 * @example netCashInterest(request).reading.value // => 2400000
 */
export function netCashInterest(request: MeasureRequest): Lined {
  const paid = turned(flowIn(request, 'interest_paid'));
  if (paid.kind === 'not-meaningful') return { reading: paid, bridge: [] };
  if (paid.kind === 'value' && paid.value.gte(0))
    return { reading: paid, bridge: bridgeFigure('Cash interest paid', paid) };
  const expense = flowIn(request, 'interest_expense');
  const income = flowIn(request, 'interest_income', 'optional');
  const reading = sumOfReadings([
    { sign: 1, reading: expense },
    { sign: -1, reading: income },
  ]);
  return {
    reading,
    bridge: [
      ...bridgeFigure('Interest expense', expense),
      ...bridgeFigure('Interest income', income, -1),
      ...bridgeSubtotal('Net interest', reading),
    ],
  };
}

/**
 * Capital expenditure of the request's months: what was paid for plant and for costs that are capitalised. What of
 * it was financed is recorded nowhere, so that all of it counts.
 *
 * @example capitalExpenditureIn(request).reading.kind // => 'missing'
 */
export function capitalExpenditureIn(request: MeasureRequest): Lined {
  const plant = turned(flowIn(request, 'capex'));
  const costs = turned(flowIn(request, 'capitalised_costs_paid', 'optional'));
  return {
    reading: sumOfReadings([
      { sign: 1, reading: plant },
      { sign: 1, reading: costs },
    ]),
    bridge: [...bridgeFigure('Paid for plant', plant), ...bridgeFigure('Capitalised costs paid', costs)],
  };
}
