import { z } from 'zod';
import type { AlertDetail, AlertSteps } from '../../contracts/alerts.ts';
import { CLOSING_REASONS } from '../../core/alerts/alert.ts';
import { err, ok } from '../../core/result.ts';
import type { Transaction } from 'sequelize';
import { deskScope, may } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findAlert, listAlertEvents, type AlertListRecord } from '../db/repositories/alertLists.ts';
import { actsFor } from '../db/repositories/borrowerDesks.ts';
import { hasOpenProposal } from '../db/repositories/proposals.ts';
import { standingEntry } from '../db/repositories/watchlist.ts';
import type { PersonActor } from './actor.ts';
import { withStrips } from './listAlerts.ts';
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
    const proposalWaiting = await hasOpenProposal(tx, `watchlist:${record.borrowerId}`);
    const reason = CLOSING_REASONS.find((listed) => listed.code === record.closingReason);
    return ok({
      ...row,
      covenantId: record.covenantId,
      factDate: record.factDate,
      wouldChange: record.wouldChange,
      evidence: storedEvidence.parse(JSON.parse(record.evidence)),
      events: (await listAlertEvents(tx, id)).map((event) => ({
        at: event.at.toISOString(),
        who: event.who ?? 'Underkeel',
        what: event.what,
        text: event.text,
      })),
      closing: reason
        ? { reason: reason.label, text: record.closingText ?? '', by: record.closedBy ?? '' }
        : null,
      steps: await stepsFor(tx, actor, record, { onWatchlist: standing !== null, proposalWaiting }),
      onWatchlist: standing !== null,
      proposalWaiting,
    });
  });
}

async function stepsFor(
  tx: Transaction,
  actor: PersonActor,
  record: AlertListRecord,
  watch: { onWatchlist: boolean; proposalWaiting: boolean },
): Promise<AlertSteps> {
  const open = record.state !== 'closed' && record.state !== 'superseded';
  const toConfirm = record.state === 'closing to be confirmed';
  const on = actor.now.toISOString().slice(0, 10);
  const owns =
    open &&
    !toConfirm &&
    may(actor.person, 'work an alert', record.deskId) &&
    (await actsFor(tx, { personId: actor.person.id, ownerId: record.ownerId, on }));
  const isSecond = record.deskHeadId === actor.person.id || actor.person.roles.includes('committee member');
  return {
    take: owns && (record.state === 'raised' || record.state === 'put off'),
    work: owns,
    putOff: owns && record.severity !== 'urgent',
    handOver:
      record.state === 'waiting for analyst' && may(actor.person, 'hand over an alert', record.deskId),
    confirmClosing:
      toConfirm &&
      isSecond &&
      may(actor.person, 'confirm a closing', record.deskId) &&
      record.closedById !== actor.person.id,
    propose:
      open && !watch.onWatchlist && !watch.proposalWaiting && may(actor.person, 'propose', record.deskId),
  };
}
