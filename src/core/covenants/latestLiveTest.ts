import { isMet, isShort, type CovenantTest } from './covenantTest.ts';

/**
 * Whether a test has a result: met or not met, in whichever form, cured or held against our own trigger.
 *
 * @example hasResult({ outcome: 'awaiting figures' }) // => false
 */
export const hasResult = ({ outcome }: Pick<CovenantTest, 'outcome'>): boolean =>
  isMet(outcome) || isShort(outcome);

/**
 * The latest test of one covenant that stands: the newest one whose figures are there. Null where there is none or
 * where it is not tested (a holiday), because then the covenant holds nobody to anything.
 *
 * @example latestLiveTest([test], 1)?.outcome // => 'met'
 */
export function latestLiveTest(tests: readonly CovenantTest[], covenantId: number): CovenantTest | null {
  const latest = tests
    .filter((test) => test.covenantId === covenantId && test.outcome !== 'awaiting figures')
    .reduce<CovenantTest | null>(
      (newest, test) => (newest && newest.testDate > test.testDate ? newest : test),
      null,
    );
  return latest && latest.outcome !== 'not tested' ? latest : null;
}
