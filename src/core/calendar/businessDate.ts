import { plainDate, type PlainDate } from './plainDate.ts';

/**
 * The day that an instant falls on in the lender's zone: the day that a nightly run is keyed by.
 *
 * `zone` is an IANA name ('Europe/Paris'). Throws RangeError for a zone that the platform does not know.
 * Source: ECMA-402, Intl.DateTimeFormat with the proleptic Gregorian calendar.
 *
 * @example businessDate(new Date('2026-12-01T23:30:00Z'), 'Europe/Paris') // => '2026-12-02'
 */
export function businessDate(now: Date, zone: string): PlainDate {
  const parts = new Intl.DateTimeFormat('en-US', {
    timeZone: zone,
    calendar: 'gregory',
    numberingSystem: 'latn',
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
  }).formatToParts(now);
  const part = (type: Intl.DateTimeFormatPartTypes) =>
    parts.find((found) => found.type === type)?.value ?? '';
  return plainDate(`${part('year').padStart(4, '0')}-${part('month')}-${part('day')}`);
}
