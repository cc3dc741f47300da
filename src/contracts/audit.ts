import { z } from './zod.ts';
import { pageQuery } from './paging.ts';
import { day } from './watchlist.ts';

export const auditQuery = pageQuery.extend({
  action: z.string().max(64).optional(),
  personId: z.coerce.number().int().positive().optional(),
  borrowerId: z.coerce.number().int().positive().optional(),
  from: day.optional(),
  to: day.optional(),
});
export type AuditQuery = z.infer<typeof auditQuery>;

export interface AuditRow {
  readonly seq: number;
  readonly at: string;
  readonly who: string;
  readonly action: string;
  readonly subject: string;
  readonly borrowerId: number | null;
  readonly borrowerName: string | null;
  readonly summary: string;
  readonly before: string | null;
  readonly after: string | null;
  readonly requestId: string;
  readonly address: string;
  readonly hash: string;
}

/** What the check of the whole chain came to. */
export interface AuditCheck {
  readonly entries: number;
  readonly intact: boolean;
  /** The first entry whose hash does not follow from what is stored. */
  readonly firstBroken: number | null;
  readonly headHash: string;
}
