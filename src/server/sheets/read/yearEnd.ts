/** When the borrower's financial year ends and how dates are written: from the file, from an answer, else asked. */
import { addMonthsToMonthEnd, type PlainDate } from '#core/calendar/plainDate.ts';
import { columnPeriod, type PeriodEvidence, type YearEnd } from './periods.ts';
import { endsOfHeadings, type StatementTable } from './statements.ts';
import { NO_PERIOD, type ColumnWords } from './columns.ts';
import type { Asking } from './asking.ts';
import { cellName, type SheetCell, type WorkbookGrid } from './cells.ts';
import { readPeriodText, type PeriodText } from './periodText.ts';

const MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
];
const LAST_DAYS = [31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31];
const USUAL_YEAR_ENDS = [12, 3, 6, 9];

export function periodEvidence(
  grid: WorkbookGrid,
  tables: readonly StatementTable[],
  knownYearEndMonth: number | null,
  asking: Asking,
): PeriodEvidence {
  const yearEnd = yearEndOf(grid, tables, knownYearEndMonth, asking);
  return {
    yearEnd: yearEnd === 'asked' ? null : yearEnd,
    yearEndOpen: yearEnd === 'asked',
    dayFirst: dayFirstOf(grid, tables, asking),
  };
}

function yearEndOf(
  grid: WorkbookGrid,
  tables: readonly StatementTable[],
  knownMonth: number | null,
  asking: Asking,
): YearEnd | 'asked' | null {
  const labels = tables.flatMap(({ columns }) =>
    columns.filter(({ role, period }) => role === 'period' && period.year !== null && period.end === null),
  );
  const ofYears = labels.filter(({ period }) => isFinancial(period));
  const ofQuarters = labels.filter(({ period }) => !isFinancial(period));
  const stated = statedYearEnd(grid);
  const onBalance = ofYears.length > 0 ? monthOfBalances(tables) : null;
  const month = stated?.month ?? onBalance ?? knownMonth;
  if (month === 12) return { month, namedForStart: false, calendarQuarters: true };
  if (month === null && ofYears.length === 0) return null;
  const latest = Math.max(0, ...ofYears.map(({ period }) => period.year ?? 0));
  const named = stated ? namedForStartOf(stated.year, latest) : onBalance !== null ? false : null;
  const namedForStart = ofYears.length === 0 ? false : named;
  const calendarQuarters =
    month === null || ofQuarters.length === 0 ? null : quartersOfBalances(ofQuarters, month, tables);
  const isQuarterOpen = ofQuarters.length > 0 && calendarQuarters === null;
  if (month !== null && namedForStart !== null && !isQuarterOpen) {
    return { month, namedForStart, calendarQuarters: calendarQuarters ?? true };
  }
  const candidates = (month === null ? USUAL_YEAR_ENDS : [month]).flatMap((each) =>
    each === 12
      ? [{ month: each, namedForStart: false, calendarQuarters: true }]
      : variants(each, namedForStart, isQuarterOpen ? null : (calendarQuarters ?? false)),
  );
  return askYearEnd([...ofYears, ...ofQuarters], tables, candidates, asking) ?? 'asked';
}

/** 'FY26', '2025', 'P6': means nothing without the year end. 'Q3 2026' and '9M 2026' may be of the calendar year. */
const isFinancial = (period: PeriodText): boolean =>
  period.fiscal || period.periodNumber !== null || isWholeYear(period);

const namedForStartOf = (statedYear: number, latestLabel: number): boolean | null =>
  statedYear === latestLabel ? false : statedYear === latestLabel + 1 ? true : null;

function variants(month: number, namedForStart: boolean | null, calendarQuarters: boolean | null): YearEnd[] {
  const both = (known: boolean | null) => (known === null ? [false, true] : [known]);
  return both(namedForStart).flatMap((starts) =>
    both(calendarQuarters).map((calendar) => ({ month, namedForStart: starts, calendarQuarters: calendar })),
  );
}

/** Whether the balance dates of the file are those of calendar quarters or those of the financial year's. */
function quartersOfBalances(
  labels: readonly ColumnWords[],
  month: number,
  tables: readonly StatementTable[],
): boolean | null {
  const ends = new Set(endsOfHeadings(tables));
  const allThere = (calendarQuarters: boolean) =>
    labels.every((label) => {
      const end = endWith(label, { month, namedForStart: false, calendarQuarters });
      return end !== null && ends.has(end);
    });
  const [calendar, financial] = [allThere(true), allThere(false)];
  return calendar === financial ? null : calendar;
}

const endWith = (label: ColumnWords, yearEnd: YearEnd): PlainDate | null =>
  columnPeriod(label, NO_PERIOD, { yearEnd, yearEndOpen: false, dayFirst: null }).end;

const isWholeYear = (period: {
  quarter: number | null;
  half: number | null;
  months: number | null;
}): boolean =>
  period.quarter === null && period.half === null && (period.months === null || period.months === 12);

/** 'Year ended 31 March 2026' anywhere, but no rolling twelve months. */
function statedYearEnd(grid: WorkbookGrid): { month: number; year: number } | null {
  const found = new Map<number, number>();
  for (const cell of textCells(grid)) {
    if (!/\d{4}/.test(cell.text) || /ltm|ttm|rolling|trailing|last twelve/i.test(cell.text)) continue;
    const { end, months } = readPeriodText(cell.text);
    if (!end || months !== 12) continue;
    const [year, month] = [Number(end.slice(0, 4)), Number(end.slice(5, 7))];
    found.set(month, Math.max(year, found.get(month) ?? 0));
  }
  const [only] = found;
  return found.size === 1 && only ? { month: only[0], year: only[1] } : null;
}

function* textCells(grid: WorkbookGrid): Generator<SheetCell> {
  for (const sheet of grid.sheets)
    for (const row of sheet.rows.values())
      for (const cell of row.values()) if (cell.kind === 'text') yield cell;
}

/**
 * Balance dates beside columns of whole years: those that no quarter or other named day explains are year ends, if
 * they are all of one month and their years are those of the labels.
 */
function monthOfBalances(tables: readonly StatementTable[]): number | null {
  const flows = tables.filter(({ runs }) => runs.some(({ part }) => part === 'income'));
  const columns = flows.flatMap((table) => table.columns.filter(({ role }) => role === 'period'));
  const explained = new Set(columns.flatMap(({ period }) => calendarEnd(period) ?? []));
  const ends = endsOfHeadings(tables).filter((end) => !explained.has(end));
  const years = new Set(
    columns.flatMap(({ period }) => (period.end === null && isWholeYear(period) ? (period.year ?? []) : [])),
  );
  const fits = ends.every((end) => years.has(Number(end.slice(0, 4))));
  const [only, ...more] = new Set(ends.map((end) => Number(end.slice(5, 7))));
  return more.length === 0 && fits ? (only ?? null) : null;
}

const calendarEnd = (period: PeriodText): PlainDate | null => {
  if (period.end) return period.end;
  if (period.year === null || period.fiscal) return null;
  const months =
    period.quarter !== null ? period.quarter * 3 : period.half !== null ? period.half * 6 : period.months;
  return months === null || months >= 12
    ? null
    : addMonthsToMonthEnd(`${period.year}-01-31` as PlainDate, months - 1);
};

function askYearEnd(
  labels: readonly ColumnWords[],
  tables: readonly StatementTable[],
  candidates: readonly YearEnd[],
  asking: Asking,
): YearEnd | null {
  const [label] = labels;
  const table = tables.find(({ columns }) => columns.some((column) => column === label));
  const cell = label && table?.table.columns[label.index]?.headings.at(-1);
  const answer = asking.ask({
    key: 'year-end',
    kind: 'year-end',
    holdsFor: 'layout',
    text: `No sheet proves when the financial year ends. On which day does '${label?.heading ?? ''}' end?`,
    where: cell ? [{ sheet: cell.sheet, cell: cellName(cell) }] : [],
    options: candidates.map((candidate) => ({
      value: codeOf(candidate),
      label: `On ${(label && endWith(label, candidate)) ?? 'another day'}; the year ends on ${LAST_DAYS[candidate.month - 1]} ${MONTHS[candidate.month - 1]}`,
    })),
    accepts: (given) => CODE.test(given),
  });
  return answer === null ? null : yearEndFrom(answer);
}

/** '03-31', '03-31:starts' for years named for their start, '03-31:calendar' for quarters of the calendar year. */
const CODE = /^(0[1-9]|1[0-2])-\d{2}(:starts)?(:calendar)?$/;

const codeOf = ({ month, namedForStart, calendarQuarters }: YearEnd): string =>
  `${String(month).padStart(2, '0')}-${LAST_DAYS[month - 1]}${namedForStart ? ':starts' : ''}${calendarQuarters && month !== 12 ? ':calendar' : ''}`;

const yearEndFrom = (answer: string): YearEnd => ({
  month: Number(answer.slice(0, 2)),
  namedForStart: answer.includes(':starts'),
  calendarQuarters: answer.startsWith('12') || answer.includes(':calendar'),
});

function dayFirstOf(grid: WorkbookGrid, tables: readonly StatementTable[], asking: Asking): boolean | null {
  const [ambiguous] = tables.flatMap(({ columns, table }) =>
    columns.flatMap(({ period, index, heading }) => {
      const cell = table.columns[index]?.headings[0];
      return period.eitherDay && cell ? [{ either: period.eitherDay, cell, heading }] : [];
    }),
  );
  if (!ambiguous) return null;
  const orders = new Set<boolean>();
  for (const cell of textCells(grid)) {
    for (const [, first, second] of cell.text.matchAll(
      /(?<!\d)(\d{1,2})[/-](\d{1,2})[/-](?:\d{4}|\d{2})(?!\d)/g,
    )) {
      if (Number(first) > 12) orders.add(true);
      if (Number(second) > 12) orders.add(false);
    }
  }
  const [proven] = orders;
  if (orders.size === 1 && proven !== undefined) return proven;
  const answer = asking.ask({
    key: 'date-order',
    kind: 'date-order',
    holdsFor: 'layout',
    text: `'${ambiguous.heading}' can be read as two days. Which is it?`,
    where: [{ sheet: ambiguous.cell.sheet, cell: cellName(ambiguous.cell) }],
    options: [
      { value: 'dmy', label: `${ambiguous.either.dmy}: the day comes first` },
      { value: 'mdy', label: `${ambiguous.either.mdy}: the month comes first` },
    ],
  });
  return answer === null ? null : answer === 'dmy';
}
