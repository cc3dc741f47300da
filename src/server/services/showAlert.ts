import { z } from 'zod';
import type { AlertDetail, AlertStep, AlertSteps } from '../../contracts/alerts.ts';
import { CLOSING_REASONS, type AlertState, type Severity } from '../../core/alerts/alert.ts';
import { err, ok } from '../../core/result.ts';
import type { Transaction } from 'sequelize';
import { deskScope, may } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findAlert, listAlertEvents, type AlertListRecord } from '../db/repositories/alertLists.ts';
import { actsFor } from '../db/repositories/borrowerDesks.ts';
import { findCurrentAssessment } from '../db/repositories/assessments.ts';
import { findWaitingProposal } from '../db/repositories/proposals.ts';
import { standingEntry } from '../db/repositories/watchlist.ts';
import type { PersonActor } from './actor.ts';
import { hindrance, NOT_CARRIED } from './alertHindrance.ts';
import { lenderDay } from './lenderDay.ts';
import { movementsOf } from './movementViews.ts';
import { withStrips } from './listAlerts.ts';
import { isSecondPerson } from './workAlert.ts';
import type { Outcome } from './write.ts';

const storedEvidence = z.array(z.object({ label: z.string(), value: z.string() }));

/** One alert with its evidence, its history and the steps this person may take. */
export function showAlert(actor: PersonActor, id: number): Promise<Outcome<AlertDetail>> {
  return inTransaction(async (tx) => {
    const record = await findAlert(tx, id, deskScope(actor.person, 'read borrower'));
    if (!record) return err({ kind: 'not-found', what: 'alert' });
    const [row] = await withStrips(tx, [record], actor.now);
    if (!row) throw new Error('one record gives one row');
    const standing = await standingEntry(tx, record.borrowerId);
    const waiting = await findWaitingProposal(tx, record.borrowerId);
    const reason = CLOSING_REASONS.find((listed) => listed.code === record.closingReason);
    return ok({
      ...row,
      covenantId: record.covenantId,
      factDate: record.factDate,
      wouldChange: record.wouldChange,
      evidence: storedEvidence.parse(JSON.parse(record.evidence)),
      movements: await movementsOfAlert(tx, record),
      events: (await listAlertEvents(tx, id)).map((event) => ({
        at: event.at.toISOString(),
        who: event.who ?? 'Underkeel',
        what: event.what,
        text: event.text,
      })),
      closing: reason
        ? { reason: reason.label, text: record.closingText ?? '', by: record.closedBy ?? '' }
        : null,
      steps: await stepsFor(tx, actor, record, { onWatchlist: standing !== null, waiting }),
      onWatchlist: standing !== null,
      proposalWaiting: waiting !== null,
    });
  });
}

/** Of the result that stands now; an alert that nothing moved has none. */
async function movementsOfAlert(
  tx: Transaction,
  { borrowerId, kind, covenantId }: AlertListRecord,
): Promise<AlertDetail['movements']> {
  const stored = await findCurrentAssessment(tx, borrowerId);
  const movements =
    stored &&
    (await movementsOf(
      tx,
      borrowerId,
      stored,
      (subject) => subject.kind === 'alert' && subject.alert === kind && subject.covenantId === covenantId,
    ));
  return movements && movements.rows.length > 0 ? movements : null;
}

async function stepsFor(
  tx: Transaction,
  actor: PersonActor,
  record: AlertListRecord,
  watch: { onWatchlist: boolean; waiting: { alertId: number | null } | null },
): Promise<AlertSteps> {
  const { person } = actor;
  const alert = {
    state: record.state as AlertState,
    severity: record.severity as Severity,
    putOffCount: record.putOffCount,
    proposalWaits: watch.waiting?.alertId === record.id,
  };
  const today = await lenderDay(tx, actor.now);
  const owns =
    may(person, 'work an alert', record.deskId) &&
    (await actsFor(tx, person.id, today)).includes(record.ownerId);
  const mayStep = (step: AlertStep['step']) => owns && hindrance(step, alert) === null;
  return {
    take: mayStep('take'),
    work: mayStep('assess'),
    putOff: mayStep('put off'),
    close: mayStep('close'),
    handOver: alert.state === 'waiting for analyst' && may(person, 'hand over an alert', record.deskId),
    confirmClosing:
      alert.state === 'closing to be confirmed' &&
      may(person, 'confirm a closing', record.deskId) &&
      isSecondPerson(person, record) &&
      record.closedById !== person.id,
    propose:
      !watch.onWatchlist &&
      !watch.waiting &&
      may(person, 'propose', record.deskId) &&
      !NOT_CARRIED.includes(alert.state),
  };
}
