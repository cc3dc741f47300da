/** What a limit chart shows, before anything is drawn: points, levels, range, and the same in words. */
import { epochDay, plainDate } from '../../core/calendar/plainDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { isNotMet, type Outcome } from '../../core/covenants/covenantTest.ts';
import { decimal } from '../../core/money/decimal.ts';
import type { MeasureUnit } from '../../core/measures/measure.ts';
import { figureInUnit, levelInUnit } from '../../core/measures/printUnit.ts';

export type ChartUnit = MeasureUnit;

export interface ChartResult {
  readonly testDate: string;
  /** Tested ratio or amount as decimal text; null leaves a gap. */
  readonly tested: string | null;
  readonly outcome: Outcome;
  readonly justPassing: boolean;
  /** Opens where the figure comes from. */
  readonly href?: string;
}

/** `until` is inclusive, null without end; a null level is a holiday. */
export interface ChartLevel {
  readonly from: string;
  readonly until: string | null;
  readonly level: string | null;
}

/** The same tests under another reading of earnings, drawn dashed and named at the line. */
export interface ChartSecondLine {
  readonly name: string;
  readonly values: readonly { readonly testDate: string; readonly tested: string | null }[];
}

export interface LimitChartFigures {
  /** "Net leverage" */
  readonly label: string;
  readonly unit: ChartUnit;
  /** The level is the most that is allowed; else the least. */
  readonly maximum: boolean;
  /** In date order. */
  readonly results: readonly ChartResult[];
  readonly levels: readonly ChartLevel[];
  readonly second?: ChartSecondLine | null;
}

export interface ChartPoint {
  /** Days from 1970-01-01. */
  readonly x: number;
  readonly y: number;
}

export interface LevelSegment {
  readonly start: ChartPoint;
  readonly end: ChartPoint;
  /** "at most 3.50x", "3.25x from 31 Dec 2026" */
  readonly text: string;
}

export interface ChartRange {
  readonly first: number;
  readonly last: number;
  readonly low: number;
  readonly high: number;
}

const DAYS_AFTER_LAST_TEST = 60;
const DAYS_OF_COMING_LEVEL = 100;

export const dayOf = (date: string): number => epochDay(plainDate(date));

export function figureText(value: string, unit: ChartUnit): string {
  return figureInUnit(unit, decimal(value));
}

function levelText(value: string, unit: ChartUnit): string {
  return levelInUnit(unit, decimal(value));
}

/** Level segments that fall into the chart, the coming one with its first months. */
export function levelSegments(figures: LimitChartFigures): readonly LevelSegment[] {
  const { first, last } = dayRange(figures);
  const bound = figures.maximum ? 'at most' : 'at least';
  const lastTest = figures.results.at(-1);
  return figures.levels.flatMap(({ from, until, level }) => {
    const start = Math.max(dayOf(from), first);
    const end = Math.min(until === null ? last : dayOf(until) + 1, last);
    if (level === null || start >= end) return [];
    const coming = lastTest !== undefined && from > lastTest.testDate;
    const printed = levelText(level, figures.unit);
    return [
      {
        start: { x: start, y: Number(level) },
        end: { x: end, y: Number(level) },
        text: coming ? `${printed} from ${formatDay(plainDate(from))}` : `${bound} ${printed}`,
      },
    ];
  });
}

/** From the first test to some time after the last, or after the level that comes next. */
function dayRange({ results, levels }: LimitChartFigures): Pick<ChartRange, 'first' | 'last'> {
  const days = results.map((result) => dayOf(result.testDate));
  const first = days[0] ?? 0;
  const lastTest = days.at(-1) ?? 0;
  const coming = levels.map((level) => dayOf(level.from)).filter((from) => from > lastTest);
  const next = coming.length > 0 ? Math.min(...coming) : null;
  return {
    first,
    last: next === null ? lastTest + DAYS_AFTER_LAST_TEST : next + DAYS_OF_COMING_LEVEL,
  };
}

export function chartRange(figures: LimitChartFigures): ChartRange {
  const values = [
    ...figures.results.map((result) => result.tested),
    ...(figures.second?.values ?? []).map((value) => value.tested),
  ].flatMap((text) => (text === null ? [] : [Number(text)]));
  const all = [...values, ...levelSegments(figures).map((segment) => segment.start.y)];
  const low = Math.min(...all);
  const high = Math.max(...all);
  const air = (high - low || Math.abs(high) || 1) * 0.18;
  return { ...dayRange(figures), low: low - air, high: high + air };
}

/** The chart in a sentence or two, for somebody who does not see it; the table beside it has every figure. */
export function chartText(figures: LimitChartFigures): string {
  const { label, unit, results, levels, maximum, second } = figures;
  const latest = results.findLast((result) => result.tested !== null);
  if (!latest?.tested) return `${label}: no test result yet.`;
  const inForce = levels.find(
    ({ from, until }) => from <= latest.testDate && (until === null || until >= latest.testDate),
  )?.level;
  const bound = inForce ? `, ${maximum ? 'at most' : 'at least'} ${levelText(inForce, unit)}` : '';
  const notMet = results.filter((result) => isNotMet(result.outcome)).length;
  const near = results.filter((result) => result.justPassing).length;
  const other = second?.values.findLast((value) => value.tested !== null)?.tested;
  return [
    `${label} over ${results.length} tests.`,
    `Latest ${figureText(latest.tested, unit)} on ${formatDay(plainDate(latest.testDate))}${bound}: ${latest.outcome}.`,
    `${notMet} not met, ${near} just passing.`,
    second && other ? `${figureText(other, unit)} ${second.name}.` : '',
  ]
    .filter(Boolean)
    .join(' ');
}
