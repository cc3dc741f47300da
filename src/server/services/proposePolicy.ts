import type { NewPolicyProposal } from '../../contracts/policy.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { changedPolicy, policyChanges, policyFaults } from '../../core/policySettings.ts';
import type { Policy } from '../../core/policy.ts';
import { err, ok } from '../../core/result.ts';
import { mayAnywhere } from '../auth/policy.ts';
import { isDuplicate } from '../db/inTransaction.ts';
import { latestPolicy } from '../db/repositories/policies.ts';
import { insertPolicyProposal } from '../db/repositories/policyProposals.ts';
import type { PersonActor } from './actor.ts';
import { lenderDay } from './lenderDay.ts';
import { earliestChange } from './policyDays.ts';
import { changeRows } from './policyRows.ts';
import { audit, write, type Outcome } from './write.ts';

/** Proposes other values for the policy from a day on; a committee member who is somebody else decides. */
export function proposePolicy(
  actor: PersonActor,
  command: NewPolicyProposal,
): Promise<Outcome<{ id: number }>> {
  return write(actor, 'propose-policy', command, async (tx) => {
    if (!mayAnywhere(actor.person, 'propose policy'))
      return err({
        kind: 'not-allowed',
        detail: 'Only an administrator proposes a change of the policy. Nothing was changed.',
      });
    const latest = await latestPolicy(tx);
    if (command.from !== latest.policy.version)
      return err({
        kind: 'stale',
        detail: `The policy is at version ${latest.policy.version}; you saw version ${command.from}. Nothing was changed. Read it again and propose from there.`,
        currentVersion: latest.policy.version,
      });
    const earliest = earliestChange(await lenderDay(tx, actor.now), latest.validFrom);
    if (command.validFrom < earliest)
      return invalid([
        {
          field: 'validFrom',
          message: `The first day on which it may hold is ${formatDay(earliest)}: a change holds for no day that is over, and not before the version that it follows.`,
        },
      ]);
    const proposed = changedPolicy(latest.policy, command.values);
    const faults = faultsOf(latest.policy, proposed);
    if (faults.length > 0) return invalid(faults);

    let id: number;
    try {
      id = await insertPolicyProposal(tx, {
        content: command,
        proposedBy: actor.person.id,
        now: actor.now,
      });
    } catch (error) {
      if (!isDuplicate(error)) throw error;
      return err({
        kind: 'conflict',
        detail:
          'A change of the policy is waiting for a decision already. Nothing was changed. Wait for the decision, or ask its proposer to withdraw it.',
      });
    }
    await audit(tx, actor, {
      action: 'propose-policy',
      subjectKind: 'proposal',
      subjectId: String(id),
      borrowerId: null,
      deskId: null,
      summary: `Proposed a change of the policy from ${formatDay(command.validFrom)}: ${changedNames(latest.policy, proposed)}`,
      before: { version: latest.policy.version },
      after: command,
    });
    return ok({ id });
  });
}

interface Fault {
  readonly field: string;
  readonly message: string;
}

function faultsOf(latest: Policy, proposed: Policy): readonly Fault[] {
  if (policyChanges(latest, proposed).length === 0)
    return [
      { field: 'values', message: `Nothing differs from version ${latest.version}. Change a value first.` },
    ];
  return policyFaults(proposed).map(({ key, message }) => ({ field: `values.${key}`, message }));
}

/** "Thin headroom: …, from 10.0 % to 12.0 %", for the audit log. */
export const changedNames = (before: Policy, after: Policy): string =>
  changeRows(before, after)
    .map((change) => `${change.label} ${change.before} to ${change.after}`)
    .join('; ');

const invalid = (faults: readonly Fault[]) =>
  err({
    kind: 'invalid' as const,
    detail: `${faults.length === 1 ? 'One value' : `${faults.length} values`} cannot stand. Nothing was changed.`,
    errors: faults.map((fault) => ({ ...fault, code: 'invalid' })),
  });
