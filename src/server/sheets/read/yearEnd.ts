/** When the borrower's financial year ends and how dates are written: from the file, from an answer, else asked. */
import { addMonthsToMonthEnd, type PlainDate } from '#core/calendar/plainDate.ts';
import { endsOfHeadings, type StatementTable } from './statements.ts';
import type { Asking } from './asking.ts';
import { cellName, type SheetCell, type WorkbookGrid } from './cells.ts';
import { readPeriodText, type PeriodText } from './periodText.ts';
import type { PeriodEvidence, YearEnd } from './periods.ts';

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
  return {
    yearEnd: yearEndOf(grid, tables, knownYearEndMonth, asking),
    dayFirst: dayFirstOf(grid, tables, asking),
  };
}

function yearEndOf(
  grid: WorkbookGrid,
  tables: readonly StatementTable[],
  knownMonth: number | null,
  asking: Asking,
): YearEnd | null {
  const labels = tables.flatMap(({ columns }) => columns.filter(({ role }) => role === 'period'));
  const years = labels.flatMap(({ period }) =>
    period.year !== null && period.end === null ? [period.year] : [],
  );
  if (years.length === 0) return knownMonth === null ? null : { month: knownMonth, namedForStart: false };
  const stated = statedYearEnd(grid);
  if (stated) return { month: stated.month, namedForStart: stated.year === Math.max(...years) + 1 };
  const onBalance = monthOfBalances(tables);
  const needsFiscal = labels.some(
    ({ period }) =>
      period.end === null && (period.fiscal || period.periodNumber !== null || isWholeYear(period)),
  );
  if (onBalance !== null && needsFiscal) return { month: onBalance, namedForStart: false };
  if (knownMonth === 12) return { month: 12, namedForStart: false };
  if (!needsFiscal && knownMonth === null) return null;
  const unclear = labels.filter(({ period }) => period.year !== null && period.end === null);
  return askedYearEnd(
    [...unclear.filter(({ period }) => period.fiscal || isWholeYear(period)), ...unclear],
    tables,
    knownMonth,
    asking,
  );
}

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

function askedYearEnd(
  labels: readonly { heading: string; key: string; period: { fiscal: boolean; year: number | null } }[],
  tables: readonly StatementTable[],
  knownMonth: number | null,
  asking: Asking,
): YearEnd | null {
  const [label] = labels;
  const first = tables.flatMap(({ table }) => table.columns.flatMap(({ headings }) => headings))[0];
  const year = label?.period.year ?? 2000;
  const months = knownMonth === null ? USUAL_YEAR_ENDS : [knownMonth];
  const options = months.flatMap((month) => {
    const day = `${String(month).padStart(2, '0')}-${LAST_DAYS[month - 1]}`;
    const named = {
      value: day,
      label: `The year ends on ${LAST_DAYS[month - 1]} ${MONTHS[month - 1]} ${year}`,
    };
    if (month === 12) return [named];
    return [
      named,
      {
        value: `${day}:starts`,
        label: `The year ends on ${LAST_DAYS[month - 1]} ${MONTHS[month - 1]} ${year + 1}`,
      },
    ];
  });
  const answer = asking.ask({
    key: 'year-end',
    kind: 'year-end',
    holdsFor: 'layout',
    text: `No sheet says when the financial year ends. Which year is '${label?.heading ?? ''}'?`,
    where: first ? [{ sheet: first.sheet, cell: cellName(first) }] : [],
    options,
    accepts: (given) => /^(0[1-9]|1[0-2])-\d{2}(:starts)?$/.test(given),
  });
  if (answer === null) return null;
  return { month: Number(answer.slice(0, 2)), namedForStart: answer.endsWith(':starts') };
}

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
