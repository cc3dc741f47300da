import { isMet, type CovenantTest } from '../covenants/covenantTest.ts';
import { latestLiveTest } from '../covenants/latestLiveTest.ts';
import type { Projection } from '../outlook/projection.ts';
import type { ReportingQuality } from '../quality/score.ts';
import type { AlertKind } from './alert.ts';

const NEEDS_A_SCORE: readonly AlertKind[] = ['reporting quality fell', 'reporting quality weak'];

/**
 * Whether the figures leave open if the condition of an alert still holds: no score for what speaks of quality; a
 * latest test that cannot be made, or no test with figures at all, for what speaks of a covenant; accruals that
 * were not computed, for what speaks of them; too few peers for what speaks of tests to come. An alert is closed only
 * by figures that say that its condition is gone, never by figures that say nothing.
 *
 * `tests` are oldest first within a covenant. A holiday, or a covenant that is no more, leaves nothing open.
 *
 * @example leavesOpen({ tests: [test], quality: buildQuality(), projections: [] })('thin headroom', 1) // => false
 * @example leavesOpen({ tests: [test], quality: buildQuality(), projections: [] })('reporting quality weak', null) // => true
 */
export const leavesOpen =
  ({
    tests,
    quality,
    projections,
  }: {
    readonly tests: readonly CovenantTest[];
    readonly quality: Pick<ReportingQuality, 'headline'>;
    readonly projections: readonly Projection[];
  }) =>
  (kind: AlertKind, covenantId: number | null): boolean => {
    if (NEEDS_A_SCORE.includes(kind)) return quality.headline === null;
    const newest = tests.findLast((test) => test.covenantId === covenantId);
    if (covenantId === null || !newest || newest.outcome === 'not tested') return false;
    const live = latestLiveTest(tests, covenantId);
    if (live === null || live.outcome === 'cannot be tested') return true;
    if (kind === 'met only on accruals') return isMet(live.outcome) && !isHeldAgainstAccruals(live);
    return kind === 'headroom shrinking' && isWithoutPeers(projections, covenantId);
  };

const isHeldAgainstAccruals = ({ counterfactuals }: CovenantTest): boolean =>
  counterfactuals.some(({ kind }) => kind === 'without unexplained accruals');

/** Something is to be projected, and nothing of it can be. */
function isWithoutPeers(projections: readonly Projection[], covenantId: number): boolean {
  const tests = projections.find((projection) => projection.covenantId === covenantId)?.tests ?? [];
  return (
    tests.some(({ kind }) => kind === 'too few peers') && !tests.some(({ kind }) => kind === 'projected')
  );
}
