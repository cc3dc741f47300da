import { formatDay } from '../calendar/printDay.ts';
import type { Covenant } from '../covenants/covenant.ts';
import { isMet, type CovenantTest } from '../covenants/covenantTest.ts';
import { triggerWords } from '../covenants/rights.ts';
import { levelInWords, OPERATOR_WORDS, saidOf, testedInWords } from '../covenants/wording.ts';
import { amountAtLevel } from '../covenants/headroom.ts';
import { MEASURES } from '../measures/index.ts';
import { decimal } from '../money/decimal.ts';
import { formatShare } from '../money/print.ts';
import type { ProjectedTest, Projection, TestToCome } from '../outlook/projection.ts';
import { printOften } from '../outlook/projectionWord.ts';
import { insteadOf } from './neededAmount.ts';
import { liveTests, severityOn, type AlertContext, type AlertRule } from './rule.ts';
import { testEvidence } from './testEvidence.ts';

/**
 * The latest live test is met and one of the next four is likely not to be, by at least 30 changes of the peers: soon.
 * The nearest such test speaks. How often, never why.
 *
 * @example headroomShrinking(nightOf({ ebitda: 12, debt: 45, cash: 6 })) // => []
 */
export const headroomShrinking: AlertRule = (context) =>
  liveTests(context).flatMap(({ covenant, test }) => {
    const coming = isMet(test.outcome) && likelyTest(context, covenant);
    if (!coming) return [];
    const { quarters, testDate, level, share, n, borrowers, peers, check } = coming;
    const limit = `${OPERATOR_WORDS[test.operator]} ${levelInWords(test.measure, level)}`;
    const failing = covenant.isOurs ? triggerWords(covenant.operator) : 'not met';
    const often = formatShare(decimal(share), { places: 0, beside: decimal('0.66') });
    return [
      {
        kind: 'headroom shrinking',
        covenantId: covenant.id,
        severity: severityOn(covenant, 'soon'),
        factDate: test.testDate,
        sentence: `${saidOf(covenant, test)}. Likely ${failing} on ${formatDay(testDate)} (${limit}): so in ${often} of ${n} peer changes over ${quartersInWords(quarters)}.`,
        wouldChange: wouldChange(test, coming),
        evidence: [
          ...testEvidence(covenant, test),
          { label: 'Test to come', value: `${formatDay(testDate)}, ${limit}` },
          {
            label: `${covenant.isOurs ? 'Past it' : 'Not met'} in`,
            value: `${coming.notMet} of ${n} peer changes, ${borrowers} borrowers`,
          },
          { label: 'Peers', value: peers === 'book' ? 'the whole book' : peers },
          ...(check === null ? [] : [{ label: 'By its own tests alone', value: printOften(check) }]),
        ],
      },
    ];
  });

const quartersInWords = (quarters: number): string =>
  quarters === 1 ? 'one quarter' : `${quarters} quarters`;

const likelyTest = (
  { projections }: AlertContext,
  { id }: Covenant,
): (TestToCome & ProjectedTest) | undefined =>
  projections.find(({ covenantId }) => covenantId === id)?.tests.find(isLikely);

const isLikely = (test: Projection['tests'][number]): test is TestToCome & ProjectedTest =>
  test.kind === 'projected' && test.word === 'likely';

/** The result, and the earnings behind it, at which the coming test would be open. */
function wouldChange(test: CovenantTest, { openAt }: ProjectedTest): string {
  if (openAt === null) return 'No result of the borrower’s: the peers’ changes alone lead there.';
  const result = decimal(openAt);
  const { numerator, denominator, measure } = test;
  const needed = numerator && amountAtLevel(MEASURES[measure].shape, { numerator, denominator }, result);
  const at = `${testedInWords(measure, result, test.tested)}: the coming test would be open`;
  return needed && denominator ? `${insteadOf(test, needed)}, a result of ${at}.` : `A result of ${at}.`;
}
