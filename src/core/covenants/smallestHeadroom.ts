import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { Covenant } from './covenant.ts';
import type { CovenantTest } from './covenantTest.ts';
import { latestLiveTest } from './latestLiveTest.ts';

export interface SmallestHeadroom {
  readonly covenantId: number;
  readonly mayFall: Decimal;
}

/** The same against a level that is agreed for later. */
export interface SmallestHeadroomAhead extends SmallestHeadroom {
  readonly from: PlainDate;
}

/**
 * The least that earnings (or the tested amount) may fall over the latest live test of each covenant; null where
 * no live test has headroom. A result without a ratio has none: its outcome says so.
 *
 * Source: methods.md A5.
 *
 * @example smallestHeadroom([test], [1])?.mayFall // => 0.1428571428571…
 */
export const smallestHeadroom = (
  tests: readonly CovenantTest[],
  covenantIds: readonly number[],
): SmallestHeadroom | null =>
  smallest(
    covenantIds.flatMap((covenantId) => {
      const mayFall = latestLiveTest(tests, covenantId)?.headroom.mayFall;
      return mayFall ? [{ covenantId, mayFall }] : [];
    }),
  );

/**
 * The least at each step that is agreed for later, in order of days: today's results against the levels in force from
 * that day on. Empty where no live test has a later level.
 *
 * @example smallestHeadroomsAhead([test], [1]).map(({ from }) => from) // => ['2027-01-01']
 */
export function smallestHeadroomsAhead(
  tests: readonly CovenantTest[],
  covenantIds: readonly number[],
): readonly SmallestHeadroomAhead[] {
  const live = covenantIds.flatMap((covenantId) => latestLiveTest(tests, covenantId) ?? []);
  const steps = new Set(live.flatMap(({ againstLaterLevels }) => againstLaterLevels.map(({ from }) => from)));
  return [...steps].sort().flatMap((from) => {
    const least = smallest(
      live.flatMap((test) => {
        const mayFall = mayFallFrom(test, from);
        return mayFall ? [{ covenantId: test.covenantId, from, mayFall }] : [];
      }),
    );
    return least ?? [];
  });
}

/**
 * The step at which the least is left; null where no step is agreed.
 *
 * @example tightestAhead(smallestHeadroomsAhead([test], [1]))?.from // => '2027-01-01'
 */
export const tightestAhead = (ahead: readonly SmallestHeadroomAhead[]): SmallestHeadroomAhead | null =>
  smallest(ahead);

/** Against the level in force on that day, which is today's where no step comes before it; a holiday leaves none. */
function mayFallFrom(
  { againstLaterLevels, nextLevel, headroom }: CovenantTest,
  day: PlainDate,
): Decimal | null {
  const later = againstLaterLevels.findLast(({ from }) => from <= day);
  if (later) return later.mayFall;
  return nextLevel?.level === null && nextLevel.from <= day ? null : headroom.mayFall;
}

/**
 * The covenants whose headroom is the borrower's: those of agreements, or, where it has none, the desk's own triggers.
 *
 * @example headroomCovenants([covenant, { ...covenant, id: 2, isOurs: true }]) // => [1]
 */
export function headroomCovenants(covenants: readonly Pick<Covenant, 'id' | 'isOurs'>[]): readonly number[] {
  const agreed = covenants.filter(({ isOurs }) => !isOurs);
  return (agreed.length > 0 ? agreed : covenants).map(({ id }) => id);
}

const smallest = <Headroom extends SmallestHeadroom>(all: readonly Headroom[]): Headroom | null =>
  all.reduce<Headroom | null>((least, one) => (least && least.mayFall.lte(one.mayFall) ? least : one), null);
