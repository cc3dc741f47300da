import { isPastOurTrigger, type CovenantTest } from '../covenants/covenantTest.ts';
import { saidOf } from '../covenants/wording.ts';
import { ZERO } from '../money/decimal.ts';
import { amountThatLeaves, insteadOf, orOtherSide } from './neededAmount.ts';
import { liveTests, type AlertRule } from './rule.ts';
import { testEvidence } from './testEvidence.ts';

/**
 * The latest result stands on the wrong side of the desk's own trigger: soon. The trigger is ours and not in the
 * agreement, so nothing is said to be not met.
 *
 * @example pastOurTrigger(nightOf({ ebitda: 12, debt: 51, cash: 6 }, { isOurs: true })).map(({ severity }) => severity) // => ['soon']
 */
export const pastOurTrigger: AlertRule = (context) =>
  liveTests(context)
    .filter(({ test }) => isPastOurTrigger(test.outcome))
    .map(({ covenant, test }) => ({
      kind: 'past our trigger',
      covenantId: covenant.id,
      severity: 'soon',
      factDate: test.testDate,
      sentence: `${saidOf(covenant, test)}: ${test.outcome}.`,
      wouldChange: wouldChange(test),
      evidence: testEvidence(covenant, test),
    }));

function wouldChange(test: CovenantTest): string {
  const needed = test.level && amountThatLeaves(test, test.level, ZERO);
  return needed ? `${insteadOf(test, needed)}${orOtherSide(test)}.` : 'Another trigger.';
}
