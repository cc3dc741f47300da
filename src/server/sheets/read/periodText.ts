/** What a heading says of its period, without knowing yet when the borrower's year ends. */
import { daysInMonth, isPlainDate, type PlainDate } from '#core/calendar/plainDate.ts';
import { MONTH_PATTERN, monthOf } from './monthNames.ts';
import { plainText } from './plainWords.ts';

export interface PeriodText {
  /** The last day, where the heading names a day or a month. */
  readonly end: PlainDate | null;
  /** A first day, where it names a span. */
  readonly start: PlainDate | null;
  /** Both readings of a date such as 03/04/2026. */
  readonly eitherDay: { readonly dmy: PlainDate; readonly mdy: PlainDate } | null;
  /** A length that the words state: 'three months', 'quarter ended', '52 weeks'. */
  readonly months: number | null;
  /** From the beginning of the financial year: 'YTD', 'cumulative'. */
  readonly yearToDate: boolean;
  readonly quarter: number | null;
  readonly half: number | null;
  /** 'P6': the sixth period of a financial year. */
  readonly periodNumber: number | null;
  readonly year: number | null;
  /** The year is a financial year: 'FY26', '2025/26'. */
  readonly fiscal: boolean;
  readonly weeks: number | null;
  /** What is left of the text when all of this is taken away. */
  readonly rest: string;
}

const YEAR = `(\\d{4}|['’]?\\d{2})`;
const DAY = '(\\d{1,2})(?:st|nd|rd|th|er|\\.)?';
const MONTH = `(${MONTH_PATTERN})\\.?`;
const TO = '\\s*(?:-|–|—|to|bis|au|a|al|until|through|tot|till)\\s*';
const NUMBER_WORDS: ReadonlyMap<string, number> = new Map(
  ['one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve'].map(
    (word, index) => [word, index + 1],
  ),
);
const MONTH_UNIT = 'months?|mths?|mos?|monate?|monaten|mois|meses|m|manader|maneder|maanden';

class Taking {
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

export function readPeriodText(text: string): PeriodText {
  const taking = new Taking(
    plainText(text)
      .replace(/\s+/g, ' ')
      .replace(/[‐‑–—]/g, '-')
      .trim(),
  );
  const weeks = taking.take('(\\d{2})[ -]?(?:weeks?|wochen|semaines|semanas)');
  const span = takeSpan(taking);
  const day = span ? null : takeDay(taking);
  const length = takeLength(taking);
  const month = span || day ? null : takeMonth(taking);
  const part = takePart(taking);
  const year = span || day?.end || day?.either || month ? null : takeYear(taking);
  const fiscal = part?.fiscal === true || year?.fiscal === true;
  return {
    end: span?.end ?? day?.end ?? month,
    start: span?.start ?? null,
    eitherDay: day?.either ?? null,
    months: weeks ? weeksToMonths(Number(weeks[1])) : (length.months ?? span?.months ?? null),
    yearToDate: length.yearToDate,
    quarter: part?.quarter ?? null,
    half: part?.half ?? null,
    periodNumber: part?.periodNumber ?? null,
    year: part?.year ?? year?.year ?? null,
    fiscal,
    weeks: weeks ? Number(weeks[1]) : null,
    rest: taking.rest.replace(/\s+/g, ' ').trim(),
  };
}

const weeksToMonths = (weeks: number): number | null =>
  weeks >= 52
    ? 12
    : weeks === 26 || weeks === 27
      ? 6
      : weeks === 39 || weeks === 40
        ? 9
        : weeks === 13 || weeks === 14
          ? 3
          : null;

const fullYear = (text: string): number => {
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
function takeSpan(taking: Taking): { start: PlainDate | null; end: PlainDate; months: number } | null {
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

function takeDay(taking: Taking): DayFound | null {
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

function takeMonth(taking: Taking): PlainDate | null {
  const named = taking.take(`${MONTH}[\\s,./-]*(?:de )?${YEAR}`) ?? null;
  if (named) return endOfMonth(fullYear(named[2] ?? ''), monthOf(named[1] ?? '') ?? 0);
  const yearFirst = taking.take(`(\\d{4})[\\s-]+${MONTH}`);
  if (yearFirst) return endOfMonth(Number(yearFirst[1]), monthOf(yearFirst[2] ?? '') ?? 0);
  const figures = taking.take('(0?[1-9]|1[0-2])[./-](20\\d{2})');
  if (figures) return endOfMonth(Number(figures[2]), Number(figures[1]));
  const isoMonth = taking.take('(20\\d{2})[-/]?m?(0[1-9]|1[0-2])');
  return isoMonth ? endOfMonth(Number(isoMonth[1]), Number(isoMonth[2])) : null;
}

function takeLength(taking: Taking): { months: number | null; yearToDate: boolean } {
  const yearToDate =
    taking.take('ytd|year[ -]to[ -]date|cumul\\w*|kumuliert|kum\\.?|acumulad[oa]|a date|lopende jaar') !==
    null;
  const counted = taking.take(`(\\d{1,2}|${[...NUMBER_WORDS.keys()].join('|')})[ -]?(?:${MONTH_UNIT})`);
  if (counted) {
    const count = NUMBER_WORDS.get(counted[1] ?? '') ?? Number(counted[1]);
    return { months: count >= 1 && count <= 24 ? count : null, yearToDate };
  }
  if (taking.take('ltm|ttm|last twelve months|rolling twelve months|trailing twelve months')) {
    return { months: 12, yearToDate: false };
  }
  const named = [
    [
      3,
      'quarterly|(?:quarter|quartal|trimestre|kvartal|kwartaal)(?= (?:ended|ending|to)|,|$)|trimestriel\\w*|trimestral\\w*|vierteljahr',
    ],
    [6, 'half[ -]year(?:ly)?(?: ended| ending| to)?|semestriel\\w*|semestral\\w*'],
    [
      12,
      '(?:financial |fiscal )?years? (?:ended|ending|to)|annual|full[ -]year|gesch[a]ftsjahr|exercice clos|annul\\w*|anual\\w*|ejercicio',
    ],
    [1, 'monthly|month (?:ended|ending|of)|mensul\\w*|mensual\\w*'],
  ] as const;
  for (const [months, words] of named) if (taking.take(words)) return { months, yearToDate };
  return { months: null, yearToDate };
}

interface PartOfYear {
  readonly quarter?: number;
  readonly half?: number;
  readonly periodNumber?: number;
  readonly year: number | null;
  readonly fiscal: boolean;
}

function takePart(taking: Taking): PartOfYear | null {
  const fiscalYear = `(?:[\\s./-]*(fy|gj)?[\\s./-]*${YEAR})?`;
  const of = (match: RegExpExecArray | null, name: 'quarter' | 'half' | 'periodNumber'): PartOfYear | null =>
    match && {
      [name]: Number(match[1]),
      year: match[3] ? fullYear(match[3]) : null,
      fiscal: match[2] !== undefined,
    };
  const yearFirst = (
    match: RegExpExecArray | null,
    name: 'quarter' | 'half' | 'periodNumber',
  ): PartOfYear | null =>
    match && { [name]: Number(match[3]), year: fullYear(match[2] ?? ''), fiscal: match[1] !== undefined };
  return (
    yearFirst(taking.take(`(fy|gj)?\\s*${YEAR}[\\s./-]*[qt]([1-4])`), 'quarter') ??
    yearFirst(taking.take(`(fy|gj)?\\s*${YEAR}[\\s./-]*[hs]([12])`), 'half') ??
    of(taking.take(`(?:q|t|qtr|quarter|kv)\\.?\\s?([1-4])${fiscalYear}`), 'quarter') ??
    of(taking.take(`([1-4])\\s?(?:q|t)${fiscalYear}`), 'quarter') ??
    of(
      taking.take(
        `([1-4])(?:\\.|st|nd|rd|th|er|e|eme|o)?\\s?(?:quartal|quarter|trimestre|kvartal)${fiscalYear}`,
      ),
      'quarter',
    ) ??
    of(taking.take(`(?:h|s|hy)\\s?([12])${fiscalYear}`), 'half') ??
    of(taking.take(`([12])\\s?h${fiscalYear}`), 'half') ??
    of(taking.take(`([12])(?:\\.|st|nd|er|e|eme|o)?\\s?(?:halbjahr|semestre|half)${fiscalYear}`), 'half') ??
    of(taking.take(`p(?:eriod)?\\s?(\\d{1,2})${fiscalYear}`), 'periodNumber')
  );
}

function takeYear(taking: Taking): { year: number; fiscal: boolean } | null {
  const split = taking.take('(?:fy|gj)?\\s?(20\\d{2})\\s?/\\s?(\\d{4}|\\d{2})');
  if (split && fullYear(split[2] ?? '') === Number(split[1]) + 1) {
    return { year: Number(split[1]) + 1, fiscal: true };
  }
  const fiscal = taking.take(`(?:fy|gj|financial year|fiscal year|year|exercice|ejercicio)[\\s-]*${YEAR}`);
  if (fiscal) return { year: fullYear(fiscal[1] ?? ''), fiscal: true };
  const plain = taking.take('((?:19|20)\\d{2})');
  return plain ? { year: Number(plain[1]), fiscal: false } : null;
}
