/**
 * Settles the period of each column: its last day, and for flows its length. Where the words leave it open, the
 * figures may prove it; where they do not, it is a question.
 */
import { lastYearEndBefore } from '#core/calendar/fiscalYear.ts';
import {
  addDays,
  addMonthsToMonthEnd,
  daysInMonth,
  epochDay,
  type PlainDate,
} from '#core/calendar/plainDate.ts';
import type { ColumnWords } from './columns.ts';
import type { PeriodText } from './periodText.ts';

export interface YearEnd {
  /** 1 to 12. */
  readonly month: number;
  /** A financial year is named for the calendar year in which it begins. */
  readonly namedForStart: boolean;
  /** 'Q3 2026' without a word of a financial year is of the calendar year all the same. */
  readonly calendarQuarters: boolean;
}

export interface ColumnPeriod {
  readonly end: PlainDate | null;
  /** Length of flows; null where it is not known. */
  readonly months: number | null;
  /** What stands in the way. */
  readonly needs: 'year-end' | 'date-order' | 'period' | null;
}

export interface PeriodEvidence {
  readonly yearEnd: YearEnd | null;
  /** The year end is asked for: nothing that could hang on it is settled. */
  readonly yearEndOpen: boolean;
  readonly dayFirst: boolean | null;
}

const OPEN: ColumnPeriod = { end: null, months: null, needs: 'period' };

export function columnPeriod(words: ColumnWords, title: PeriodText, evidence: PeriodEvidence): ColumnPeriod {
  const own = words.period;
  const said = ownEnd(own, title, evidence);
  if (said.needs || !said.end) return said;
  return { ...said, months: said.months ?? lengthOf(own, said.end, evidence) };
}

function ownEnd(own: PeriodText, title: PeriodText, evidence: PeriodEvidence): ColumnPeriod {
  if (own.end) return { end: own.end, months: own.months, needs: null };
  if (own.eitherDay) return fromEitherDay(own, evidence);
  const year = own.year ?? title.year ?? yearOf(title.end);
  if (own.quarter !== null || own.half !== null || own.periodNumber !== null) {
    return year === null ? OPEN : partOfYear(own, year, evidence);
  }
  if (own.year !== null) return wholeYear(own, own.year, evidence);
  if (title.end) return { end: title.end, months: own.months ?? title.months, needs: null };
  if (title.quarter !== null || title.half !== null)
    return year === null ? OPEN : partOfYear(title, year, evidence);
  return OPEN;
}

const yearOf = (date: PlainDate | null): number | null => (date ? Number(date.slice(0, 4)) : null);

function fromEitherDay(own: PeriodText, evidence: PeriodEvidence): ColumnPeriod {
  const either = own.eitherDay;
  if (!either) return OPEN;
  if (evidence.dayFirst === null) return { end: null, months: own.months, needs: 'date-order' };
  return { end: evidence.dayFirst ? either.dmy : either.mdy, months: own.months, needs: null };
}

/** A quarter, half or numbered month. Without a word of a financial year it is of the calendar year. */
function partOfYear(own: PeriodText, year: number, { yearEnd, yearEndOpen }: PeriodEvidence): ColumnPeriod {
  const months = own.quarter !== null ? 3 : own.half !== null ? 6 : null;
  const count = own.quarter !== null ? own.quarter * 3 : own.half !== null ? own.half * 6 : own.periodNumber;
  if (count === null || count > 13) return OPEN;
  const isFiscal = own.fiscal || own.periodNumber !== null;
  if (yearEndOpen || (isFiscal && !yearEnd))
    return { end: null, months: own.months ?? months, needs: 'year-end' };
  const length = own.yearToDate ? count : (own.months ?? months);
  if (!yearEnd || yearEnd.month === 12 || (!isFiscal && yearEnd.calendarQuarters)) {
    return { end: endOf(year, Math.min(count, 12)), months: length, needs: null };
  }
  const end = addMonthsToMonthEnd(yearEndOf(year, yearEnd), Math.min(count, 12) - 12);
  return { end, months: length, needs: null };
}

/** '2025', 'FY25', and '9M 2026', which counts from the beginning of the year. */
function wholeYear(own: PeriodText, year: number, { yearEnd, yearEndOpen }: PeriodEvidence): ColumnPeriod {
  if (!yearEnd) {
    if (!yearEndOpen && own.months !== null && own.months < 12 && !own.fiscal) {
      return { end: endOf(year, own.months), months: own.months, needs: null };
    }
    return { end: null, months: own.months ?? 12, needs: 'year-end' };
  }
  const end = yearEndOf(year, yearEnd);
  if (own.yearToDate && own.months === null) return { ...OPEN, needs: 'period' };
  const months = own.months ?? 12;
  return { end: addMonthsToMonthEnd(end, months - 12), months, needs: null };
}

const endOf = (year: number, month: number): PlainDate =>
  `${year}-${String(month).padStart(2, '0')}-${String(daysInMonth(year, month)).padStart(2, '0')}` as PlainDate;

const yearEndOf = (year: number, { month, namedForStart }: YearEnd): PlainDate =>
  endOf(namedForStart && month !== 12 ? year + 1 : year, month);

/** A length that the column's own words give once the end is known; null where only the title or figures can. */
function lengthOf(own: PeriodText, end: PlainDate, { yearEnd }: PeriodEvidence): number | null {
  if (own.months !== null) return own.months;
  if (own.yearToDate && yearEnd) return monthsIntoYear(end, yearEnd.month);
  return null;
}

export function monthsIntoYear(end: PlainDate, yearEndMonth: number): number {
  const start = lastYearEndBefore(end, yearEndMonth);
  return Math.round((epochDay(end) - epochDay(start)) / 30.4375);
}

/** The title's length holds for the columns unless they lie closer together than it is long. */
export function titleLengthFits(months: number, ends: readonly PlainDate[]): boolean {
  const days = [...new Set(ends)].map(epochDay).sort((one, other) => one - other);
  return days.every((day, at) => at === 0 || day - (days[at - 1] ?? 0) >= months * 30.4375 - 12);
}

/** First day of a period of so many months; the day itself for a balance. */
export function periodStart(end: PlainDate, months: number): PlainDate {
  if (months === 0) return end;
  const isMonthEnd = Number(end.slice(8)) === daysInMonth(Number(end.slice(0, 4)), Number(end.slice(5, 7)));
  if (isMonthEnd) return addDays(addMonthsToMonthEnd(end, -months), 1);
  return addDays(end, 1 - Math.round((months / 12) * 52) * 7);
}
