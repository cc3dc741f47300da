import { deskScope, mayAnywhere, type Person } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { countOpenAlerts } from '../db/repositories/alertLists.ts';
import { countPolicyProposalsFor } from '../db/repositories/policyProposals.ts';

/**
 * What stands beside the sections' names: open alerts on the desks that the person reads, and changes of the policy
 * that wait for the person's decision. Null where the role has neither.
 */
export const barCounts = (
  person: Person,
): Promise<{ readonly openAlerts: number | null; readonly policyToDecide: number | null }> =>
  inTransaction(async (tx) => ({
    openAlerts: mayAnywhere(person, 'read borrower')
      ? await countOpenAlerts(tx, deskScope(person, 'read borrower'))
      : null,
    policyToDecide: mayAnywhere(person, 'confirm policy')
      ? await countPolicyProposalsFor(tx, person.id)
      : null,
  }));
