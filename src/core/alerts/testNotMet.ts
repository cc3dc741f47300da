import { isNotMet, type CovenantTest } from '../covenants/covenantTest.ts';
import { formatDay } from '../calendar/printDay.ts';
import { ZERO } from '../money/decimal.ts';
import { levelInWords, OPERATOR_WORDS, testInWords } from '../covenants/wording.ts';
import { MEASURES } from '../measures/index.ts';
import { amountThatLeaves, insteadOf, orOtherSide } from './neededAmount.ts';
import { liveTests, type AlertRule } from './rule.ts';
import { testEvidence } from './testEvidence.ts';

/**
 * The latest live test is not met, in any form: urgent. A waiver or a cure period is said, and does not make it met.
 *
 * @example testNotMet(nightOf({ ebitda: 12, debt: 51, cash: 6 })).map(({ severity }) => severity) // => ['urgent']
 */
export const testNotMet: AlertRule = (context) =>
  liveTests(context)
    .filter(({ test }) => isNotMet(test.outcome))
    .map(({ covenant, test }) => ({
      kind: 'test not met',
      covenantId: covenant.id,
      severity: 'urgent',
      factDate: test.testDate,
      sentence: sentenceOf(test),
      wouldChange: wouldChange(test),
      evidence: testEvidence(covenant, test),
    }));

function sentenceOf(test: CovenantTest): string {
  const waived =
    test.outcome === 'not met, waived' && test.waiver
      ? ` Waived on ${formatDay(test.waiver.grantedOn)}.`
      : '';
  const inPeriod =
    test.outcome === 'not met, in cure period' && test.cure?.periodEnds
      ? ` In cure period until ${formatDay(test.cure.periodEnds)}.`
      : '';
  const why = test.tested ? '' : ` (${test.reason ?? 'no ratio'})`;
  return `${testInWords(test)}${why}: not met on our figures.${waived}${inPeriod}`;
}

function wouldChange(test: CovenantTest): string {
  const { level, operator, measure, headroom } = test;
  if (level && headroom.moneyLeft?.gte(0))
    return `${MEASURES[measure].label} ${OPERATOR_WORDS[operator]} ${levelInWords(measure, level)}, as the agreement compares.`;
  const needed = level && amountThatLeaves(test, level, ZERO);
  return needed ? `${insteadOf(test, needed)}${orOtherSide(test)}.` : 'A level above nought.';
}
