/** Versions of the policy and proposals to change it, as rows that a page prints. */
import { z } from 'zod';
import type {
  PolicyChangeRow,
  PolicyProposalRow,
  PolicyProposalState,
  PolicyVersionRow,
} from '../../contracts/policy.ts';
import { addDays, isPlainDate, type PlainDate } from '../../core/calendar/plainDate.ts';
import { decimal } from '../../core/money/decimal.ts';
import { changedPolicy, policyChanges, policySetting, printSetting } from '../../core/policySettings.ts';
import { POLICY_VERSION_1, type Policy } from '../../core/policy.ts';
import type { PolicyVersionRecord } from '../db/repositories/policies.ts';
import type { PolicyProposalRecord } from '../db/repositories/policyProposals.ts';

/** What a proposal's content was; today's bounds are not asked of it again. */
const stored = z.object({
  from: z.number(),
  validFrom: z.string().refine(isPlainDate),
  reason: z.string(),
  values: z.record(
    z.string(),
    z.string().transform((text) => decimal(text)),
  ),
});
export type StoredPolicyProposal = z.infer<typeof stored>;

export const readPolicyProposal = (content: string): StoredPolicyProposal =>
  stored.parse(JSON.parse(content));

export const changeRows = (before: Policy, after: Policy): readonly PolicyChangeRow[] =>
  policyChanges(before, after).map((change) => ({
    key: change.key,
    label: policySetting(change.key).label,
    before: printSetting(change.key, change.before),
    after: printSetting(change.key, change.after),
  }));

export function proposalRow(
  record: PolicyProposalRecord,
  policyOf: (version: number) => Policy,
): PolicyProposalRow {
  const content = readPolicyProposal(record.content);
  const from = policyOf(content.from);
  return {
    id: record.id,
    version: record.version,
    from: content.from,
    validFrom: content.validFrom,
    reason: content.reason,
    changes: changeRows(from, changedPolicy(from, content.values)),
    state: record.state as PolicyProposalState,
    proposedById: record.proposedById,
    proposedBy: record.proposedBy,
    proposedAt: record.proposedAt.toISOString(),
    decidedBy: record.decidedBy,
    decidedAt: record.decidedAt?.toISOString() ?? null,
    decisionText: record.decisionText,
  };
}

/** Every version, the latest first, down to version 1 that the product brings. */
export function versionRows(records: readonly PolicyVersionRecord[], today: PlainDate): PolicyVersionRow[] {
  const ends = records.map((_, place) => {
    const later = records[place - 1];
    return later ? addDays(later.validFrom, -1) : null;
  });
  const confirmed = records.map((record, place): PolicyVersionRow => {
    const validTo = ends[place] ?? null;
    return {
      version: record.policy.version,
      validFrom: record.validFrom,
      validTo,
      standing: standingOf(record.validFrom, validTo, today),
      proposedBy: record.proposedBy,
      confirmedBy: record.confirmedBy,
      confirmedAt: record.confirmedAt.toISOString(),
      reason: record.reason,
      changes: changeRows(records[place + 1]?.policy ?? POLICY_VERSION_1, record.policy),
    };
  });
  const first = records.at(-1);
  const firstEnd = first ? addDays(first.validFrom, -1) : null;
  return [
    ...confirmed,
    {
      version: POLICY_VERSION_1.version,
      validFrom: null,
      validTo: firstEnd,
      standing: firstEnd !== null && firstEnd < today ? 'earlier' : 'in force',
      proposedBy: null,
      confirmedBy: null,
      confirmedAt: null,
      reason: null,
      changes: [],
    },
  ];
}

function standingOf(
  validFrom: PlainDate,
  validTo: PlainDate | null,
  today: PlainDate,
): PolicyVersionRow['standing'] {
  if (validTo !== null && validTo < validFrom) return 'never in force';
  if (validFrom > today) return 'from a later day';
  return validTo !== null && validTo < today ? 'earlier' : 'in force';
}
