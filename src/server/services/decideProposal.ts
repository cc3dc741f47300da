import { z } from 'zod';
import {
  newWatchlistProposal,
  type NewWatchlistProposal,
  type ProposalDecision,
} from '../../contracts/watchlist.ts';
import { err, ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import {
  decideProposal as decideRecord,
  findProposalForUpdate,
  withdrawProposal as withdrawRecord,
  type ProposalRecord,
} from '../db/repositories/proposals.ts';
import { findAlertForUpdate, moveAlert } from '../db/repositories/alertStates.ts';
import { changeEntry, insertEntry, standingEntry } from '../db/repositories/watchlist.ts';
import type { Transaction } from 'sequelize';
import type { PersonActor } from './actor.ts';
import { lenderDay } from './lenderDay.ts';
import { whyNotDecided } from './whyNotDecided.ts';
import { audit, write, type Outcome } from './write.ts';

const stored = z.string().transform((text) => newWatchlistProposal.parse(JSON.parse(text)));

/** The other person's word. The UPDATE itself refuses the proposer; what follows here only says why. */
export function decideProposal(
  actor: PersonActor,
  request: { id: number; version: number },
  decision: ProposalDecision,
): Promise<Outcome<{ id: number; state: 'approved' | 'declined' }>> {
  const state = decision.decision === 'approve' ? 'approved' : 'declined';
  return write(actor, 'decide-proposal', { ...request, decision }, async (tx) => {
    const proposal = await findProposalForUpdate(tx, request.id, deskScope(actor.person, 'decide'));
    if (!proposal) return err({ kind: 'not-found', what: 'proposal' });
    const decided = await decideRecord(tx, {
      ...request,
      state,
      decidedBy: actor.person.id,
      text: decision.text,
      now: actor.now,
    });
    if (!decided) return whyNotDecided(proposal, request.version, actor.person.id);

    const content = stored.parse(proposal.content);
    if (state === 'approved') {
      const applied = await apply(tx, actor, proposal, content);
      if (!applied.ok) return applied;
    } else await release(tx, actor, content, { what: 'Proposal declined', text: decision.text });
    await audit(tx, actor, {
      action: 'decide-proposal',
      subjectKind: 'proposal',
      subjectId: String(proposal.id),
      borrowerId: proposal.borrowerId,
      deskId: proposal.deskId,
      summary: `${state === 'approved' ? 'Approved' : 'Declined'}: ${proposal.borrowerName}, watchlist ${content.change} at ${content.grade}, proposed by ${proposal.proposedBy}`,
      before: { state: proposal.state },
      after: { state, text: decision.text },
    });
    return ok({ id: proposal.id, state });
  });
}

export function withdrawProposal(
  actor: PersonActor,
  request: { id: number; version: number },
): Promise<Outcome<{ id: number }>> {
  return write(actor, 'withdraw-proposal', request, async (tx) => {
    const proposal = await findProposalForUpdate(tx, request.id, deskScope(actor.person, 'propose'));
    if (!proposal) return err({ kind: 'not-found', what: 'proposal' });
    if (proposal.proposedById !== actor.person.id)
      return err({
        kind: 'not-allowed',
        detail: 'Only the person who proposed this can withdraw it. Nothing was changed.',
      });
    if (!(await withdrawRecord(tx, { ...request, personId: actor.person.id })))
      return whyNotDecided(proposal, request.version, null);
    await release(tx, actor, stored.parse(proposal.content), { what: 'Proposal withdrawn', text: '' });
    await audit(tx, actor, {
      action: 'withdraw-proposal',
      subjectKind: 'proposal',
      subjectId: String(proposal.id),
      borrowerId: proposal.borrowerId,
      deskId: proposal.deskId,
      summary: `Withdrew the watchlist proposal for ${proposal.borrowerName}`,
      before: { state: proposal.state },
      after: { state: 'withdrawn' },
    });
    return ok({ id: proposal.id });
  });
}

async function apply(
  tx: Transaction,
  actor: PersonActor,
  proposal: ProposalRecord,
  content: NewWatchlistProposal,
): Promise<Outcome<null>> {
  const terms = {
    proposalId: proposal.id,
    grade: content.grade,
    reason: content.reason,
    ownerId: content.ownerId,
    plan: content.plan,
    nextReviewOn: content.nextReviewOn,
  };
  const standing = await standingEntry(tx, proposal.borrowerId);
  if (content.change === 'entry' && !standing) {
    const enteredOn = await lenderDay(tx, actor.now);
    await insertEntry(tx, { ...terms, borrowerId: proposal.borrowerId, enteredOn });
    return ok(null);
  }
  const changed =
    standing &&
    content.change !== 'entry' &&
    (await changeEntry(tx, {
      ...terms,
      id: standing.id,
      version: standing.version,
      state: content.change === 'exit' ? 'probation' : 'active',
    }));
  if (!changed)
    return err({
      kind: 'conflict',
      detail: `${proposal.borrowerName} ${standing ? 'is on the watchlist already' : 'is no longer on the watchlist'}. Nothing was changed. Decline this proposal and have it made again.`,
    });
  return ok(null);
}

/** The alert that the proposal carried is its owner's again, as it was: taken, or waiting to be. */
async function release(
  tx: Transaction,
  actor: PersonActor,
  { alertId }: NewWatchlistProposal,
  event: { what: string; text: string },
): Promise<void> {
  const alert = alertId === null ? null : await findAlertForUpdate(tx, alertId, 'all');
  if (alert?.state !== 'carried into a proposal') return;
  const state = alert.takenBy === null ? 'raised' : 'taken';
  const moved = await moveAlert(tx, { ...event, alert, state, personId: actor.person.id, now: actor.now });
  if (!moved) throw new Error(`alert ${alert.id} was held and moved all the same`);
}
