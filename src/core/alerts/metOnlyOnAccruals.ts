import { isMet, isNotMet, type Counterfactual, type CovenantTest } from '../covenants/covenantTest.ts';
import { saidOf, testedInWords } from '../covenants/wording.ts';
import { ZERO } from '../money/decimal.ts';
import { formatMoney } from '../money/print.ts';
import { amountThatLeaves, subjectAmount } from './neededAmount.ts';
import { liveTests, severityOn, type AlertRule } from './rule.ts';
import { testEvidence } from './testEvidence.ts';

/**
 * The latest live test is met, and would not have been met without the accruals that the peers do not show: soon. An
 * observation on the figures, never a finding of misconduct. Source: methods.md B7 (b).
 *
 * @example metOnlyOnAccruals(nightOf({ ebitda: 12, debt: 45, cash: 6 })) // => []
 */
export const metOnlyOnAccruals: AlertRule = (context) =>
  liveTests(context).flatMap(({ covenant, test }) => {
    const without = test.counterfactuals.find(
      ({ kind, outcome }) => kind === 'without unexplained accruals' && isNotMet(outcome),
    );
    if (!without || !isMet(test.outcome)) return [];
    return [
      {
        kind: 'met only on accruals',
        covenantId: covenant.id,
        severity: severityOn(covenant, 'soon'),
        factDate: test.testDate,
        sentence: `${saidOf(covenant, test)}; ${resultOf(test, without)} without ${formatMoney(without.earningsTakenOut)} of accruals that the peers do not show: would not have been met.`,
        wouldChange: wouldChange(test, without),
        evidence: [
          ...testEvidence(covenant, test),
          { label: 'Accruals that the peers do not show', value: formatMoney(without.earningsTakenOut) },
          { label: 'Without them', value: `${resultOf(test, without)}: would not have been met` },
        ],
      },
    ];
  });

const resultOf = ({ measure, level }: CovenantTest, { ratio }: Counterfactual): string =>
  ratio ? testedInWords(measure, ratio, level) : 'no ratio';

function wouldChange(test: CovenantTest, { earningsTakenOut }: Counterfactual): string {
  const needed = test.level && amountThatLeaves(test, test.level, ZERO);
  const before = subjectAmount(test)?.minus(earningsTakenOut);
  if (!needed || !before) return 'Earnings that meet the level without these accruals.';
  return `EBITDA without these accruals of ${formatMoney(needed, { beside: before })} instead of ${formatMoney(before, { beside: needed })}.`;
}
