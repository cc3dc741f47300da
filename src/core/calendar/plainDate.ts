/** A day without time or zone, 'YYYY-MM-DD'. Compares as text. */
export type PlainDate = `${number}-${number}-${number}`;

const DIGIT_NOUGHT = 48;
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
  if (month === 2) return isLeapYear(year) ? 29 : 28;
  return month === 4 || month === 6 || month === 9 || month === 11 ? 30 : 31;
}

const isLeapYear = (year: number): boolean => year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);

/**
 * The days from 1970-01-01, so that differences are differences of days.
 *
 * @example epochDay('1970-01-02') // => 1
 */
export function epochDay(date: PlainDate): number {
  return Date.UTC(Number(date.slice(0, 4)), Number(date.slice(5, 7)) - 1, Number(date.slice(8))) / 86_400_000;
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
  const moved = monthCount(date) + months;
  return dayOfMonth(moved, Math.min(Number(date.slice(8)), daysInMonthCounted(moved)));
}

/**
 * The last day of the month so many months on: 30 June three months on is 30 September, 28 February gives 31 May.
 *
 * @example addMonthsToMonthEnd('2026-06-30', 3) // => '2026-09-30'
 */
export function addMonthsToMonthEnd(date: PlainDate, months: number): PlainDate {
  const moved = monthCount(date) + months;
  return dayOfMonth(moved, daysInMonthCounted(moved));
}

/**
 * The last day of the month that a day lies in.
 *
 * @example monthEnd('2024-02-10') // => '2024-02-29'
 */
export const monthEnd = (date: PlainDate): PlainDate => addMonthsToMonthEnd(date, 0);

/**
 * The months from the beginning of the calendar to the month that a day lies in, so that differences are differences
 * of months.
 *
 * @example monthCount('2026-03-31') - monthCount('2025-12-31') // => 3
 */
export const monthCount = (date: PlainDate): number => {
  // Digit by digit, without cutting the text up: asked for every figure that is read.
  const year = digit(date, 0) * 1000 + digit(date, 1) * 100 + digit(date, 2) * 10 + digit(date, 3);
  return year * 12 + digit(date, 5) * 10 + digit(date, 6) - 1;
};

const digit = (date: PlainDate, place: number): number => date.charCodeAt(place) - DIGIT_NOUGHT;

const daysInMonthCounted = (count: number): number => daysInMonth(Math.floor(count / 12), (count % 12) + 1);

/** Right by construction: asked for every figure that is read, so nothing is checked twice. */
const dayOfMonth = (count: number, day: number): PlainDate =>
  `${yearText(Math.floor(count / 12))}-${twoDigits((count % 12) + 1)}-${twoDigits(day)}` as PlainDate;

const yearText = (year: number): string => (year > 999 ? String(year) : String(year).padStart(4, '0'));
const twoDigits = (count: number): string => (count < 10 ? `0${count}` : String(count));
