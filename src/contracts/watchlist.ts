import { z } from './zod.ts';
import { isPlainDate } from '../core/calendar/plainDate.ts';

/** Grades with their meaning, which is printed beside the code. */
export const WATCHLIST_GRADES = [
  { code: 'W1', meaning: 'monitor' },
  { code: 'W2', meaning: 'act' },
  { code: 'W3', meaning: 'serious' },
] as const;
export const GRADE_CODES = ['W1', 'W2', 'W3'] as const;
export type GradeCode = (typeof GRADE_CODES)[number];

export const WATCHLIST_CHANGES = ['entry', 'grade', 'exit'] as const;
export type WatchlistChange = (typeof WATCHLIST_CHANGES)[number];

const REASON_LEAST = 10;
const REASON_MOST = 1_000;
const PLAN_MOST = 2_000;

export const day = z.string().refine(isPlainDate, 'a day as YYYY-MM-DD');

/** An entry cannot be saved without grade, reason, owner, plan and next review date. */
export const newWatchlistProposal = z.object({
  borrowerId: z.number().int().positive(),
  alertId: z.number().int().positive().nullable(),
  change: z.enum(WATCHLIST_CHANGES),
  grade: z.enum(GRADE_CODES, 'choose a grade'),
  reason: z
    .string()
    .trim()
    .min(REASON_LEAST, `say why, in ${REASON_LEAST} characters or more`)
    .max(REASON_MOST),
  ownerId: z.number({ error: 'choose who owns the plan' }).int().positive(),
  plan: z
    .string()
    .trim()
    .min(REASON_LEAST, `say what will be done, in ${REASON_LEAST} characters or more`)
    .max(PLAN_MOST),
  nextReviewOn: day,
});
export type NewWatchlistProposal = z.infer<typeof newWatchlistProposal>;

export const proposalDecision = z.object({
  decision: z.enum(['approve', 'decline']),
  text: z
    .string()
    .trim()
    .min(REASON_LEAST, `give the reason, in ${REASON_LEAST} characters or more`)
    .max(REASON_MOST),
});
export type ProposalDecision = z.infer<typeof proposalDecision>;

export const PROPOSAL_STATES = ['proposed', 'approved', 'declined', 'withdrawn'] as const;
export type ProposalState = (typeof PROPOSAL_STATES)[number];

export interface ProposalRow {
  readonly id: number;
  readonly version: number;
  readonly kind: 'watchlist';
  readonly change: WatchlistChange;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskName: string;
  readonly grade: GradeCode;
  readonly reason: string;
  readonly ownerId: number;
  readonly ownerName: string;
  readonly plan: string;
  readonly nextReviewOn: string;
  readonly alertId: number | null;
  readonly state: ProposalState;
  readonly proposedBy: string;
  readonly proposedById: number;
  readonly proposedAt: string;
  readonly decidedBy: string | null;
  readonly decidedAt: string | null;
  readonly decisionText: string | null;
}

export interface WatchlistRow {
  readonly id: number;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskName: string;
  readonly grade: GradeCode;
  readonly reason: string;
  readonly ownerName: string;
  readonly plan: string;
  readonly nextReviewOn: string;
  readonly reviewOverdue: boolean;
  readonly enteredOn: string;
  /** 'active' or 'probation' */
  readonly state: string;
  readonly proposedBy: string;
  readonly decidedBy: string;
}

export interface WatchlistView {
  readonly entries: readonly WatchlistRow[];
  readonly proposals: readonly ProposalRow[];
}
