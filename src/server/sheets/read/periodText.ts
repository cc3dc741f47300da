/** What a heading says of its period, without knowing yet when the borrower's year ends. */
import type { PlainDate } from '#core/calendar/plainDate.ts';
import { fullYear, takeDay, takeMonth, takeMonthDay, takeSpan, Taking, YEAR } from './dayText.ts';
import { plainText } from './plainWords.ts';

/** A day or, with `day` null, a month, whose year stands elsewhere. */
export interface MonthDay {
  readonly month: number;
  readonly day: number | null;
}

export interface PeriodText {
  /** The last day, where the heading names a day or a month. */
  readonly end: PlainDate | null;
  /** A first day, where it names a span. */
  readonly start: PlainDate | null;
  /** Both readings of a date such as 03/04/2026. */
  readonly eitherDay: { readonly dmy: PlainDate; readonly mdy: PlainDate } | null;
  readonly monthDay: MonthDay | null;
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

const NUMBER_WORDS: ReadonlyMap<string, number> = new Map(
  ['one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten', 'eleven', 'twelve'].map(
    (word, index) => [word, index + 1],
  ),
);
const MONTH_UNIT = 'months?|mths?|mos?|monate?|monaten|mois|meses|m|manader|maneder|maanden';

const LONGEST = 300;

export function readPeriodText(text: string): PeriodText {
  const taking = new Taking(
    plainText(text.slice(0, LONGEST))
      .replace(/\s+/g, ' ')
      .replace(/[‐‑–—]/g, '-')
      .trim(),
  );
  const weeks = taking.take('(\\d{2})[ -]?(?:weeks?|wochen|semaines|semanas)');
  const span = takeSpan(taking);
  const day = span ? null : takeDay(taking);
  const length = takeLength(taking);
  const monthDay = span || day ? null : takeMonthDay(taking);
  const month = span || day || monthDay ? null : takeMonth(taking);
  const part = takePart(taking);
  const year = span || day?.end || day?.either || month ? null : takeYear(taking);
  const fiscal = part?.fiscal === true || year?.fiscal === true;
  return {
    end: span?.end ?? day?.end ?? month,
    start: span?.start ?? null,
    eitherDay: day?.either ?? null,
    monthDay,
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

function takeLength(taking: Taking): { months: number | null; yearToDate: boolean } {
  const yearToDate =
    taking.take('ytd|year[ -]to[ -]date|cumul\\w*|kumuliert|kum\\.?|acumulad[oa]|a date|lopende jaar') !==
    null;
  if (taking.take('mtd|month[ -]to[ -]date')) return { months: 1, yearToDate };
  // As long as the quarter is old: the figures or the analyst say how long.
  taking.take('qtd|quarter[ -]to[ -]date');
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
