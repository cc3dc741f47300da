/** Figures in another currency: methods.md A3 (income at average rates, balance sheet at the closing rate). */
import { isSamePeriodEnd, reportingMonthEnd } from '../calendar/fiscalYear.ts';
import { addDays, monthCount, type PlainDate } from '../calendar/plainDate.ts';
import { formatDay } from '../calendar/printDay.ts';
import type { BridgeLine } from './bridge.ts';
import type { CurrencyRate, Translation } from './definition.ts';

/**
 * Opens the recorded rates into one currency. Of two rates for the same period the later one counts; a rate the
 * other way round is not turned, because the average of a turned rate is another one.
 *
 * @example translationInto('EUR', []).rateOf('closing', 'GBP', '2026-09-30', 0) // => null
 */
export function translationInto(currency: string, rates: readonly CurrencyRate[]): Translation {
  const used = new Set<CurrencyRate>();
  return {
    currency,
    rateOf: (kind, from, periodEnd, months) => {
      const found = rates.findLast(
        (rate) =>
          rate.to === currency &&
          rate.from === from &&
          rate.kind === kind &&
          isSamePeriodEnd(rate.periodEnd, periodEnd) &&
          (kind === 'closing' || monthsOf(rate) === months),
      );
      if (!found) return null;
      used.add(found);
      return found.rate;
    },
    used: () => [...used],
  };
}

/** Whole months that an average is of: from the month of its first day to that of its last. */
const monthsOf = ({ periodStart, periodEnd }: CurrencyRate): number =>
  monthCount(reportingMonthEnd(periodEnd)) - monthCount(dayBefore(periodStart));

const dayBefore = (day: PlainDate): PlainDate => reportingMonthEnd(addDays(day, -1));

/**
 * 'average of GBP in EUR over 3 months to 30 Sep 2026', 'closing rate of GBP in EUR on 30 Sep 2026'.
 *
 * @example rateInWords({ kind: 'closing', from: 'GBP', to: 'EUR', periodEnd: '2026-09-30', months: 0 }) // => 'closing rate of GBP in EUR on 30 Sep 2026'
 */
export const rateInWords = ({
  kind,
  from,
  to,
  periodEnd,
  months,
}: {
  readonly kind: CurrencyRate['kind'];
  readonly from: string;
  readonly to: string;
  readonly periodEnd: PlainDate;
  readonly months: number;
}): string =>
  kind === 'closing'
    ? `closing rate of ${from} in ${to} on ${formatDay(periodEnd)}`
    : `average rate of ${from} in ${to} over ${months} months to ${formatDay(periodEnd)}`;

const sentence = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1);

/**
 * The rates that were taken, each with its source, as lines under the way to the tested amount.
 *
 * @example rateLines(translationInto('EUR', [])) // => []
 */
export const rateLines = ({ used }: Translation): readonly BridgeLine[] =>
  used().map((rate) => ({
    label: sentence(rateInWords({ ...rate, months: monthsOf(rate) })),
    amount: rate.rate,
    kind: 'rate',
    inputs: [],
    note: rate.source,
  }));
