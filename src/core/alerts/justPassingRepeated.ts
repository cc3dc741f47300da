import { formatDay } from '../calendar/printDay.ts';
import { isMaximum } from '../covenants/covenant.ts';
import { isMet, isNotMet, type CounterfactualKind, type CovenantTest } from '../covenants/covenantTest.ts';
import { testedInWords, testInWords } from '../covenants/wording.ts';
import { formatShareLevel } from '../money/print.ts';
import type { JustPassing } from '../patterns/justPassing.ts';
import type { Policy } from '../policy.ts';
import { nearLineFacts, nearLineSentence } from '../patterns/patternWording.ts';
import type { AlertFinding } from './alert.ts';
import { liveTests, type AlertContext, type AlertRule } from './rule.ts';
import { testEvidence } from './testEvidence.ts';

/**
 * So many of the last tests ended just passing: an observation, k of n, nothing about chance. A note; soon where
 * the latest test is met only with add-backs or on accruals, or the reporting quality is below the policy's line.
 *
 * @example justPassingRepeated({ ...nightOf({ ebitda: 12, debt: 47.5, cash: 6 }), patterns: [{ covenantId: 1, inBand: 3, ofLast: 6, run: 1, testDates: ['2026-09-30'] }] }).map(({ severity }) => severity) // => ['note']
 */
export const justPassingRepeated: AlertRule = (context) =>
  liveTests(context).flatMap(({ covenant, test }) => {
    // A borrower does not know the desk's own trigger, so it cannot end just inside it.
    if (covenant.isOurs) return [];
    const pattern = context.patterns.find(({ covenantId }) => covenantId === covenant.id);
    const lastInBand = pattern?.testDates.at(-1);
    if (!pattern || !lastInBand || pattern.inBand < context.policy.repeated.atLeast) return [];
    return [
      {
        kind: 'just passing, repeated',
        covenantId: covenant.id,
        severity: isLeaning(test, context) ? 'soon' : 'note',
        factDate: lastInBand,
        sentence: `${testInWords(test)}. ${countInWords(pattern)}`,
        wouldChange: wouldChange(test, context.policy),
        evidence: [
          { label: 'Just passing', value: `${pattern.inBand} of the last ${pattern.ofLast} tests` },
          { label: 'On', value: pattern.testDates.map(formatDay).join(', ') },
          ...nearLineOf(covenant.id, context),
          ...testEvidence(covenant, test),
        ],
      },
    ];
  });

/** What the whole book says of it, where it may say anything: added to the observation, never in place of it. */
function nearLineOf(id: number, { nearLine }: AlertContext): AlertFinding['evidence'] {
  const figures = nearLine.find(({ covenantId }) => covenantId === id)?.figures;
  if (!figures?.isPublished) return [];
  return [{ label: 'Pattern', value: nearLineSentence(figures) }, ...nearLineFacts(figures)];
}

const LEANING: readonly CounterfactualKind[] = ['without add-backs', 'without unexplained accruals'];

function isLeaning({ counterfactuals, outcome }: CovenantTest, { quality, policy }: AlertContext): boolean {
  const rests =
    isMet(outcome) && counterfactuals.some((one) => LEANING.includes(one.kind) && isNotMet(one.outcome));
  return rests || (quality.headline !== null && quality.headline < policy.repeated.weakBelow);
}

const ORDINALS = [
  '',
  '',
  'Second',
  'Third',
  'Fourth',
  'Fifth',
  'Sixth',
  'Seventh',
  'Eighth',
  'Ninth',
  'Tenth',
];

function countInWords({ inBand, ofLast, run }: JustPassing): string {
  const count = `${inBand} of the last ${ofLast}`;
  if (run < 2) return `${count} tests just passing.`;
  const ordinal = ORDINALS[run];
  return `${ordinal ? `${ordinal} test` : `${run} tests`} in a row just passing, ${count}.`;
}

function wouldChange({ measure, operator, level }: CovenantTest, { justPassingBand: band }: Policy): string {
  const share = formatShareLevel(band);
  if (!level) return `Results ${share} of the level or more away from it.`;
  const edge = isMaximum(operator) ? level.minus(level.times(band)) : level.plus(level.times(band));
  return `Next tests at ${testedInWords(measure, edge, level)} or ${isMaximum(operator) ? 'less' : 'more'}, ${share} from the level.`;
}
