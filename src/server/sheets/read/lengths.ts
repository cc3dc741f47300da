/**
 * How many months each column of flows covers, where its words do not say: proven by the cash roll or by retained
 * earnings, else asked. Growth from column to column proves nothing: it only words the question.
 */
import { addMonthsToMonthEnd, isPlainDate } from '#core/calendar/plainDate.ts';
import { ZERO } from '#core/money/decimal.ts';
import type { CellRef } from '#core/statements/workbookReading.ts';
import type { Asking } from './asking.ts';
import { cellName } from './cells.ts';
import {
  columnPeriod,
  monthsIntoYear,
  titleLengthFits,
  type ColumnPeriod,
  type PeriodEvidence,
} from './periods.ts';
import { lengthProofs, proofKey } from './lengthProofs.ts';
import type { SettledColumn, SettledColumns, StatementTable } from './statements.ts';

const MONTHS_IN_YEAR = 12;
export function settleColumns(
  tables: readonly StatementTable[],
  evidence: PeriodEvidence,
  asking: Asking,
): SettledColumns {
  const settled = new Map<StatementTable, readonly SettledColumn[]>(
    tables.map((table) => [table, withEnds(table, evidence, asking)]),
  );
  const proofs = lengthProofs(settled);
  for (const [table, columns] of settled) {
    if (!hasFlows(table)) continue;
    const proven = columns.map((column) => withLength(column, proofs.get(proofKey(table, column)) ?? null));
    const isOpen = ({ months, scenario }: SettledColumn) => months === null && scenario === 'actual';
    const [toDate, others] = [true, false].map((wanted) =>
      proven.filter((column) => isOpen(column) && column.period.yearToDate === wanted),
    );
    const answered = askLengths(table, proven, others ?? [], evidence, asking);
    settled.set(table, askLengths(table, answered, toDate ?? [], evidence, asking));
  }
  return settled;
}

const hasFlows = ({ runs }: StatementTable): boolean =>
  runs.some(
    ({ part, rows }) => (part === 'income' || part === 'cash-flow') && rows.some((row) => row.line !== null),
  );

const withLength = (column: SettledColumn, months: number | null): SettledColumn => ({
  ...column,
  months: column.months ?? months,
});

function withEnds(table: StatementTable, evidence: PeriodEvidence, asking: Asking): SettledColumn[] {
  const columns = table.columns.filter(({ role }) => role === 'period');
  const said = columns.map((words) => columnPeriod(words, table.title, evidence));
  const typed = said.every(({ needs }) => needs === 'period') ? askPeriod(table, asking) : null;
  const periods = columns.flatMap((words, at) => {
    const period = typed ?? said[at] ?? { end: null, months: null, needs: 'period' };
    return period.end ? [{ ...words, ...period, end: period.end }] : [];
  });
  const ends = periods.filter(({ scenario }) => scenario === 'actual').map(({ end }) => end);
  const { months } = table.title;
  const fits = months !== null && titleLengthFits(months, ends);
  return periods.map((period) => {
    const own = { ...period, months: period.months ?? (fits ? months : null) };
    return period.priorYear ? { ...own, end: addMonthsToMonthEnd(own.end, -MONTHS_IN_YEAR) } : own;
  });
}

/** A table that names no period at all: the analyst types it, '2026-09-30/3'. */
function askPeriod(table: StatementTable, asking: Asking): ColumnPeriod | null {
  if (table.isTrialBalance || table.columns.length === 0) return null;
  const { sheet } = table.table;
  const answer = asking.ask({
    key: `period:${sheet.name}`.slice(0, 190),
    kind: 'period-length',
    holdsFor: 'file',
    text: `Nothing on '${sheet.name}' says which period the amounts are for. Type its last day and its months, such as 2026-09-30/3; 0 months for a balance sheet.`,
    where: [],
    options: [],
    accepts: (given) => TYPED_PERIOD.test(given) && isPlainDate(given.slice(0, 10)),
  });
  const [, end, months] = TYPED_PERIOD.exec(answer ?? '') ?? [];
  if (!end || !isPlainDate(end)) return null;
  return { end, months: Number(months) || null, needs: null };
}

const TYPED_PERIOD = /^(\d{4}-\d{2}-\d{2})\/(\d{1,2})$/;

/** Each pattern gives every open column its months. */
interface Pattern {
  readonly value: string;
  readonly months: readonly number[];
  readonly label: string;
}

function askLengths(
  table: StatementTable,
  columns: readonly SettledColumn[],
  open: readonly SettledColumn[],
  { yearEnd }: PeriodEvidence,
  asking: Asking,
): readonly SettledColumn[] {
  if (open.length === 0) return columns;
  const patterns = patternsOf(open, yearEnd?.month ?? null);
  const headings = open.map(({ heading }) => `'${heading}'`).join(', ');
  const signature = open.map(({ heading }) => heading.replace(/\d/g, '')).join('|');
  const key = `period-length:${signature}`.slice(0, 190);
  const answer = asking.ask({
    key,
    kind: 'period-length',
    // Months column by column are those of this file's periods; a pattern is the layout's.
    holdsFor: asking.answerTo(key)?.includes('=') ? 'file' : 'layout',
    text: `${looksCumulative(table, open) ? 'The figures look cumulative, but no sheet says so' : 'No sheet says how long the periods are'}. How many months do ${headings} on '${table.table.sheet.name}' cover?`,
    where: open.flatMap((column) => headingPlace(table, column)),
    options: patterns.map(({ value, label }) => ({ value, label })),
    accepts: (given) => explicitMonths(given, open) !== null,
  });
  if (answer === null) return columns;
  const months = patterns.find(({ value }) => value === answer)?.months ?? explicitMonths(answer, open);
  return columns.map((column) => {
    const at = open.findIndex(({ key }) => key === column.key);
    return at < 0 ? column : { ...column, months: months?.[at] ?? null };
  });
}

function headingPlace(table: StatementTable, column: SettledColumn): CellRef[] {
  const cell = table.table.columns[column.index]?.headings.at(-1);
  return cell ? [{ sheet: cell.sheet, cell: cellName(cell) }] : [];
}

/** 'B=3;C=6;D=9' */
function explicitMonths(answer: string, open: readonly SettledColumn[]): number[] | null {
  const given = new Map(answer.split(';').map((pair) => pair.split('=') as [string, string | undefined]));
  const months = open.map(({ key }) => Number(given.get(key)));
  return months.every((count) => Number.isInteger(count) && count >= 1 && count <= 24) ? months : null;
}

function patternsOf(open: readonly SettledColumn[], yearEndMonth: number | null): Pattern[] {
  const ends = open.map(({ end }) => end);
  const each = [3, 1, 6, 12]
    .filter((months) => months === 12 || titleLengthFits(months, ends))
    .map((months) => ({
      value: `each:${months}`,
      months: ends.map(() => months),
      label: `Each covers ${months} ${months === 1 ? 'month' : 'months'}`,
    }));
  const yearEnds = yearEndMonth === null ? [12, 3, 6, 9] : [yearEndMonth];
  const cumulative = yearEnds.map((month) => {
    const months = ends.map((end) => monthsIntoYear(end, month));
    return {
      value: `from-year-end:${month}`,
      months,
      label: `${months.join(', ')} months: each counts from the beginning of the year, which ends in month ${month}`,
    };
  });
  const growing = cumulative.filter(
    ({ months }) => new Set(months).size === months.length || yearEndMonth !== null,
  );
  return [...each.slice(0, 1), ...growing, ...each.slice(1)];
}

/** Revenue that grows by about as much from each column to the next. */
function looksCumulative(table: StatementTable, open: readonly SettledColumn[]): boolean {
  const revenue = table.runs.flatMap((run) =>
    run.rows.flatMap((row, at) => (row.line === 'revenue' ? [run.amounts[at] ?? []] : [])),
  )[0];
  const inOrder = [...open].sort((one, other) => (one.end < other.end ? -1 : 1));
  const amounts = inOrder.flatMap(({ index }) => revenue?.[index] ?? []);
  return (
    amounts.length >= 2 &&
    amounts.every((amount, at) => at === 0 || amount.gt((amounts[at - 1] ?? ZERO).times('1.25')))
  );
}
