/** Days and months without a year in a heading, completed by the year that another heading or the title gives. */
import { daysInMonth, isPlainDate, type PlainDate } from '#core/calendar/plainDate.ts';
import type { ColumnWords } from './columns.ts';
import type { MonthDay, PeriodText } from './periodText.ts';

/** 'Nine months ended 30 September' over '2026' and '2025'; 'Jan', 'Feb', 'Mar' below '2026'. */
export function withWholeDays(columns: readonly ColumnWords[], title: PeriodText): ColumnWords[] {
  const monthsRise = rise(columns);
  return columns.map((column) => {
    const { period } = column;
    if (period.end !== null || period.eitherDay !== null || isPartOfYear(period) || period.fiscal)
      return column;
    const end = ownDay(period, title, monthsRise) ?? titleDay(period, title);
    if (!end) return column;
    const months = period.months ?? (period.monthDay?.day === null ? null : title.months);
    return { ...column, period: { ...period, end, months } };
  });
}

const isPartOfYear = ({ quarter, half, periodNumber }: PeriodText): boolean =>
  quarter !== null || half !== null || periodNumber !== null;

/** Months that do not rise from column to column run over a new year, and one title's year is not theirs. */
function rise(columns: readonly ColumnWords[]): boolean {
  const months = columns.flatMap(({ period }) =>
    period.year === null ? (period.monthDay?.month ?? []) : [],
  );
  return months.every((month, at) => at === 0 || month > (months[at - 1] ?? 0));
}

function ownDay(period: PeriodText, title: PeriodText, monthsRise: boolean): PlainDate | null {
  const monthDay = period.monthDay ?? (period.year === null ? null : title.monthDay);
  if (!monthDay) return null;
  if (period.year !== null) return dayIn(period.year, monthDay);
  const year = title.fiscal ? null : (title.year ?? (title.end ? Number(title.end.slice(0, 4)) : null));
  return year !== null && monthsRise ? dayIn(year, monthDay) : null;
}

/** '2026' and '2025' below 'Nine months ended 30 September 2026'; below a balance date only the year of that date. */
function titleDay({ year }: PeriodText, { end, months }: PeriodText): PlainDate | null {
  if (year === null || end === null) return null;
  const sameYear = Number(end.slice(0, 4)) === year;
  if (!sameYear && months === null) return null;
  return dayIn(year, { month: Number(end.slice(5, 7)), day: Number(end.slice(8)) });
}

function dayIn(year: number, { month, day }: MonthDay): PlainDate | null {
  const last = daysInMonth(year, month);
  const isLast = day === null || day >= 28 ? Math.min(day ?? last, last) : day;
  const wholeMonth = month === 2 && day !== null && day >= 28 ? last : isLast;
  const text = `${year}-${String(month).padStart(2, '0')}-${String(wholeMonth).padStart(2, '0')}`;
  return isPlainDate(text) ? text : null;
}
