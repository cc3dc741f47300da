/** Days, months and spans of days in a heading; each is taken out of the text when it is found. */
import { daysInMonth, isPlainDate, type PlainDate } from '#core/calendar/plainDate.ts';
import { MONTH_PATTERN, monthOf } from './monthNames.ts';

export const YEAR = `(\\d{4}|['’]?\\d{2})`;
const DAY = '(\\d{1,2})(?:st|nd|rd|th|er|\\.)?';
const MONTH = `(${MONTH_PATTERN})\\.?`;
const TO = '\\s*(?:-|–|—|to|bis|au|a|al|until|through|tot|till)\\s*';

/** A text that what is found is taken out of. */
export class Taking {
  rest: string;

  constructor(text: string) {
    this.rest = text;
  }

  /** Takes the first match out of the text. */
  take(pattern: string | RegExp): RegExpExecArray | null {
    const expression =
      typeof pattern === 'string' ? new RegExp(`(?<![a-z0-9])(?:${pattern})(?![a-z0-9])`) : pattern;
    const match = expression.exec(this.rest);
    if (match)
      this.rest = `${this.rest.slice(0, match.index)} ${this.rest.slice(match.index + match[0].length)}`;
    return match;
  }
}

export const fullYear = (text: string): number => {
  const digits = text.replace(/['’]/, '');
  return digits.length === 2 ? 2000 + Number(digits) : Number(digits);
};

function dayOf(year: number, month: number, day: number): PlainDate | null {
  const text = `${year}-${String(month).padStart(2, '0')}-${String(day).padStart(2, '0')}`;
  return year >= 1990 && year <= 2100 && isPlainDate(text) ? text : null;
}

const endOfMonth = (year: number, month: number): PlainDate | null =>
  dayOf(year, month, daysInMonth(year, month));

/** '1 January 2026 - 30 September 2026', '1. Januar bis 31. Dezember 2025', 'Jul-Sep 2026', 'Jan 2026 to Jun 2026'. */
export function takeSpan(taking: Taking): { start: PlainDate | null; end: PlainDate; months: number } | null {
  const days = taking.take(
    `${DAY}\\s*${MONTH}(?:\\s*,?\\s*${YEAR})?${TO}${DAY}\\s*${MONTH}\\s*,?\\s*${YEAR}`,
  );
  if (days) {
    const [, fromDay, fromMonth, fromYear, toDay, toMonth, toYear] = days;
    return span(fromYear ?? toYear, monthOf(fromMonth ?? ''), fromDay, toYear, monthOf(toMonth ?? ''), toDay);
  }
  const figures = taking.take(`(\\d{1,2})\\.(\\d{1,2})\\.(\\d{4})?${TO}(\\d{1,2})\\.(\\d{1,2})\\.(\\d{4})`);
  if (figures) {
    const [, fromDay, fromMonth, fromYear, toDay, toMonth, toYear] = figures;
    return span(fromYear ?? toYear, Number(fromMonth), fromDay, toYear, Number(toMonth), toDay);
  }
  const months = taking.take(`${MONTH}(?:\\s*${YEAR})?${TO}${MONTH}\\s*-?\\s*${YEAR}`);
  if (!months) return null;
  const [, fromMonth, fromYear, toMonth, toYear] = months;
  return span(fromYear ?? toYear, monthOf(fromMonth ?? ''), '1', toYear, monthOf(toMonth ?? ''), null);
}

function span(
  fromYear: string | undefined,
  fromMonth: number | null,
  fromDay: string | undefined,
  toYear: string | undefined,
  toMonth: number | null,
  toDay: string | undefined | null,
): { start: PlainDate | null; end: PlainDate; months: number } | null {
  if (!fromYear || !toYear || !fromMonth || !toMonth) return null;
  const wraps = fromYear === toYear && fromMonth > toMonth;
  const firstYear = fullYear(fromYear) - (wraps ? 1 : 0);
  const start = dayOf(firstYear, fromMonth, Number(fromDay));
  const end = toDay ? dayOf(fullYear(toYear), toMonth, Number(toDay)) : endOfMonth(fullYear(toYear), toMonth);
  if (!end || !start) return null;
  const months = (fullYear(toYear) - firstYear) * 12 + toMonth - fromMonth + (Number(fromDay) <= 6 ? 1 : 0);
  return months >= 1 && months <= 24 ? { start, end, months } : null;
}

type DayFound = { end: PlainDate | null; either: { dmy: PlainDate; mdy: PlainDate } | null };

export function takeDay(taking: Taking): DayFound | null {
  const iso = taking.take('(\\d{4})-(\\d{2})-(\\d{2})');
  if (iso) return found(dayOf(Number(iso[1]), Number(iso[2]), Number(iso[3])));
  const named = taking.take(`${DAY}[\\s-]*(?:de |of )?${MONTH}[\\s,-]*(?:de )?${YEAR}`);
  if (named) return found(dayOf(fullYear(named[3] ?? ''), monthOf(named[2] ?? '') ?? 0, Number(named[1])));
  const american = taking.take(`${MONTH}\\s+(\\d{1,2})(?:st|nd|rd|th)?,?\\s+(\\d{4})`);
  if (american)
    return found(dayOf(Number(american[3]), monthOf(american[1] ?? '') ?? 0, Number(american[2])));
  const dotted = taking.take('(\\d{1,2})\\.\\s?(\\d{1,2})\\.\\s?(\\d{4}|\\d{2})');
  if (dotted) return found(dayOf(fullYear(dotted[3] ?? ''), Number(dotted[2]), Number(dotted[1])));
  const figures = taking.take('(\\d{1,2})[/-](\\d{1,2})[/-](\\d{4}|\\d{2})');
  return figures ? eitherWay(Number(figures[1]), Number(figures[2]), fullYear(figures[3] ?? '')) : null;
}

const found = (end: PlainDate | null): DayFound | null => (end ? { end, either: null } : null);

/** A date whose day and month could be exchanged; proven where only one reading is a date, or only one a month end. */
function eitherWay(first: number, second: number, year: number): DayFound | null {
  const [dmy, mdy] = [dayOf(year, second, first), dayOf(year, first, second)];
  if (!dmy || !mdy) return found(dmy ?? mdy);
  if (first === second) return found(dmy);
  return { end: null, either: { dmy, mdy } };
}

/**
 * '30 September', 'September 30,': a day without a year. 'Sep 26' is a month of 2026, unless the number is the last
 * day of that month; a month's name that stands alone is that month of a year said elsewhere.
 */
export function takeMonthDay(taking: Taking): { month: number; day: number | null } | null {
  const alone = new RegExp(`^\\s*${MONTH}\\s*$`).exec(taking.rest);
  if (alone) {
    taking.rest = '';
    return { month: monthOf(alone[1] ?? '') ?? 0, day: null };
  }
  const dayFirst = taking.take(`(?<!\\d[./-]?)${DAY}\\s*(?:de |of )?${MONTH}(?![\\s,./'’-]*\\d)`);
  if (dayFirst) return { month: monthOf(dayFirst[2] ?? '') ?? 0, day: Number(dayFirst[1]) };
  const named = new RegExp(`(?<![a-z0-9])${MONTH}\\s+(\\d{1,2})(,?)(?![\\d])`).exec(taking.rest);
  const month = named ? monthOf(named[1] ?? '') : null;
  if (!named || !month) return null;
  const day = Number(named[2]);
  const isLast = day === daysInMonth(2025, month) || day === daysInMonth(2024, month);
  if (day > 31 || (!isLast && named[3] !== ',')) return null;
  taking.rest = taking.rest.replace(named[0], ' ');
  return { month, day };
}

export function takeMonth(taking: Taking): PlainDate | null {
  const named = taking.take(`${MONTH}[\\s,./-]*(?:de )?${YEAR}`) ?? null;
  if (named) return endOfMonth(fullYear(named[2] ?? ''), monthOf(named[1] ?? '') ?? 0);
  const yearFirst = taking.take(`(\\d{4})[\\s-]+${MONTH}`);
  if (yearFirst) return endOfMonth(Number(yearFirst[1]), monthOf(yearFirst[2] ?? '') ?? 0);
  const figures = taking.take('(0?[1-9]|1[0-2])[./-](20\\d{2})');
  if (figures) return endOfMonth(Number(figures[2]), Number(figures[1]));
  const isoMonth = taking.take('(20\\d{2})[-/]?m?(0[1-9]|1[0-2])');
  return isoMonth ? endOfMonth(Number(isoMonth[1]), Number(isoMonth[2])) : null;
}
