/** Invented rates of the pound in euro, one average and one closing rate a quarter. */
import { addDays, addMonthsToMonthEnd, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { CurrencyRate } from '../../src/core/measures/definition.ts';
import { decimal } from '../../src/core/money/decimal.ts';
import { randomNumbers } from './randomNumbers.ts';

const SOURCE = 'Invented reference rates of the demo desk';
const MIDDLE = 1.16;
const SWING = 0.03;

interface QuarterRates {
  readonly quarterEnd: PlainDate;
  readonly average: number;
  readonly closing: number;
}

/** The same rates for the same quarter ends, whatever else is asked for. */
export const ratesOf = (quarterEnd: PlainDate): QuarterRates => {
  const random = randomNumbers(`pound in euro ${quarterEnd}`);
  const rate = (): number => Number((MIDDLE * (1 + SWING * random.wobble())).toFixed(4));
  return { quarterEnd, average: rate(), closing: rate() };
};

/** What the desk records of a quarter. */
export function demoRates(quarterEnd: PlainDate): CurrencyRate[] {
  const { average, closing } = ratesOf(quarterEnd);
  const pair = { from: 'GBP', to: 'EUR', periodEnd: quarterEnd, source: SOURCE } as const;
  const firstDay = addDays(addMonthsToMonthEnd(quarterEnd, -3), 1);
  return [
    { ...pair, kind: 'average', periodStart: firstDay, rate: decimal(average) },
    { ...pair, kind: 'closing', periodStart: quarterEnd, rate: decimal(closing) },
  ];
}
