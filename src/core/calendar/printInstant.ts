/**
 * An instant as it is printed everywhere, with its zone: times without a zone are no times.
 *
 * Source of the zone's rules: ECMA-402, Intl.DateTimeFormat.
 *
 * @example formatInstant(new Date('2026-12-01T02:00:00Z'), 'UTC') // => '1 Dec 2026, 02:00 UTC'
 */
export function formatInstant(instant: Date, zone: string): string {
  return new Intl.DateTimeFormat('en-GB', {
    timeZone: zone,
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    timeZoneName: 'short',
  }).format(instant);
}
