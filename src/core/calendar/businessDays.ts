import { addDays, epochDay, type PlainDate } from './plainDate.ts';

/** Monday to Friday. 1970-01-01 was a Thursday, so day 0 of the epoch is weekday 4 where Sunday is 0. */
export function isBusinessDay(date: PlainDate): boolean {
  const weekday = (((epochDay(date) + 4) % 7) + 7) % 7;
  return weekday !== 0 && weekday !== 6;
}

/**
 * The day that is so many business days after `date`, counting Monday to Friday; public holidays are not known
 * here. `count` is 0 or more; 0 gives the day itself, a weekend included.
 *
 * Source: common practice of loan agreements ("business day"), weekends only.
 *
 * @example addBusinessDays('2026-12-04', 1) // => '2026-12-07'
 */
export function addBusinessDays(date: PlainDate, count: number): PlainDate {
  let day = date;
  for (let left = count; left > 0;) {
    day = addDays(day, 1);
    if (isBusinessDay(day)) left -= 1;
  }
  return day;
}
