import { z } from './zod.ts';
import {
  ALERT_KINDS,
  ALERT_STATES,
  CLOSING_REASONS,
  SEVERITIES,
  type AlertKind,
  type AlertState,
  type Severity,
} from '../core/alerts/alert.ts';
import type { Outcome } from '../core/covenants/covenantTest.ts';
import type { QualityBand } from '../core/quality/score.ts';
import type { MovementsView } from './movements.ts';
import { pageQuery } from './paging.ts';
import { day } from './watchlist.ts';

export const ALERT_VIEWS = ['mine', 'not-taken', 'desk'] as const;
export const ALERT_SORTS = ['due', 'severity', 'borrower', 'may-fall', 'quality', 'raised'] as const;

/** Every filter of the alerts table; the address bar carries the same names. */
export const alertQuery = pageQuery.extend({
  view: z.enum(ALERT_VIEWS).default('desk'),
  kind: z.enum(ALERT_KINDS).optional(),
  severity: z.enum(SEVERITIES).optional(),
  sector: z.string().max(16).optional(),
  /** Smallest headroom of the borrower below this share, in percent. */
  mayFallBelow: z.coerce.number().int().min(-100).max(100).optional(),
  dueWithinDays: z.coerce.number().int().min(0).max(365).optional(),
  state: z.enum(['open', ...ALERT_STATES]).default('open'),
  borrowerId: z.coerce.number().int().positive().optional(),
  sort: z.enum(ALERT_SORTS).default('due'),
  direction: z.enum(['up', 'down']).default('up'),
});
export type AlertQuery = z.infer<typeof alertQuery>;

/** One test of a sounding strip; shares and levels as decimal text. */
export interface StripTest {
  readonly testDate: string;
  readonly outcome: Outcome;
  readonly mayFall: string | null;
  readonly justPassing: boolean;
  readonly level: string | null;
  /** Width of the just-passing band of the policy it was judged by, a share of the level; left out: version 1's. */
  readonly band?: string;
}

export interface AlertRow {
  readonly id: number;
  readonly version: number;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskName: string;
  readonly sectorLabel: string;
  readonly kind: AlertKind;
  readonly severity: Severity;
  readonly state: AlertState;
  readonly sentence: string;
  readonly covenantName: string | null;
  readonly strip: readonly StripTest[];
  /** What earnings may fall on the alert's covenant, or the borrower's smallest where it has none. */
  readonly mayFall: string | null;
  readonly latestOutcome: Outcome | null;
  readonly qualityHeadline: number | null;
  readonly qualityBand: QualityBand | null;
  readonly ownerId: number;
  readonly ownerName: string;
  readonly takenBy: string | null;
  readonly dueOn: string;
  readonly counter: number;
  readonly raisedAt: string;
  readonly newSinceYesterday: boolean;
  readonly conditionGone: boolean;
  readonly putOffUntil: string | null;
}

export interface AlertEvent {
  readonly at: string;
  readonly who: string;
  readonly what: string;
  readonly text: string;
}

/** What the person may do next, so that the page shows only buttons that work. */
export interface AlertSteps {
  readonly take: boolean;
  readonly work: boolean;
  readonly putOff: boolean;
  readonly close: boolean;
  readonly handOver: boolean;
  readonly confirmClosing: boolean;
  readonly propose: boolean;
}

export interface AlertDetail extends AlertRow {
  readonly covenantId: number | null;
  readonly factDate: string;
  readonly wouldChange: string;
  readonly evidence: readonly { readonly label: string; readonly value: string }[];
  /** What moved it since the last night; null where it did not move. */
  readonly movements: MovementsView | null;
  readonly events: readonly AlertEvent[];
  readonly closing: { readonly reason: string; readonly text: string; readonly by: string } | null;
  readonly steps: AlertSteps;
  readonly onWatchlist: boolean;
  readonly proposalWaiting: boolean;
}

const text = z.string().trim().min(5, 'say it in 5 characters or more').max(1_000);
const closingReason = z
  .number()
  .int()
  .refine((code) => CLOSING_REASONS.some((reason) => reason.code === code), 'choose a reason from the list');

/** A step of the alert's owner or deputy. */
export const alertStep = z.discriminatedUnion('step', [
  z.object({ step: z.literal('take') }),
  z.object({ step: z.literal('wait'), waitFor: z.enum(['borrower', 'analyst']), text }),
  z.object({ step: z.literal('assess'), text }),
  z.object({ step: z.literal('put off'), until: day, text }),
  z.object({ step: z.literal('close'), reason: closingReason, text }),
]);
export type AlertStep = z.infer<typeof alertStep>;

export const closingConfirmation = z.object({ confirm: z.boolean(), text });
export type ClosingConfirmation = z.infer<typeof closingConfirmation>;

export const handingOver = z.object({ text });
export type HandingOver = z.infer<typeof handingOver>;

export const PUT_OFF_MOST_TIMES = 2;
export const PUT_OFF_MOST_DAYS = 30;
