import { PUT_OFF_MOST_TIMES, type AlertStep } from '../../contracts/alerts.ts';
import type { AlertState, Severity } from '../../core/alerts/alert.ts';

interface WorkedAlert {
  readonly state: AlertState;
  readonly severity: Severity;
  readonly putOffCount: number;
  /** A watchlist proposal that carries this alert waits for a decision. */
  readonly proposalWaits: boolean;
}

/** What no new proposal can carry: it has ended, or waits for somebody's word already. */
export const NOT_CARRIED: readonly AlertState[] = [
  'closed',
  'superseded',
  'closing to be confirmed',
  'carried into a proposal',
];

/** Why nobody may take this step on the alert as it is; null where its owner may. */
export function hindrance(step: AlertStep['step'], alert: WorkedAlert): string | null {
  const { state } = alert;
  if (state === 'closed' || state === 'superseded') return `This alert is ${state}.`;
  if (state === 'closing to be confirmed') return 'The closing of this alert waits for a second person.';
  if (state === 'carried into a proposal') {
    if (alert.proposalWaits) return 'The watchlist proposal that carries this alert waits for a decision.';
    return step === 'close'
      ? null
      : 'This alert was carried into a watchlist proposal; it can only be closed.';
  }
  if (step === 'take' && state !== 'raised' && state !== 'put off') return `This alert is ${state} already.`;
  if (step !== 'put off') return null;
  if (alert.severity === 'urgent') return 'An urgent alert cannot be put off.';
  return alert.putOffCount >= PUT_OFF_MOST_TIMES
    ? `This alert was put off ${PUT_OFF_MOST_TIMES} times already.`
    : null;
}
