import type { Covenant } from '../covenants/covenant.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { saidOf } from '../covenants/wording.ts';
import { MEASURES } from '../measures/index.ts';
import { formatMoney, formatShare, formatShareLevel } from '../money/print.ts';
import type { Policy } from '../policy.ts';
import { amountThatLeaves, insteadOf } from './neededAmount.ts';
import { liveTests, severityOn, type AlertRule } from './rule.ts';
import { testEvidence } from './testEvidence.ts';

/**
 * The latest live test is met and earnings (or the tested amount) may fall less than the policy's share: soon.
 *
 * @example thinHeadroom(nightOf({ ebitda: 12, debt: 45, cash: 6 })).map(({ severity }) => severity) // => ['soon']
 */
export const thinHeadroom: AlertRule = (context) =>
  liveTests(context)
    .filter(({ test }) => test.outcome === 'met, thin')
    .map(({ covenant, test }) => ({
      kind: 'thin headroom',
      covenantId: covenant.id,
      severity: severityOn(covenant, 'soon'),
      factDate: test.testDate,
      sentence: sentenceOf(covenant, test, context.policy),
      wouldChange: wouldChange(test, context.policy),
      evidence: testEvidence(covenant, test),
    }));

function sentenceOf(covenant: Covenant, test: CovenantTest, { thinBelow }: Policy): string {
  const { mayFall, moneyLeft } = test.headroom;
  if (mayFall?.lt(0)) return `${saidOf(covenant, test)}: met only as the agreement rounds.`;
  const share = mayFall ? formatShare(mayFall, { beside: thinBelow }) : 'nothing';
  const money = moneyLeft ? ` (${formatMoney(moneyLeft)})` : '';
  const { subject, room } = MEASURES[test.measure].words;
  return `${saidOf(covenant, test)}. ${subject} ${room?.may ?? 'may fall'} ${share}${money}.`;
}

function wouldChange(test: CovenantTest, { thinBelow }: Policy): string {
  const needed = test.level && amountThatLeaves(test, test.level, thinBelow);
  const left = `leaves ${formatShareLevel(thinBelow)}`;
  return needed ? `${insteadOf(test, needed)} ${left}.` : `A result that ${left}.`;
}
