/** The days of the demo desk, all relative to the day on which it is first laid out. */
import {
  addDays,
  addMonthsToMonthEnd,
  daysBetween,
  plainDate,
  type PlainDate,
} from '../../src/core/calendar/plainDate.ts';

/** The usual deadline: by then all but the late have delivered, and before it nobody is late. */
const REPORTED_AFTER_DAYS = 45;

/** The last day of the calendar quarter that the day lies in. */
export function quarterEndOnOrAfter(day: PlainDate): PlainDate {
  const month = Number(day.slice(5, 7));
  return addMonthsToMonthEnd(day, (12 - month) % 3);
}

export function latestReportedQuarterEnd(seedDay: PlainDate): PlainDate {
  let quarterEnd = addMonthsToMonthEnd(quarterEndOnOrAfter(seedDay), -3);
  while (daysBetween(quarterEnd, seedDay) < REPORTED_AFTER_DAYS)
    quarterEnd = addMonthsToMonthEnd(quarterEnd, -3);
  return quarterEnd;
}

/** The last Monday to Friday before the day: the business date that the first night is run for. */
export function businessDayBefore(day: PlainDate): PlainDate {
  let before = addDays(day, -1);
  while ([0, 6].includes(weekday(before))) before = addDays(before, -1);
  return before;
}

/** 0 is Sunday. 1970-01-01 was a Thursday. */
const weekday = (day: PlainDate): number => (daysBetween(plainDate('1970-01-01'), day) + 4) % 7;
