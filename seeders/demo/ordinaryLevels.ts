/** Levels of covenants that no story speaks of. */
import { addMonthsToMonthEnd, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { Scenario } from './borrowerTable.ts';
import type { DemoLevel } from './demoCovenant.ts';
import { tightEarlyLevel } from './earlyLevel.ts';
import {
  headroomShare,
  levelWithRoom,
  schedule,
  withLaterStep,
  type LevelKind,
  type PastTest,
} from './levelSchedule.ts';
import type { RandomNumbers } from './randomNumbers.ts';

/** Lowest and highest level that a lender agrees to. */
export type Usual = readonly [number, number];

interface OrdinaryContext {
  readonly scenario: Scenario;
  readonly nextQuarterEnd: PlainDate;
  readonly random: RandomNumbers;
}

/** Their stories speak of past tests too. */
const AGREED_WITH_ROOM: readonly Scenario[] = ['restated', 'covenant holiday'];

/** Wide room now; before, wider still or, for a part of the book, tight at first and reset. A later step where room is left. */
export function ordinaryLevels(
  tests: readonly PastTest[],
  { kind, usual }: { readonly kind: LevelKind; readonly usual: Usual },
  { scenario, nextQuarterEnd, random }: OrdinaryContext,
): DemoLevel[] {
  const valuesOf = (past: readonly PastTest[]): number[] =>
    past.flatMap(({ value }) => (value === null ? [] : [value]));
  const recent = valuesOf(tests.slice(-5));
  const room = random.between(0.2, 0.34);
  const now = within(usual, levelWithRoom(recent, room, kind));
  const before = within(usual, levelWithRoom(valuesOf(tests), room, kind));
  const looser = kind.isMaximum ? within(usual, Math.max(before, now + 0.5)) : Math.min(before, now);
  const [first, from] = [tests[0], tests.at(-5)];
  if (!first || !from) throw new RangeError('ordinary levels require five past tests');
  const tight = AGREED_WITH_ROOM.includes(scenario)
    ? null
    : tightEarlyLevel(
        {
          seed: `${first.date} ${tests.map(({ value }) => value).join(' ')}`,
          values: valuesOf(tests.slice(0, -5)),
        },
        kind,
      );
  const levels = schedule([
    [first.date, tight ?? looser],
    [from.date, now],
  ]);
  const tighter = now - 0.25;
  const latest = recent.at(-1);
  const mayTighten = kind.isMaximum && latest !== undefined && headroomShare(latest, tighter, kind) > 0.2;
  const agreed = mayTighten ? withLaterStep(levels, addMonthsToMonthEnd(nextQuarterEnd, 9), tighter) : levels;
  const isLoosened = tight !== null && (kind.isMaximum ? now > tight : now < tight);
  return isLoosened
    ? agreed.map((row) => (row.from === from.date ? { ...row, isReset: true } : row))
    : agreed;
}

const within = ([lowest, highest]: Usual, level: number): number =>
  Math.min(highest, Math.max(lowest, level));
