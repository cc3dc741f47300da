import { countSignIn, forgiveSignIn } from '../auth/limits.ts';
import { passwordMatches } from '../auth/passwords.ts';
import { endSession, startSession } from '../auth/sessions.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findSignIn, findSignInById, type SignInRecord } from '../db/repositories/people.ts';
import { deleteEndedCounters } from '../db/repositories/rateLimits.ts';
import { deleteExpiredSessions } from '../db/repositories/sessions.ts';
import { err, ok } from '../../core/result.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';
import type { SignIn } from '../../contracts/session.ts';
import type { Actor } from './actor.ts';
import { tooManyTries } from './tooManyTries.ts';
import { audit, write, type Outcome } from './write.ts';

const WRONG: ServiceProblem = {
  kind: 'not-signed-in',
  detail:
    'Address and password do not belong together. Nothing was changed. Check both, or ask for a link to set a new password.',
};

/**
 * Answers the token of a new session. Whether the address is unknown, the password wrong or the person no longer
 * active: the answer is the same and takes the same work.
 *
 * @param oldSessionId the session of this browser, which ends: a token planted before sign-in is worth nothing after
 */
export async function signIn(
  actor: Actor,
  typed: Pick<SignIn, 'email' | 'password'>,
  oldSessionId: string | null,
): Promise<Outcome<{ token: string }>> {
  const wait = await inTransaction((tx) => countSignIn(tx, typed.email, actor.address, actor.now));
  if (wait !== null) return tooManyTries('sign in', wait);
  const found = await inTransaction((tx) => findSignIn(tx, typed.email));
  const usable = found?.isActive ? found : null;
  const matches = await passwordMatches(typed.password, usable?.passwordHash ?? null);
  if (!usable || !matches) {
    await recordFailure(actor, found);
    return err(WRONG);
  }
  // Without the key: the answer is a token, which no table may keep.
  return write({ ...actor, idempotencyKey: null }, 'sign-in', null, async (tx) => {
    await forgiveSignIn(tx, usable.email, actor.address, actor.now);
    const now = await findSignInById(tx, usable.id);
    if (!now?.isActive || now.passwordHash !== usable.passwordHash) return err(WRONG);
    await deleteExpiredSessions(tx, actor.now);
    await deleteEndedCounters(tx, actor.now.getTime());
    if (oldSessionId) await endSession(tx, oldSessionId);
    const token = await startSession(tx, usable.id, actor.now);
    const person = { id: usable.id, name: usable.name, email: usable.email, roles: [], deskIds: [] };
    await audit(tx, { ...actor, person }, about('sign-in', usable.id, 'Signed in'));
    return ok({ token });
  });
}

/** What was typed as the address is not kept: at times it is the password. */
const recordFailure = (actor: Actor, found: SignInRecord | null): Promise<number> =>
  inTransaction((tx) =>
    audit(
      tx,
      actor,
      about('sign-in-failed', found?.id ?? null, `Sign-in failed for ${found?.name ?? 'an unknown address'}`),
    ),
  );

const about = (action: string, personId: number | null, summary: string) => ({
  action,
  subjectKind: 'person',
  subjectId: personId === null ? '-' : String(personId),
  borrowerId: null,
  deskId: null,
  summary,
  before: null,
  after: null,
});
