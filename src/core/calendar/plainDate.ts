/** A day without time or zone, 'YYYY-MM-DD'. Compares as text. */
export type PlainDate = `${number}-${number}-${number}`;

const SHAPE = /^(\d{4})-(\d{2})-(\d{2})$/;

/**
 * Whether text is a day that exists, written YYYY-MM-DD.
 *
 * @example isPlainDate('2026-02-29') // => false
 */
export function isPlainDate(text: string): text is PlainDate {
  const match = SHAPE.exec(text);
  if (!match) return false;
  const [year, month, day] = [Number(match[1]), Number(match[2]), Number(match[3])];
  return month >= 1 && month <= 12 && day >= 1 && day <= daysInMonth(year, month);
}

/**
 * A day from text that must be one. Throws RangeError: text from a person goes through isPlainDate first.
 *
 * @example plainDate('2026-02-28') // => '2026-02-28'
 */
export function plainDate(text: string): PlainDate {
  if (!isPlainDate(text)) throw new RangeError(`not a day: ${text}`);
  return text;
}

/**
 * Month counts from 1.
 *
 * @example daysInMonth(2024, 2) // => 29
 */
export function daysInMonth(year: number, month: number): number {
  return new Date(Date.UTC(year, month, 0)).getUTCDate();
}

/**
 * The days from 1970-01-01, so that differences are differences of days.
 *
 * @example epochDay('1970-01-02') // => 1
 */
export function epochDay(date: PlainDate): number {
  const [year, month, day] = date.split('-').map(Number) as [number, number, number];
  return Date.UTC(year, month - 1, day) / 86_400_000;
}

/**
 * The day that lies so many days after 1970-01-01.
 *
 * @example fromEpochDay(1) // => '1970-01-02'
 */
export function fromEpochDay(day: number): PlainDate {
  return plainDate(new Date(day * 86_400_000).toISOString().slice(0, 10));
}

/**
 * The day so many days on; back where `days` is negative.
 *
 * @example addDays('2026-02-28', 1) // => '2026-03-01'
 */
export const addDays = (date: PlainDate, days: number): PlainDate => fromEpochDay(epochDay(date) + days);

/**
 * Days from the first to the second; negative where the second comes earlier.
 *
 * @example daysBetween('2026-02-28', '2026-03-02') // => 2
 */
export const daysBetween = (from: PlainDate, to: PlainDate): number => epochDay(to) - epochDay(from);

/**
 * The same day so many months on; the last of the month where that day does not exist.
 *
 * @example addMonths('2026-01-31', 1) // => '2026-02-28'
 */
export function addMonths(date: PlainDate, months: number): PlainDate {
  const [year, month, day] = date.split('-').map(Number) as [number, number, number];
  const count = year * 12 + (month - 1) + months;
  const [newYear, newMonth] = [Math.floor(count / 12), (count % 12) + 1];
  const newDay = Math.min(day, daysInMonth(newYear, newMonth));
  return plainDate(`${newYear}-${String(newMonth).padStart(2, '0')}-${String(newDay).padStart(2, '0')}`);
}

/**
 * The last day of the month so many months on: 30 June three months on is 30 September, 28 February gives 31 May.
 *
 * @example addMonthsToMonthEnd('2026-06-30', 3) // => '2026-09-30'
 */
export function addMonthsToMonthEnd(date: PlainDate, months: number): PlainDate {
  const moved = addMonths(`${date.slice(0, 7)}-01` as PlainDate, months);
  return monthEnd(moved);
}

/**
 * The last day of the month that a day lies in.
 *
 * @example monthEnd('2024-02-10') // => '2024-02-29'
 */
export function monthEnd(date: PlainDate): PlainDate {
  const [year, month] = date.split('-').map(Number) as [number, number];
  return plainDate(`${date.slice(0, 7)}-${String(daysInMonth(year, month)).padStart(2, '0')}`);
}
