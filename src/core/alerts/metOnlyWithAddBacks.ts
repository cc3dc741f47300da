import { isMet, isNotMet, type Counterfactual, type CovenantTest } from '../covenants/covenantTest.ts';
import { OPERATOR_WORDS, OUR_TRIGGER, levelInWords, testedInWords } from '../covenants/wording.ts';
import { MEASURES } from '../measures/index.ts';
import { ZERO } from '../money/decimal.ts';
import { formatMoney, formatShare } from '../money/print.ts';
import { amountThatLeaves, subjectAmount } from './neededAmount.ts';
import { liveTests, severityOn, type AlertRule } from './rule.ts';
import { testEvidence } from './testEvidence.ts';

/**
 * The latest live test is met, and would not have been met without the add-backs: soon.
 *
 * @example metOnlyWithAddBacks(nightOf({ ebitda: 11, debt: 45, cash: 6 }, { addBacks: [buildAddBack('2026-09-30', 2)] })).map(({ severity }) => severity) // => ['soon']
 */
export const metOnlyWithAddBacks: AlertRule = (context) =>
  liveTests(context).flatMap(({ covenant, test }) => {
    const without = test.counterfactuals.find(
      ({ kind, outcome }) => kind === 'without add-backs' && isNotMet(outcome),
    );
    if (!without || !isMet(test.outcome)) return [];
    return [
      {
        kind: 'met only with add-backs',
        covenantId: covenant.id,
        severity: severityOn(covenant, 'soon'),
        factDate: test.testDate,
        sentence: `${covenant.isOurs ? `${OUR_TRIGGER}: ` : ''}${sentenceOf(test, without)}`,
        wouldChange: wouldChange(test, without),
        evidence: [
          ...testEvidence(covenant, test),
          { label: 'Add-backs taken', value: formatMoney(without.earningsTakenOut) },
          { label: 'Without add-backs', value: `${resultOf(test, without)}: would not have been met` },
          ...(without.breakEvenShare
            ? [{ label: 'Add-backs needed', value: formatShare(without.breakEvenShare) }]
            : []),
        ],
      },
    ];
  });

const resultOf = ({ measure, level }: CovenantTest, { ratio }: Counterfactual): string =>
  ratio ? testedInWords(measure, ratio, level) : 'no ratio';

function sentenceOf(test: CovenantTest, without: Counterfactual): string {
  const { measure, tested, level, operator } = test;
  const reported = tested ? testedInWords(measure, tested, level) : 'no ratio';
  const limit = level ? `, ${OPERATOR_WORDS[operator]} ${levelInWords(measure, level)}` : '';
  const share = without.breakEvenShare
    ? ` Needs at least ${formatShare(without.breakEvenShare)} of the add-backs.`
    : '';
  return `${MEASURES[measure].label} ${reported} as reported${limit}; ${resultOf(test, without)} without ${formatMoney(without.earningsTakenOut)} of add-backs: would not have been met.${share}`;
}

function wouldChange(test: CovenantTest, { earningsTakenOut }: Counterfactual): string {
  const needed = test.level && amountThatLeaves(test, test.level, ZERO);
  const before = subjectAmount(test)?.minus(earningsTakenOut);
  if (!needed || !before) return 'Earnings that meet the level without add-backs.';
  return `EBITDA before add-backs of ${formatMoney(needed, { beside: before })} instead of ${formatMoney(before, { beside: needed })}.`;
}
