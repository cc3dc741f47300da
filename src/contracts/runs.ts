import { z } from './zod.ts';
import { isPlainDate, type PlainDate } from '../core/calendar/plainDate.ts';
import { pageQuery } from './paging.ts';

/** The run computes these in turn; 'mail' is the last. */
export const RUN_PHASES = ['tests', 'cross-section', 'scores', 'mail'] as const;
export type RunPhase = (typeof RUN_PHASES)[number];

export const RUN_STATES = ['queued', 'running', 'interrupted', 'done'] as const;
export type RunState = (typeof RUN_STATES)[number];

export const RUN_KINDS = ['nightly'] as const;
export type RunKind = (typeof RUN_KINDS)[number];

export const runQuery = pageQuery;

/** Without a day the run is for the business date of now. */
export const newRun = z.object({
  businessDate: z
    .custom<PlainDate>((value) => typeof value === 'string' && isPlainDate(value), 'a day as YYYY-MM-DD')
    .optional(),
});
export type NewRun = z.infer<typeof newRun>;

export interface RunRow {
  readonly id: number;
  readonly businessDate: string;
  readonly kind: RunKind;
  /** Counts the times this business date was computed. */
  readonly attempt: number;
  readonly state: RunState;
  readonly phase: RunPhase;
  readonly knownAt: string;
  /** Null: by schedule or from the command line. */
  readonly startedBy: string | null;
  readonly startedAt: string;
  readonly finishedAt: string | null;
  readonly borrowersTotal: number;
  readonly borrowersDone: number;
  readonly borrowersFailed: number;
  readonly failure: string | null;
}

export interface RunDetail extends RunRow {
  readonly steps: readonly {
    readonly phase: string;
    readonly done: number;
    readonly failed: number;
    readonly total: number;
  }[];
  readonly failures: readonly {
    readonly borrowerId: number;
    readonly deskName: string;
    readonly phase: string;
    readonly reason: string;
  }[];
}
