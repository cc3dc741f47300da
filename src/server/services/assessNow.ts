import { inTransaction } from '../db/inTransaction.ts';
import { isAssessedAsItStands } from '../db/repositories/assessments.ts';
import type { Actor } from './actor.ts';
import { assessBorrower } from './assessBorrower.ts';
import { lenderDay } from './lenderDay.ts';

/**
 * Assesses the borrower with what is known at this moment and last night's peers. Where that was done since its
 * figures changed, nothing is done: a repeated request makes no second result.
 */
export async function assessNow(actor: Actor, borrowerId: number): Promise<void> {
  const { isDone, asOf } = await inTransaction(async (tx) => ({
    isDone: await isAssessedAsItStands(tx, borrowerId),
    asOf: await lenderDay(tx, actor.now),
  }));
  if (isDone) return;
  const done = await assessBorrower(actor, borrowerId, { runId: null, knownAt: actor.now, asOf });
  if (!done.ok) throw new Error(`borrower ${borrowerId} could not be assessed: ${done.error.kind}`);
}
