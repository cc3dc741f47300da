import { z } from './zod.ts';

const PAGE_SIZE_MOST = 200;

/** Query of every list: `page` counts from 1. */
export const pageQuery = z.object({
  page: z.coerce.number().int().min(1).max(10_000).default(1),
  perPage: z.coerce.number().int().min(1).max(PAGE_SIZE_MOST).default(50),
});
export type PageQuery = z.infer<typeof pageQuery>;

export interface Page<Row> {
  readonly rows: readonly Row[];
  readonly page: number;
  readonly perPage: number;
  readonly total: number;
}
