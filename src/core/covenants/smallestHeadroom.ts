import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
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
 * The least against every level agreed for later, kept apart from today's.
 *
 * @example smallestHeadroomAhead([test], [1])?.from // => '2027-01-01'
 */
export const smallestHeadroomAhead = (
  tests: readonly CovenantTest[],
  covenantIds: readonly number[],
): SmallestHeadroomAhead | null =>
  smallest(
    covenantIds.flatMap((covenantId) =>
      (latestLiveTest(tests, covenantId)?.againstLaterLevels ?? []).flatMap(({ from, mayFall }) =>
        mayFall ? [{ covenantId, from, mayFall }] : [],
      ),
    ),
  );

const smallest = <Headroom extends SmallestHeadroom>(all: readonly Headroom[]): Headroom | null =>
  all.reduce<Headroom | null>((least, one) => (least && least.mayFall.lte(one.mayFall) ? least : one), null);
