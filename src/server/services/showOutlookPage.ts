import type { BorrowerView } from '../../contracts/borrowers.ts';
import type { ProjectionRecordView } from '../../contracts/outlook.ts';
import { err, ok } from '../../core/result.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { latestProjectionRecord } from '../db/repositories/projectionRecords.ts';
import type { PersonActor } from './actor.ts';
import { borrowerView } from './showBorrower.ts';
import type { Outcome } from './write.ts';

export interface OutlookPage {
  readonly borrower: BorrowerView;
  /** Null before the first night that looked back. */
  readonly record: ProjectionRecordView | null;
}

/** What lies ahead of one borrower, and how what was said of past tests turned out over the whole book. */
export const showOutlookPage = (actor: PersonActor, id: number): Promise<Outcome<OutlookPage>> =>
  inTransaction(async (tx) => {
    const borrower = await borrowerView(tx, actor, id);
    if (!borrower) return err({ kind: 'not-found', what: 'borrower' });
    return ok({ borrower, record: await latestProjectionRecord(tx) });
  });

/** Counts over the whole book, which name nobody. */
export const showProjectionRecord = (): Promise<ProjectionRecordView | null> =>
  inTransaction((tx) => latestProjectionRecord(tx));
