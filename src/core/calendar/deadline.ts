/** When figures are due and how late they are. Weekends only: holidays need a calendar of the place. */
import { addDays, daysBetween, epochDay, type PlainDate } from './plainDate.ts';

export type DayCount = 'calendar' | 'business';
/** 'following' moves a due date on a weekend to the next business day, only where the agreement says so. */
export type Roll = 'none' | 'following';

const isWeekend = (date: PlainDate): boolean => {
  const weekday = (epochDay(date) + 4) % 7;
  return weekday === 0 || weekday === 6;
};

/**
 * The day so many calendar or business days on.
 *
 * @example daysOn('2025-03-31', 45, 'calendar') // => '2025-05-15'
 */
export function daysOn(date: PlainDate, days: number, dayCount: DayCount): PlainDate {
  if (dayCount === 'calendar') return addDays(date, days);
  let day = date;
  for (let counted = 0; counted < days;) {
    day = addDays(day, 1);
    if (!isWeekend(day)) counted += 1;
  }
  return day;
}

/**
 * When the figures of a period are due: the period end and so many days, moved off a weekend where the agreement
 * rolls. Source: methods.md A7.
 *
 * @example dueDate({ periodEnd: '2023-12-31', days: 90, dayCount: 'calendar', roll: 'following' }) // => '2024-04-01'
 */
export function dueDate({
  periodEnd,
  days,
  dayCount,
  roll = 'none',
}: {
  readonly periodEnd: PlainDate;
  readonly days: number;
  readonly dayCount: DayCount;
  readonly roll?: Roll;
}): PlainDate {
  let due = daysOn(periodEnd, days, dayCount);
  while (roll === 'following' && isWeekend(due)) due = addDays(due, 1);
  return due;
}

export const DUE_SOON_DAYS = 7;

export interface Deadline {
  readonly state: 'not due' | 'due within 7 days' | 'late within grace' | 'overdue past grace';
  /** Calendar days after the due date; 0 up to it. */
  readonly daysLate: number;
  readonly daysToDue: number;
  readonly lastGraceDay: PlainDate;
}

/**
 * Where a delivery stands on a day: today while it is awaited, the day of receipt once it is there. The due date
 * itself is in time; grace counts as the agreement counts. Source: methods.md A7.
 *
 * @example deadlineOn({ due: '2025-05-15', graceDays: 10, dayCount: 'calendar', day: '2025-05-20' }).state // => 'late within grace'
 */
export function deadlineOn({
  due,
  graceDays,
  dayCount,
  day,
}: {
  readonly due: PlainDate;
  readonly graceDays: number;
  readonly dayCount: DayCount;
  readonly day: PlainDate;
}): Deadline {
  const daysToDue = daysBetween(day, due);
  const lastGraceDay = daysOn(due, graceDays, dayCount);
  return {
    state: stateOn(day, daysToDue, lastGraceDay),
    daysLate: Math.max(0, -daysToDue),
    daysToDue,
    lastGraceDay,
  };
}

function stateOn(day: PlainDate, daysToDue: number, lastGraceDay: PlainDate): Deadline['state'] {
  if (daysToDue > DUE_SOON_DAYS) return 'not due';
  if (daysToDue >= 0) return 'due within 7 days';
  return day <= lastGraceDay ? 'late within grace' : 'overdue past grace';
}
