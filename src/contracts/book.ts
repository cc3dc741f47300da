import { z } from './zod.ts';
import { MEASURE_CODES, type MeasureCode } from '../core/measures/measure.ts';
import type { BookPart } from '../core/patterns/bookParts.ts';
import type { BookStanding } from '../core/patterns/bookStanding.ts';

/** Which part of the book is looked at; nothing is all of it. */
export const bookQuery = z.object({
  measure: z.enum(MEASURE_CODES).optional(),
  sector: z.string().trim().min(1).max(16).optional(),
});
export type BookQuery = z.infer<typeof bookQuery>;

/** Figures that cross desks are counts over five or more; below that only this is said. */
export const FEWER_THAN_SHOWN = 'fewer than 5';

/** One covenant of the published list, of a desk in the person's reach. */
export interface ListedCovenant {
  readonly covenantId: number;
  readonly covenantName: string;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly measure: MeasureCode;
  readonly near: number;
  readonly passing: number;
  readonly expectedPassing: number;
  readonly pAtLeast: number;
  readonly localFdr: number;
  readonly peers: 'sector' | 'book';
  readonly peerCount: number;
}

export interface BookView {
  /** The business date of the night, and what was known by then. */
  readonly asOf: string;
  readonly dataCutOff: string;
  readonly methodVersion: string;
  readonly measures: readonly { readonly code: MeasureCode; readonly name: string }[];
  readonly sectors: readonly { readonly code: string; readonly label: string }[];
  /** Of the part that was asked for; null where no test of the book belongs to it. */
  readonly pattern: BookPart['pattern'] | null;
  readonly standing: Pick<BookStanding, 'window' | 'gates' | 'refused' | 'types' | 'digits'>;
  readonly listed: readonly ListedCovenant[];
  /** On other desks' borrowers: null is fewer than five, which is not told apart from none. */
  readonly listedElsewhere: number | null;
  /** The person reads every desk. */
  readonly readsAll: boolean;
}
