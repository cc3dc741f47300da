/** The policy as pages and the interface show it, and as two persons change it. */
import { isPlainDate } from '../core/calendar/plainDate.ts';
import { decimal, Decimal } from '../core/money/decimal.ts';
import { POLICY_KEYS, settingFault, type PolicyKey } from '../core/policySettings.ts';
import { z } from './zod.ts';

/** Values in force on a day, as printed, with their units. */
export interface PolicyInForce {
  readonly version: number;
  readonly day: string;
  readonly values: Readonly<Record<PolicyKey, string>>;
}

const REASON_LEAST = 10;
const REASON_MOST = 1_000;
const reason = (what: string) =>
  z.string().trim().min(REASON_LEAST, `${what}, in ${REASON_LEAST} characters or more`).max(REASON_MOST);

/** A value in the setting's own unit: a share of one, or a count. */
const settingValue = z
  .string()
  .trim()
  .regex(/^\d{1,6}(\.\d{1,8})?$/, 'give a number')
  .transform((text): Decimal => decimal(text));

const settingValues = z.partialRecord(z.enum(POLICY_KEYS), settingValue).superRefine((values, context) => {
  for (const key of POLICY_KEYS) {
    // A value that could not be read has its own issue by now and is text still.
    const value: unknown = values[key];
    const fault = value instanceof Decimal ? settingFault(key, value) : null;
    if (fault) context.addIssue({ code: 'custom', path: [key], message: fault });
  }
});

/** Only what is to change is sent; every other value stays as in the version that the change starts from. */
export const newPolicyProposal = z.strictObject({
  /** The version that was seen: another one confirmed meanwhile refuses the proposal. */
  from: z.number().int().positive(),
  validFrom: z.string().refine(isPlainDate, 'give the day from which it holds'),
  reason: reason('say why'),
  values: settingValues,
});
export type NewPolicyProposal = z.infer<typeof newPolicyProposal>;

export const policyDecision = z.strictObject({
  decision: z.enum(['confirm', 'decline']),
  text: reason('give the reason'),
});
export type PolicyDecision = z.infer<typeof policyDecision>;

/** A value that differs between two versions, as printed. */
export interface PolicyChangeRow {
  readonly key: PolicyKey;
  readonly label: string;
  readonly before: string;
  readonly after: string;
}

export const POLICY_PROPOSAL_STATES = ['proposed', 'approved', 'declined', 'withdrawn'] as const;
export type PolicyProposalState = (typeof POLICY_PROPOSAL_STATES)[number];

export interface PolicyProposalRow {
  readonly id: number;
  readonly version: number;
  /** The policy version that it starts from. */
  readonly from: number;
  readonly validFrom: string;
  readonly reason: string;
  readonly changes: readonly PolicyChangeRow[];
  readonly state: PolicyProposalState;
  readonly proposedById: number;
  readonly proposedBy: string;
  readonly proposedAt: string;
  readonly decidedBy: string | null;
  readonly decidedAt: string | null;
  readonly decisionText: string | null;
}

export interface PolicyVersionRow {
  readonly version: number;
  /** Null: from the beginning. */
  readonly validFrom: string | null;
  /** The last day; null where no later version follows. Before `validFrom` where it never came into force. */
  readonly validTo: string | null;
  readonly standing: 'in force' | 'from a later day' | 'earlier' | 'never in force';
  /** Null: version 1, which the product brings. */
  readonly proposedBy: string | null;
  readonly confirmedBy: string | null;
  readonly confirmedAt: string | null;
  readonly reason: string | null;
  /** Against the version before it. */
  readonly changes: readonly PolicyChangeRow[];
}

/** One value of the policy as the form takes it. */
export interface PolicyValueRow {
  readonly key: PolicyKey;
  /** In force today, as printed. */
  readonly inForce: string;
  /** In the version confirmed last, from which a change starts: decimal text in the setting's unit, and as printed. */
  readonly latest: string;
  readonly latestPrinted: string;
}

export interface PolicyView {
  /** Today for the lender, and the zone in which instants are printed. */
  readonly day: string;
  readonly zone: string;
  readonly inForce: number;
  readonly latest: number;
  /** The earliest day from which a change may hold. */
  readonly earliest: string;
  readonly values: readonly PolicyValueRow[];
  readonly versions: readonly PolicyVersionRow[];
  readonly proposals: readonly PolicyProposalRow[];
  readonly mayPropose: boolean;
  readonly mayConfirm: boolean;
}
