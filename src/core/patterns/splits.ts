import { err, ok, type Result } from '../result.ts';
import { risingTrend, type Trend } from '../statistics/trend.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';
import { groupedBy } from './groupedBy.ts';
import type { HeadroomRow } from './headroomRow.ts';
import { borrowersOf, headroomsOf, keptRows, type TooFewNearLimit } from './nearLimit.ts';
import { sidesOfLimit, type SidesOfLimit } from './sidesOfLimit.ts';
import { binsAround } from './windows.ts';

/** Both sides of the limit in one part of the book, refused where it is too small. */
export interface SplitPart {
  readonly name: string;
  /** With tests that count. */
  readonly borrowers: number;
  readonly sides: Result<SidesOfLimit, TooFewNearLimit>;
}

/**
 * The standardized differences of each part of the book, parts in the order of their names.
 *
 * @example splitBy([], ({ sector }) => sector, 0.02) // => []
 */
export function splitBy(
  rows: readonly HeadroomRow[],
  partOf: (row: HeadroomRow) => string,
  width: number,
): readonly SplitPart[] {
  return [...groupedBy(rows, partOf)]
    .sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0))
    .map(([name, part]) => partOfBook(name, part, width));
}

/** Runs of tests met before, from the least number of each. Source: methods.md Part C 1.2. */
const RUNS = [
  { name: '0', from: 0 },
  { name: '1 to 3', from: 1 },
  { name: '4 to 7', from: 4 },
  { name: '8 or more', from: 8 },
] as const;

/** A trend over runs needs this many tests in the two bins at the limit in every group. */
const FEWEST_AT_LIMIT = 10;

export interface RunSplit {
  readonly parts: readonly SplitPart[];
  /** Whether the share just inside the limit rises with the run. */
  readonly trend: Result<Trend, StatisticsError>;
}

/**
 * The parts by how many tests in a row were met before, and whether the share just inside the limit rises with it.
 *
 * @example splitByRun([], 0.02).trend.error.kind // => 'too-few-points'
 */
export function splitByRun(rows: readonly HeadroomRow[], width: number): RunSplit {
  const groups = groupedBy(rows, ({ metBefore }) => RUNS.findLast(({ from }) => metBefore >= from)!.name);
  const counts = RUNS.map(({ name }, score) => {
    const kept = (groups.get(name) ?? []).filter(({ removal }) => removal === null);
    const { left, right } = binsAround(headroomsOf(kept), width, 0);
    return { n: left + right, yes: right, score };
  });
  const fewest = Math.min(...counts.map(({ n }) => n));
  return {
    parts: RUNS.map(({ name }) => partOfBook(name, groups.get(name) ?? [], width)),
    trend:
      fewest < FEWEST_AT_LIMIT
        ? err({ kind: 'too-few-points', needed: FEWEST_AT_LIMIT, given: fewest })
        : risingTrend(counts),
  };
}

function partOfBook(name: string, rows: readonly HeadroomRow[], width: number): SplitPart {
  const kept = keptRows(rows);
  const borrowers = borrowersOf(rows);
  if (!kept.ok) return { name, borrowers, sides: kept };
  return { name, borrowers, sides: ok(sidesOfLimit(kept.value.headrooms, kept.value.n, width, 0)) };
}
