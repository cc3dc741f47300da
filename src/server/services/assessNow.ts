import { businessDate } from '../../core/calendar/businessDate.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findLender } from '../db/repositories/lender.ts';
import type { Actor } from './actor.ts';
import { assessBorrower } from './assessBorrower.ts';

/** Assesses the borrower with what is known at this moment and last night's peers. */
export async function assessNow(actor: Actor, borrowerId: number): Promise<void> {
  const lender = await inTransaction((tx) => findLender(tx));
  if (!lender) throw new Error('there is no lender yet');
  const done = await assessBorrower(actor, borrowerId, {
    runId: null,
    knownAt: actor.now,
    asOf: businessDate(actor.now, lender.zone),
  });
  if (!done.ok) throw new Error(`borrower ${borrowerId} could not be assessed: ${done.error.kind}`);
}
