import type { CovenantTest } from '../covenants/covenantTest.ts';
import { latestLiveTest } from '../covenants/latestLiveTest.ts';
import type { ReportingQuality } from '../quality/score.ts';
import type { AlertKind } from './alert.ts';

const NEEDS_A_SCORE: readonly AlertKind[] = ['reporting quality fell', 'reporting quality weak'];

/**
 * Whether the figures leave open if the condition of an alert still holds: no score for what speaks of quality; a
 * latest test that cannot be made, or no test with figures at all, for what speaks of a covenant. An alert is closed
 * only by figures that say that its condition is gone, never by figures that say nothing.
 *
 * `tests` are oldest first within a covenant. A holiday, or a covenant that is no more, leaves nothing open.
 *
 * @example leavesOpen({ tests: [test], quality: buildQuality() })('thin headroom', 1) // => false
 * @example leavesOpen({ tests: [test], quality: buildQuality() })('reporting quality weak', null) // => true
 */
export const leavesOpen =
  ({
    tests,
    quality,
  }: {
    readonly tests: readonly CovenantTest[];
    readonly quality: Pick<ReportingQuality, 'headline'>;
  }) =>
  (kind: AlertKind, covenantId: number | null): boolean => {
    if (NEEDS_A_SCORE.includes(kind)) return quality.headline === null;
    const newest = tests.findLast((test) => test.covenantId === covenantId);
    if (covenantId === null || !newest || newest.outcome === 'not tested') return false;
    const live = latestLiveTest(tests, covenantId);
    return live === null || live.outcome === 'cannot be tested';
  };
