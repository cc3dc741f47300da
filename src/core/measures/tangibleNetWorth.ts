import { sumOfReadings } from '../statements/reading.ts';
import type { Lined } from './annualised.ts';
import { bridgeFigure, bridgeSubtotal } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import { WITHOUT_EARNINGS, type Measure } from './measured.ts';
import { balanceIn } from './readLines.ts';

/** Tangible net worth as an amount against its minimum. Source: methods.md A3. */
export const tangibleNetWorth: Measure = {
  code: 'tangible-net-worth',
  label: 'Tangible net worth',
  unit: 'money',
  shape: 'amount',
  earningsSide: null,
  withoutCharge: null,
  words: { subject: 'Tangible net worth', otherSide: null, carrier: 'net worth', charge: 'charge' },
  measure: (request) => {
    const { reading, bridge } = netWorthOn(request);
    return { numerator: reading, denominator: null, bridge, ...WITHOUT_EARNINGS };
  },
};

/**
 * Equity less goodwill and other intangibles, less a deferred tax asset where the agreement takes it out, with the
 * loans of shareholders where it counts them.
 *
 * @example netWorthOn(request).reading.kind // => 'missing'
 */
export function netWorthOn(request: MeasureRequest): Lined {
  const { date, definition } = request;
  const optional = (line: 'goodwill' | 'intangibles' | 'deferred_tax_asset' | 'shareholder_loans') =>
    balanceIn(request, line, date, 'optional');
  const items = [
    { label: 'Equity', sign: 1 as const, reading: balanceIn(request, 'equity', date) },
    { label: 'Goodwill', sign: -1 as const, reading: optional('goodwill') },
    { label: 'Intangible assets', sign: -1 as const, reading: optional('intangibles') },
    ...(definition.deferredTaxInNetWorth
      ? []
      : [{ label: 'Deferred tax asset', sign: -1 as const, reading: optional('deferred_tax_asset') }]),
    ...(definition.shareholderLoansInNetWorth
      ? [
          {
            label: 'Shareholder loans, subordinated',
            sign: 1 as const,
            reading: optional('shareholder_loans'),
          },
        ]
      : []),
  ];
  const reading = sumOfReadings(items);
  return {
    reading,
    bridge: [
      ...items.flatMap((item) => bridgeFigure(item.label, item.reading, item.sign)),
      ...bridgeSubtotal('Tangible net worth', reading),
    ],
  };
}
