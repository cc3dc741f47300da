/** How levels are laid so that a borrower's past tests were met, except where its story says otherwise. */
import { addDays, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { DemoLevel } from './demoCovenant.ts';

/** One past test: its date and its reading; null where the reading has no meaning. */
export interface PastTest {
  readonly date: PlainDate;
  readonly value: number | null;
}

/** Rows from [first day, level] pairs in date order; a level equal to the one before is no step. */
export function schedule(steps: readonly (readonly [PlainDate, number | null])[]): DemoLevel[] {
  const changes = steps.filter(([, level], index) => index === 0 || level !== steps[index - 1]?.[1]);
  return changes.map(([from, level], index) => {
    const next = changes[index + 1];
    return { from, until: next ? addDays(next[0], -1) : null, level };
  });
}

export interface LevelKind {
  readonly isMaximum: boolean;
  /** Levels are multiples of this. */
  readonly step: number;
}

/** Share of the level between it and the value; negative where the test is not met. */
export const headroomShare = (value: number, level: number, { isMaximum }: LevelKind): number =>
  isMaximum ? 1 - value / level : value / level - 1;

/** The tightest round level that leaves every value at least the share. */
export function levelWithRoom(
  values: readonly number[],
  share: number,
  { isMaximum, step }: LevelKind,
): number {
  const exact = isMaximum ? Math.max(...values) / (1 - share) : Math.min(...values) / (1 + share);
  const steps = isMaximum ? Math.ceil(exact / step - 1e-9) : Math.floor(exact / step + 1e-9);
  return Number((Math.max(1, steps) * step).toFixed(6));
}

/** Tests that the level was too tight for had a looser one, with this share of room. */
const ROOM_BEFORE = 0.13;
/** Values nearer to the level than this would look like just passing. */
const CLEAR_OF_BAND = 0.03;

/**
 * A schedule that ends at `level`: as far back as the tests clear it (or, in the last `storyTests`, whatever they
 * came to), and looser before that.
 */
export function scheduleEndingAt(
  level: number,
  tests: readonly PastTest[],
  kind: LevelKind,
  storyTests: number,
): DemoLevel[] {
  const clears = ({ value }: PastTest): boolean =>
    value !== null && headroomShare(value, level, kind) >= CLEAR_OF_BAND;
  let start = Math.max(0, tests.length - storyTests);
  while (start > 0) {
    const before = tests[start - 1];
    if (!before || !clears(before)) break;
    start -= 1;
  }
  const first = tests[0];
  const from = tests[start];
  if (!first || !from) throw new RangeError('a schedule requires at least one past test');
  const earlier = tests.slice(0, start).flatMap(({ value }) => (value === null ? [] : [value]));
  if (earlier.length === 0) return schedule([[first.date, level]]);
  return schedule([
    [first.date, levelWithRoom(earlier, ROOM_BEFORE, kind)],
    [from.date, level],
  ]);
}

/** The schedule with a later step agreed already. */
export function withLaterStep(levels: readonly DemoLevel[], from: PlainDate, level: number): DemoLevel[] {
  return schedule([...levels.map((row) => [row.from, row.level] as const), [from, level]]);
}
