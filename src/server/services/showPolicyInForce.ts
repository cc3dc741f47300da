import type { PolicyInForce } from '../../contracts/policy.ts';
import { POLICY_KEYS, policySetting, printSetting, type PolicyKey } from '../../core/policySettings.ts';
import type { Policy } from '../../core/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { policyInForce } from '../db/repositories/policies.ts';
import type { PersonActor } from './actor.ts';
import { lenderDay } from './lenderDay.ts';

/** What a method page prints of the policy: the values of today, as known now. */
export const showPolicyInForce = ({ now }: PersonActor): Promise<PolicyInForce> =>
  inTransaction(async (tx) => {
    const day = await lenderDay(tx, now);
    const policy = await policyInForce(tx, day, now);
    return { version: policy.version, day, values: printedValues(policy) };
  });

const printedValues = (policy: Policy): Readonly<Record<PolicyKey, string>> =>
  Object.fromEntries(
    POLICY_KEYS.map((key) => [key, printSetting(key, policySetting(key).read(policy))]),
  ) as Record<PolicyKey, string>;
