import { personOfToken, type SignedIn } from '../auth/sessions.ts';
import { inTransaction } from '../db/inTransaction.ts';

/** Who sends this request, as the database knows them now; nobody where the session has ended. */
export const currentPerson = (token: string, now: Date): Promise<SignedIn | null> =>
  inTransaction((tx) => personOfToken(tx, token, now));
