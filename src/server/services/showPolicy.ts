import type { PolicyView } from '../../contracts/policy.ts';
import { businessDate } from '../../core/calendar/businessDate.ts';
import { POLICY_KEYS, policySetting, printSetting } from '../../core/policySettings.ts';
import { POLICY_VERSION_1, type Policy } from '../../core/policy.ts';
import { ok } from '../../core/result.ts';
import { mayAnywhere } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findLender } from '../db/repositories/lender.ts';
import { latestPolicy, listPolicyVersions, policyInForce } from '../db/repositories/policies.ts';
import { listPolicyProposals } from '../db/repositories/policyProposals.ts';
import type { PersonActor } from './actor.ts';
import { earliestChange } from './policyDays.ts';
import { proposalRow, versionRows } from './policyRows.ts';
import type { Outcome } from './write.ts';

const PROPOSALS_SHOWN = 50;

/** The policy in force, every version that there was, and what waits for a second person. */
export function showPolicy({ person, now }: PersonActor): Promise<Outcome<PolicyView>> {
  return inTransaction(async (tx) => {
    const lender = await findLender(tx);
    if (!lender) throw new Error('there is no lender yet');
    const today = businessDate(now, lender.zone);
    const inForce = await policyInForce(tx, today, now);
    const latest = await latestPolicy(tx);
    const records = await listPolicyVersions(tx);
    const proposals = await listPolicyProposals(tx, PROPOSALS_SHOWN);
    const policies = new Map<number, Policy>(records.map(({ policy }) => [policy.version, policy]));
    return ok({
      day: today,
      zone: lender.zone,
      inForce: inForce.version,
      latest: latest.policy.version,
      earliest: earliestChange(today, latest.validFrom),
      values: POLICY_KEYS.map((key) => {
        const { read } = policySetting(key);
        return {
          key,
          inForce: printSetting(key, read(inForce)),
          latest: read(latest.policy).toFixed(),
          latestPrinted: printSetting(key, read(latest.policy)),
        };
      }),
      versions: versionRows(records, today),
      proposals: proposals.map((record) =>
        proposalRow(record, (version) => policies.get(version) ?? POLICY_VERSION_1),
      ),
      mayPropose: mayAnywhere(person, 'propose policy'),
      mayConfirm: mayAnywhere(person, 'confirm policy'),
    });
  });
}
