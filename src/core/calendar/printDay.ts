import { plainDate, type PlainDate } from './plainDate.ts';

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'] as const;

/**
 * A day as it is printed everywhere.
 *
 * @example formatDay('2026-09-30') // => '30 Sep 2026'
 */
export function formatDay(date: PlainDate): string {
  const [year, month, day] = date.split('-').map(Number) as [number, number, number];
  return `${day} ${MONTHS[month - 1] ?? ''} ${year}`;
}

/**
 * The same for a day that came over the wire as text.
 *
 * @example dayText('2026-09-30') // => '30 Sep 2026'
 */
export const dayText = (date: string): string => formatDay(plainDate(date));
