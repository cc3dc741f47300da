import type { Transaction } from 'sequelize';
import { z } from 'zod';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { decimal } from '../../../core/money/decimal.ts';
import { POLICY_VERSION_1, type Policy } from '../../../core/policy.ts';
import { selectOne } from '../sql.ts';

const amount = z.string().transform((text) => decimal(text));

const stored = z.object({
  version: z.number().int(),
  justPassingBand: amount,
  thinBelow: amount,
  repeated: z.object({ atLeast: z.number(), ofLast: z.number(), weakBelow: z.number() }),
  stepDown: z.object({ soonDays: z.number(), noteDays: z.number() }),
  restatedBy: amount,
  qualityFell: z.object({ points: z.number() }),
  qualityWeakBelow: z.number(),
});

/** Decimals print themselves as text. */
export const storedPolicy = (policy: Policy): string => JSON.stringify(policy);

const readPolicy = (content: string): Policy => stored.parse(JSON.parse(content));

/**
 * The policy in force on a day, as known by an instant. Version 1 is part of the product; the table holds the
 * versions that two persons have put in its place.
 */
export async function policyInForce(tx: Transaction, asOf: PlainDate, knownAt: Date): Promise<Policy> {
  const row = await selectOne<{ content: string }>(
    tx,
    `select content from policies
     where valid_from <= :asOf and (valid_to is null or valid_to >= :asOf)
       and known_from <= :knownAt and (known_to is null or known_to > :knownAt)
     order by version desc limit 1`,
    { asOf, knownAt },
  );
  return row ? readPolicy(row.content) : POLICY_VERSION_1;
}
