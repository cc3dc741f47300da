import { addDays, daysBetween } from '../calendar/plainDate.ts';
import { formatDay } from '../calendar/printDay.ts';
import { isMet, isNotMet } from '../covenants/covenantTest.ts';
import { triggerWords } from '../covenants/rights.ts';
import { levelInWords, OPERATOR_WORDS, saidOf, testedInWords } from '../covenants/wording.ts';
import { ZERO } from '../money/decimal.ts';
import { amountThatLeaves, insteadOf } from './neededAmount.ts';
import { liveTests, severityOn, type AlertRule } from './rule.ts';
import { testEvidence } from './testEvidence.ts';

/**
 * Today's result is met and would not be met at a level that is agreed for the coming days: soon within the
 * policy's shorter distance, a note within the longer one. The nearest such level speaks.
 *
 * @example stepDownAhead(nightOf({ ebitda: 12, debt: 45, cash: 6 }, { levels: covenant.levels })).map(({ severity }) => severity) // => ['soon']
 */
export const stepDownAhead: AlertRule = (context) =>
  liveTests(context).flatMap(({ covenant, test }) => {
    const { soonDays, noteDays } = context.policy.stepDown;
    const ahead = test.againstLaterLevels.find(
      ({ from, outcome }) => isNotMet(outcome) && from <= addDays(context.asOf, noteDays),
    );
    if (!ahead || !isMet(test.outcome)) return [];
    const needed = amountThatLeaves(test, ahead.level, ZERO);
    const level = levelInWords(test.measure, ahead.level);
    const result = test.tested ? testedInWords(test.measure, test.tested, ahead.level) : 'today’s result';
    return [
      {
        kind: 'step-down ahead',
        covenantId: covenant.id,
        severity: severityOn(covenant, ahead.from <= addDays(context.asOf, soonDays) ? 'soon' : 'note'),
        factDate: test.testDate,
        sentence: `${saidOf(covenant, test)}. The level is ${level} from ${formatDay(ahead.from)}: ${result} ${covenant.isOurs ? `would be ${triggerWords(covenant.operator)}` : 'would not be met'}.`,
        wouldChange: needed
          ? `${insteadOf(test, needed)}.`
          : `A result of ${OPERATOR_WORDS[test.operator]} ${level}.`,
        evidence: [
          ...testEvidence(covenant, test),
          { label: 'Level ahead', value: `${OPERATOR_WORDS[test.operator]} ${level}` },
          {
            label: 'In force from',
            value: `${formatDay(ahead.from)}${inDays(daysBetween(context.asOf, ahead.from))}`,
          },
        ],
      },
    ];
  });

/** A level that has come into force since the test waits for the next test date. */
const inDays = (days: number): string => (days > 0 ? `, in ${days} days` : ', in force for the next test');
