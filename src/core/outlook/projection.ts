/** How often the coming tests would not be met, were results to change as the peers' did. */
import { addMonthsToMonthEnd, monthCount, type PlainDate } from '../calendar/plainDate.ts';
import { isMaximum, type Covenant } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import type { Bound } from '../covenants/headroom.ts';
import { latestLiveTest } from '../covenants/latestLiveTest.ts';
import { levelInForce } from '../covenants/levels.ts';
import type { Decimal } from '../money/decimal.ts';
import { nextTest, ratioNotLikely, type NextTest, type TestAhead } from './nextTest.ts';
import type { PeersOfBook } from './peersOfBook.ts';
import { projectionWord, type ProjectionWord } from './projectionWord.ts';
import { HORIZONS, type Horizon } from './ratioGrid.ts';
import { chanceFromOwnTests } from './reversion.ts';

/** The coming tests of one covenant, as seen from its latest live test. */
export interface Projection {
  readonly covenantId: number;
  /** The test whose result is carried on; null where there is none. */
  readonly fromTestDate: PlainDate | null;
  /** Why nothing of this covenant is projected; null where something is. */
  readonly reason: string | null;
  readonly tests: readonly TestToCome[];
}

export type TestToCome = {
  readonly testDate: PlainDate;
  readonly quarters: Horizon;
} & (ProjectedTest | TooFewPeers | NothingToProject);

export interface ProjectedTest extends Pick<NextTest, 'notMet' | 'share' | 'n' | 'borrowers' | 'peers'> {
  readonly kind: 'projected';
  /** In force on the test date, scheduled steps taken in. */
  readonly level: Decimal;
  readonly word: ProjectionWord;
  /** By reversion to the covenant's own mean; null below eight own tests. */
  readonly check: number | null;
  /** Where it is likely: the result at which it would be open; null where no result would. */
  readonly openAt: number | null;
}

export interface TooFewPeers {
  readonly kind: 'too few peers';
  readonly level: Decimal;
}

export interface NothingToProject {
  readonly kind: 'nothing to project';
  readonly reason: string;
}

/**
 * Each covenant's tests within four quarters of its latest live test, at the levels that will be in force.
 *
 * A change over h quarters is taken over h quarters; a result without meaning (net cash, nothing to cover) is
 * carried nowhere; on a day without a level there is nothing to project. An amount is carried on as a ratio is, by
 * multiples of itself. The agreement's rounding is left out of account. Source: methods.md Part C 2.2 c.
 *
 * @example projections({ borrowerId: 1, covenants: [covenant] }, [test], () => null)[0]?.tests[0] // => { testDate: '2026-12-31', quarters: 1, kind: 'too few peers', level: 3.5 }
 */
export const projections = (
  { borrowerId, covenants }: { readonly borrowerId: number; readonly covenants: readonly Covenant[] },
  tests: readonly CovenantTest[],
  peers: PeersOfBook,
): readonly Projection[] =>
  covenants.map((covenant) => {
    const own = tests.filter(({ covenantId }) => covenantId === covenant.id);
    const latest = latestLiveTest(own, covenant.id);
    const covenantId = covenant.id;
    if (!latest) return { covenantId, fromTestDate: null, reason: whyNoLiveTest(own), tests: [] };
    const fromTestDate = latest.testDate;
    const { tested, level } = latest;
    if (!tested?.gt(0) || !level)
      return { covenantId, fromTestDate, reason: whyNotCarriedOn(latest), tests: [] };
    const from: CarriedOn = {
      borrowerId,
      bound: isMaximum(covenant.operator) ? 'most' : 'least',
      ratio: tested.toNumber(),
      levelNow: level.toNumber(),
      headrooms: headroomsOf(own),
    };
    return {
      covenantId,
      fromTestDate,
      reason: null,
      tests: comingTests(covenant, fromTestDate).map((coming) => projected(covenant, coming, from, peers)),
    };
  });

interface CarriedOn {
  readonly borrowerId: number;
  readonly bound: Bound;
  readonly ratio: number;
  readonly levelNow: number;
  readonly headrooms: readonly number[];
}

function whyNoLiveTest(own: readonly CovenantTest[]): string {
  const newest = own.at(-1);
  return newest?.outcome === 'not tested'
    ? `not tested: ${newest.reason ?? 'nothing is asked of it'}`
    : 'no test with figures yet';
}

function whyNotCarriedOn({ outcome, reason, tested }: CovenantTest): string {
  if (outcome === 'met, net cash') return 'net cash: there is no ratio to carry on';
  if (outcome === 'met, no charge to cover') return 'no charge to cover: there is no ratio to carry on';
  if (tested) return 'the latest result is not above nought: there is nothing to carry on';
  return reason ?? 'the latest result has no meaning';
}

const headroomsOf = (own: readonly CovenantTest[]): readonly number[] =>
  own.flatMap(({ headroom }) => headroom.shareOfLevel?.toNumber() ?? []);

interface Coming {
  readonly testDate: PlainDate;
  readonly quarters: Horizon;
}

function comingTests({ firstTestOn, everyMonths }: Covenant, from: PlainDate): readonly Coming[] {
  return HORIZONS.map((quarters) => ({ quarters, testDate: addMonthsToMonthEnd(from, 3 * quarters) })).filter(
    ({ testDate }) => (monthCount(testDate) - monthCount(firstTestOn)) % everyMonths === 0,
  );
}

function projected(covenant: Covenant, coming: Coming, from: CarriedOn, peers: PeersOfBook): TestToCome {
  const inForce = levelInForce(covenant.levels, coming.testDate);
  if (inForce.kind !== 'level')
    return {
      ...coming,
      kind: 'nothing to project',
      reason: inForce.kind === 'holiday' ? 'covenant holiday' : 'no level in force',
    };
  const { level } = inForce;
  const changes = peers(covenant.measure, coming.quarters);
  const ahead: TestAhead = { ...from, level: level.toNumber() };
  const found = changes && nextTest(changes, ahead);
  if (!changes || !found?.ok) return { ...coming, kind: 'too few peers', level };
  const { notMet, share, n, borrowers } = found.value;
  const word = projectionWord(share);
  return {
    ...coming,
    kind: 'projected',
    level,
    word,
    notMet,
    share,
    n,
    borrowers,
    peers: found.value.peers,
    check: chanceFromOwnTests(from.headrooms, {
      ...from,
      level: from.levelNow,
      levelAhead: ahead.level,
      quarters: coming.quarters,
    }),
    openAt: word === 'likely' ? ratioNotLikely(changes, ahead) : null,
  };
}
