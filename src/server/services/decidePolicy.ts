import type { Transaction } from 'sequelize';
import type { PolicyDecision } from '../../contracts/policy.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { changedPolicy } from '../../core/policySettings.ts';
import { err, ok } from '../../core/result.ts';
import { mayAnywhere } from '../auth/policy.ts';
import { insertPolicyVersion, latestPolicy } from '../db/repositories/policies.ts';
import {
  findPolicyProposalForUpdate,
  type PolicyProposalRecord,
} from '../db/repositories/policyProposals.ts';
import { decideProposal, withdrawProposal } from '../db/repositories/proposals.ts';
import type { PersonActor } from './actor.ts';
import { lenderDay } from './lenderDay.ts';
import { earliestChange } from './policyDays.ts';
import { readPolicyProposal, type StoredPolicyProposal } from './policyRows.ts';
import { changedNames } from './proposePolicy.ts';
import { whyNotDecided } from './whyNotDecided.ts';
import { audit, write, type Outcome } from './write.ts';

interface Decided {
  readonly id: number;
  readonly state: 'approved' | 'declined';
  /** The version of the policy that it made. */
  readonly policyVersion: number | null;
}

/** The second person's word. The UPDATE itself refuses the proposer; what follows here only says why. */
export function decidePolicy(
  actor: PersonActor,
  request: { id: number; version: number },
  decision: PolicyDecision,
): Promise<Outcome<Decided>> {
  const state = decision.decision === 'confirm' ? 'approved' : 'declined';
  return write(actor, 'decide-policy', { ...request, decision }, async (tx) => {
    const proposal = await findPolicyProposalForUpdate(tx, request.id);
    if (!proposal) return err({ kind: 'not-found', what: 'proposal' });
    if (!mayAnywhere(actor.person, 'confirm policy'))
      return err({
        kind: 'not-allowed',
        detail: 'Only a committee member decides on a change of the policy. Nothing was changed.',
      });
    const decided = await decideProposal(tx, {
      ...request,
      state,
      decidedBy: actor.person.id,
      text: decision.text,
      now: actor.now,
    });
    if (!decided) return whyNotDecided(proposal, request.version, actor.person.id);

    const applied =
      state === 'approved'
        ? await apply(tx, actor, proposal, readPolicyProposal(proposal.content))
        : ok({ policyVersion: null, summary: 'Declined the change of the policy' });
    if (!applied.ok) return applied;
    await audit(tx, actor, {
      action: 'decide-policy',
      subjectKind: 'proposal',
      subjectId: String(proposal.id),
      borrowerId: null,
      deskId: null,
      summary: `${applied.value.summary}, proposed by ${proposal.proposedBy}`,
      before: { state: proposal.state },
      after: { state, text: decision.text, policyVersion: applied.value.policyVersion },
    });
    return ok({ id: proposal.id, state, policyVersion: applied.value.policyVersion });
  });
}

/** A new row: no earlier version is touched, so that every result keeps the one it was computed with. */
async function apply(
  tx: Transaction,
  actor: PersonActor,
  proposal: PolicyProposalRecord,
  content: StoredPolicyProposal,
): Promise<Outcome<{ readonly policyVersion: number; readonly summary: string }>> {
  const latest = await latestPolicy(tx);
  if (content.from !== latest.policy.version)
    return err({
      kind: 'conflict',
      detail: `This starts from policy version ${content.from}, and version ${latest.policy.version} has been confirmed since. Nothing was changed. Decline it and have it proposed again.`,
    });
  const earliest = earliestChange(await lenderDay(tx, actor.now), latest.validFrom);
  if (content.validFrom < earliest)
    return err({
      kind: 'conflict',
      detail: `It was to hold from ${formatDay(content.validFrom)}, and the first day on which a change may still hold is ${formatDay(earliest)}. Nothing was changed. Decline it and have it proposed again with a later day.`,
    });
  const policy = {
    ...changedPolicy(latest.policy, content.values),
    version: latest.policy.version + 1,
  };
  await insertPolicyVersion(tx, {
    policy,
    validFrom: content.validFrom,
    proposalId: proposal.id,
    proposedBy: proposal.proposedById,
    confirmedBy: actor.person.id,
    now: actor.now,
  });
  return ok({
    policyVersion: policy.version,
    summary: `Confirmed policy version ${policy.version} from ${formatDay(content.validFrom)}: ${changedNames(latest.policy, policy)}`,
  });
}

export function withdrawPolicy(
  actor: PersonActor,
  request: { id: number; version: number },
): Promise<Outcome<{ id: number }>> {
  return write(actor, 'withdraw-policy', request, async (tx) => {
    const proposal = await findPolicyProposalForUpdate(tx, request.id);
    if (!proposal) return err({ kind: 'not-found', what: 'proposal' });
    if (proposal.proposedById !== actor.person.id)
      return err({
        kind: 'not-allowed',
        detail: 'Only the person who proposed this can withdraw it. Nothing was changed.',
      });
    if (!(await withdrawProposal(tx, { ...request, personId: actor.person.id })))
      return whyNotDecided(proposal, request.version, null);
    await audit(tx, actor, {
      action: 'withdraw-policy',
      subjectKind: 'proposal',
      subjectId: String(proposal.id),
      borrowerId: null,
      deskId: null,
      summary: 'Withdrew the change of the policy',
      before: { state: proposal.state },
      after: { state: 'withdrawn' },
    });
    return ok({ id: proposal.id });
  });
}
