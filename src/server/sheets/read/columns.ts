/** What each column of a table stands for, as far as its own words say; lengths and years are settled later. */
import type { SheetCell } from './cells.ts';
import { readHeadingText, saysPeriod, type HeadingText, type Scenario } from './headingText.ts';
import type { PeriodText } from './periodText.ts';
import type { Table, TableColumn } from './tables.ts';

export interface ColumnWords {
  readonly key: string;
  readonly index: number;
  readonly heading: string;
  readonly hidden: boolean;
  readonly role: 'period' | 'derived' | 'note' | 'debit' | 'credit' | 'unknown';
  readonly period: PeriodText;
  readonly scenario: Scenario;
  readonly priorYear: boolean;
  readonly restated: boolean;
  readonly indexed: boolean;
  /** Where the heading names one of its own. */
  readonly currency: string | null;
  /** A name beside the period: an entity, or a borrower in a file of many. */
  readonly name: string;
  readonly nameText: string;
}

export const NO_PERIOD: PeriodText = {
  end: null,
  start: null,
  eitherDay: null,
  monthDay: null,
  months: null,
  yearToDate: false,
  quarter: null,
  half: null,
  periodNumber: null,
  year: null,
  fiscal: false,
  weeks: null,
  rest: '',
};

export function columnWords(table: Table): ColumnWords[] {
  const read = table.columns.map((column) => column.headings.map((cell) => readHeadingText(cell.text)));
  const sides = new Set(read.flat().map(({ side }) => side));
  const isTrialBalance = sides.has('debit') && sides.has('credit');
  const anyPeriod = read.flat().some(saysPeriod);
  const saysScenario = read.flat().some(({ scenario }) => scenario !== null);
  const whole = saysScenario || isTrialBalance ? 'actual' : scenarioOfTable(table);
  return table.columns.map((column, index) =>
    wordsOf(column, index, read[index] ?? [], isTrialBalance, anyPeriod, whole),
  );
}

function wordsOf(
  column: TableColumn,
  index: number,
  headings: readonly HeadingText[],
  isTrialBalance: boolean,
  anyPeriod: boolean,
  whole: Scenario,
): ColumnWords {
  const names = headings.map(({ rest }, at) => ({ rest, text: column.headings[at]?.text ?? '' }));
  const named = names.filter(({ rest }) => rest !== '');
  const side = isTrialBalance ? (headings.find((heading) => heading.side)?.side ?? null) : null;
  const scenario = isTrialBalance
    ? null
    : headings.map((heading) => heading.scenario).findLast((found) => found !== null);
  return {
    key: column.key,
    index,
    heading: column.headings.map(({ text }) => text).join(' · '),
    hidden: column.hidden,
    role: side ?? roleOf(headings, anyPeriod),
    period: headings.reduce((sum, heading) => combinePeriods(sum, heading.period), NO_PERIOD),
    scenario: scenario ?? whole,
    priorYear: headings.some((heading) => heading.priorYear),
    restated: headings.some((heading) => heading.restated),
    indexed: headings.some((heading) => heading.indexed),
    currency: headings.map(({ scale }) => scale.currency).findLast((found) => found !== null) ?? null,
    name: named.map(({ rest }) => rest).join(' '),
    nameText: named.map(({ text }) => text).join(' · '),
  };
}

function roleOf(headings: readonly HeadingText[], anyPeriod: boolean): ColumnWords['role'] {
  if (headings.some((heading) => heading.note)) return 'note';
  if (headings.some((heading) => heading.derived)) return 'derived';
  if (headings.some(saysPeriod)) return 'period';
  return anyPeriod ? 'unknown' : 'period';
}

/** The lower heading says more of its column than the one above. */
function combinePeriods(upper: PeriodText, lower: PeriodText): PeriodText {
  return {
    end: lower.end ?? upper.end,
    start: lower.start ?? upper.start,
    eitherDay: lower.eitherDay ?? upper.eitherDay,
    monthDay: lower.monthDay ?? upper.monthDay,
    months: lower.months ?? upper.months,
    yearToDate: lower.yearToDate || upper.yearToDate,
    quarter: lower.quarter ?? upper.quarter,
    half: lower.half ?? upper.half,
    periodNumber: lower.periodNumber ?? upper.periodNumber,
    year: lower.year ?? upper.year,
    fiscal: lower.fiscal || upper.fiscal,
    weeks: lower.weeks ?? upper.weeks,
    rest: [upper.rest, lower.rest].filter((text) => text !== '').join(' '),
  };
}

/** What the titles above a table, and below its headings, say of its period; the nearest title counts most. */
export const titlePeriod = (table: Table): PeriodText =>
  [...table.titles, ...leadingTexts(table)]
    .map((cell) => readHeadingText(cell.text).period)
    .reduce(combinePeriods, NO_PERIOD);

function leadingTexts(table: Table): SheetCell[] {
  const first = table.rows.find(({ cells }) => cells.some((cell) => cell !== null))?.number ?? 0;
  return table.footnotes.filter(({ row }) => row < first);
}

const PRO_FORMA = /(?<![a-z])pro[ -]?forma(?![a-z])/i;

/** A whole table is of one scenario where its sheet or title says so and its columns say nothing else. */
function scenarioOfTable(table: Table): Scenario {
  for (const text of [table.sheet.name, ...table.titles.map((cell) => cell.text)]) {
    if (PRO_FORMA.test(text)) return 'forecast';
    const { scenario, derived } = readHeadingText(text);
    if (
      scenario &&
      scenario !== 'actual' &&
      !derived &&
      !/(?<![a-z])(?:actual|vs|ist|and|und)(?![a-z])/i.test(text)
    )
      return scenario;
  }
  return 'actual';
}
