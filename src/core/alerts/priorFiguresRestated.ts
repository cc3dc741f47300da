import { formatDay } from '../calendar/printDay.ts';
import type { Outcome } from '../covenants/covenantTest.ts';
import { shownOutcome } from '../covenants/rights.ts';
import { OURS } from '../covenants/wording.ts';
import { MEASURES } from '../measures/index.ts';
import { formatMoney, formatShare, formatShareLevel } from '../money/print.ts';
import type { Policy } from '../policy.ts';
import { restatementsOf, type EarningsMove, type OutcomeMove, type Restatement } from './restatements.ts';
import type { AlertContext, AlertRule } from './rule.ts';

/**
 * A later version moved EBITDA of twelve months by more than the policy's share, or any past outcome: soon.
 *
 * @example priorFiguresRestated(nightOf({ ebitda: 12, debt: 45, cash: 6 })) // => []
 */
export const priorFiguresRestated: AlertRule = (context) =>
  restatementsOf(context).flatMap((restatement) => {
    const { restatedBy } = context.policy;
    const moved = restatement.earnings.filter(({ change }) => change === null || change.abs().gt(restatedBy));
    const largest = moved.reduce<EarningsMove | null>(
      (most, one) => (most && isLarger(most, one) ? most : one),
      null,
    );
    if (!largest && restatement.outcomes.length === 0) return [];
    return [
      {
        kind: 'prior figures restated',
        covenantId: null,
        severity: 'soon',
        factDate: restatement.receivedOn,
        sentence: sentenceOf(largest, restatement.outcomes),
        wouldChange: wouldChange(largest, context.policy),
        evidence: evidenceOf(restatement, context),
      },
    ];
  });

const isLarger = (one: EarningsMove, other: EarningsMove): boolean =>
  one.change === null || (other.change !== null && one.change.abs().gte(other.change.abs()));

const moveInWords = ({ before, after, change }: EarningsMove): string =>
  `${formatMoney(before, { beside: after })} to ${formatMoney(after, { beside: before })}${change ? ` (${formatShare(change)})` : ''}`;

function sentenceOf(largest: EarningsMove | null, outcomes: readonly OutcomeMove[]): string {
  const earnings = largest
    ? `EBITDA of twelve months to ${formatDay(largest.periodEnd)} restated from ${moveInWords(largest)}`
    : 'Prior figures restated';
  if (outcomes.length === 0) return `${earnings}.`;
  return `${earnings}; ${outcomes.length === 1 ? 'one past outcome changes' : `${outcomes.length} past outcomes change`}.`;
}

const wouldChange = (largest: EarningsMove | null, { restatedBy }: Policy): string =>
  largest
    ? `EBITDA within ${formatShareLevel(restatedBy)} of ${formatMoney(largest.before)}, and no past outcome changed.`
    : 'No past outcome changed: 0 instead of 1 or more.';

function evidenceOf({ receivedOn, earnings, outcomes }: Restatement, { inputs }: AlertContext) {
  return [
    { label: 'Received on', value: formatDay(receivedOn) },
    ...earnings.map((move) => ({
      label: `EBITDA to ${formatDay(move.periodEnd)}`,
      value: moveInWords(move),
    })),
    ...outcomes.map(({ covenantId, testDate, before, after }) => {
      const covenant = inputs.covenants.find(({ id }) => id === covenantId);
      const label = covenant ? MEASURES[covenant.measure].label : 'Test';
      const said = (outcome: Outcome) => (covenant ? shownOutcome(covenant, outcome) : outcome);
      return {
        label: `${label}${covenant?.isOurs ? `, ${OURS},` : ''} on ${formatDay(testDate)}`,
        value: `${said(before)}, after restatement ${said(after)}`,
      };
    }),
  ];
}
