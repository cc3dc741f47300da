import { inTransaction } from '../db/inTransaction.ts';
import { wantsDigest } from '../db/repositories/people.ts';
import { countSessionsOf } from '../db/repositories/sessions.ts';

/** What the account page says besides who is signed in. */
export const showAccount = (
  personId: number,
  now: Date,
): Promise<{ wantsDigest: boolean; otherSessions: number }> =>
  inTransaction(async (tx) => ({
    wantsDigest: await wantsDigest(tx, personId),
    otherSessions: Math.max(0, (await countSessionsOf(tx, personId, now)) - 1),
  }));
