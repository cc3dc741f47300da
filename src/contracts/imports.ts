import { z } from './zod.ts';
import { STATEMENT_BASES, STATEMENT_SCOPES } from '../core/statements/statement.ts';
import { pageQuery } from './paging.ts';
import type { Reading } from './reading.ts';

export const IMPORT_STATES = ['draft', 'accepted', 'withdrawn'] as const;
export type ImportState = (typeof IMPORT_STATES)[number];

export const UPLOAD_MOST_BYTES = 10 * 1024 * 1024;

export const importQuery = pageQuery.extend({
  state: z.enum(IMPORT_STATES).optional(),
  borrowerId: z.coerce.number().int().positive().optional(),
});
export type ImportQuery = z.infer<typeof importQuery>;

/** One answer; null takes an answer back. */
export const importAnswer = z.object({
  questionKey: z.string().min(1).max(190),
  answer: z.string().min(1).max(2_000).nullable(),
});
export type ImportAnswer = z.infer<typeof importAnswer>;

/** What only a person knows about the file: nothing is preselected. */
export const importAcceptance = z.object({
  basis: z.enum(STATEMENT_BASES, 'say whether these are audited, reviewed or management accounts'),
  scope: z.enum(STATEMENT_SCOPES, 'say whether these are the accounts of the group or of the company alone'),
});
export type ImportAcceptance = z.infer<typeof importAcceptance>;

export interface ImportRow {
  readonly id: number;
  readonly version: number;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly fileName: string;
  readonly state: ImportState;
  readonly openQuestions: number;
  readonly periods: number;
  readonly uploadedBy: string;
  readonly uploadedAt: string;
  readonly acceptedBy: string | null;
  readonly acceptedAt: string | null;
}

export interface GivenAnswer {
  readonly questionKey: string;
  readonly answer: string;
  /** 'remembered' where an earlier file of this layout gave it. */
  readonly by: string;
  readonly at: string;
}

/** A figure on file that this import would supersede. */
export interface ChangedFigure {
  readonly line: string;
  readonly periodEnd: string;
  readonly months: number;
  readonly onFile: string;
  readonly inThisFile: string;
}

export interface ImportView extends ImportRow {
  readonly reading: Reading;
  readonly sha256: string;
  readonly answers: readonly GivenAnswer[];
  readonly basis: string | null;
  readonly scope: string | null;
  readonly mayEdit: boolean;
}

export interface AcceptedImport {
  readonly id: number;
  readonly borrowerId: number;
  readonly statements: number;
  /** Periods whose figures on file are the same: kept as they are. */
  readonly unchanged: number;
  readonly changes: readonly ChangedFigure[];
}
