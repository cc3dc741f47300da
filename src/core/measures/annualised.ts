/** Flows of the first tests after closing, set to a year as the agreement provides. Source: methods.md A3. */
import { monthCount, type PlainDate } from '../calendar/plainDate.ts';
import { reportingMonthEnd } from '../calendar/fiscalYear.ts';
import { annualisedByMonths } from '../statements/periodLength.ts';
import type { Reading } from '../statements/reading.ts';
import { bridgeSubtotal, type BridgeLine } from './bridge.ts';
import type { MeasureDefinition } from './definition.ts';

/**
 * The months that the flows of a test are taken over: the first tests take the months since one rhythm before the
 * first, annualised, as many tests as the agreement says; every other test takes twelve.
 *
 * @example monthsOfFlow({ annualisedFirstTests: 3 }, { firstTestOn: '2026-03-31', everyMonths: 3 }, '2026-06-30') // => 6
 */
export function monthsOfFlow(
  { annualisedFirstTests }: Pick<MeasureDefinition, 'annualisedFirstTests'>,
  { firstTestOn, everyMonths }: { readonly firstTestOn: PlainDate; readonly everyMonths: number },
  date: PlainDate,
): number {
  if (annualisedFirstTests === 0 || date < firstTestOn) return 12;
  const since = monthCount(reportingMonthEnd(date)) - monthCount(reportingMonthEnd(firstTestOn));
  const isAmongFirst = since < annualisedFirstTests * everyMonths;
  return isAmongFirst ? Math.min(12, since + everyMonths) : 12;
}

/** A reading with its way. */
export interface Lined {
  readonly reading: Reading;
  readonly bridge: readonly BridgeLine[];
}

/**
 * A flow of some months set to a year, with a line that says by how much; twelve months stand as they are.
 *
 * @example annualised(9, 'EBITDA, annualised', { reading: { kind: 'value', value: decimal('7.2'), inputs: [] }, bridge: [] }).reading.value // => 9.6
 */
export function annualised(months: number, label: string, { reading, bridge }: Lined): Lined {
  if (months === 12 || reading.kind !== 'value') return { reading, bridge };
  const year: Reading = { ...reading, value: annualisedByMonths(reading.value, months) };
  return {
    reading: year,
    bridge: [
      ...bridge,
      {
        label: `Set to a year: ${months} months x 12 / ${months}`,
        amount: year.value.minus(reading.value),
        kind: 'figure',
        inputs: [],
      },
      ...bridgeSubtotal(label, year),
    ],
  };
}

/**
 * What is said beside a result whose flows were set to a year.
 *
 * @example annualisedRemark(9) // => ['annualised from 9 months']
 */
export const annualisedRemark = (months: number): readonly string[] =>
  months === 12 ? [] : [`annualised from ${months} months`];
