import { sumOfReadings } from '../statements/reading.ts';
import { bridgeSubtotal } from './bridge.ts';
import { atClosingRate, totalDebt } from './debt.ts';
import { WITHOUT_EARNINGS, type Measure } from './measured.ts';
import { netWorthOn } from './tangibleNetWorth.ts';

/** Total debt over tangible net worth, or over debt and tangible net worth: the agreement names which. Source: methods.md A3. */
export const gearing: Measure = {
  code: 'gearing',
  label: 'Gearing',
  unit: 'times',
  shape: 'burden',
  earningsSide: null,
  withoutCharge: 'met',
  words: { subject: 'Net worth', otherSide: 'debt', carrier: 'net worth', charge: 'debt' },
  measure: (request) => {
    const debt = totalDebt(atClosingRate(request));
    const worth = netWorthOn(request);
    const capital = sumOfReadings([
      { sign: 1, reading: debt.reading },
      { sign: 1, reading: worth.reading },
    ]);
    const isOfCapital = request.definition.gearing === 'debt to capital';
    return {
      numerator: debt.reading,
      denominator: isOfCapital ? capital : worth.reading,
      bridge: [
        ...debt.bridge,
        ...worth.bridge,
        ...(isOfCapital ? bridgeSubtotal('Debt and tangible net worth', capital) : []),
      ],
      ...WITHOUT_EARNINGS,
    };
  },
};
