/** What travels between the program and its reading workers. */
import type { Reading, ReadingContext, ReadNote } from '#core/statements/workbookReading.ts';

export interface ReadingJob {
  readonly id: number;
  readonly kind: 'xlsx' | 'csv';
  readonly bytes: Uint8Array;
  readonly notes: readonly ReadNote[];
  readonly context: ReadingContext;
}

export type ReadingAnswer =
  | { readonly id: number; readonly reading: Reading }
  /** A fault of the program, not of the file. */
  | { readonly id: number; readonly fault: string };

/** Sent once, when the worker has loaded what it needs. */
export const READY = 'ready';
