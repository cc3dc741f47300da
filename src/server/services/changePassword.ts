import { countTry, SIGN_IN_HERE } from '../auth/limits.ts';
import { hashPassword, passwordMatches } from '../auth/passwords.ts';
import { endSessionsOf, startSession } from '../auth/sessions.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findSignInById, setPasswordHash } from '../db/repositories/people.ts';
import { voidTokens } from '../db/repositories/tokens.ts';
import { err, ok } from '../../core/result.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';
import type { PasswordChange } from '../../contracts/session.ts';
import type { PersonActor } from './actor.ts';
import { acceptNewPassword } from './newPassword.ts';
import { tooManyTries } from './tooManyTries.ts';
import { audit, write, type Outcome } from './write.ts';

const WRONG: ServiceProblem = {
  kind: 'not-allowed',
  detail: 'The current password is not right. Nothing was changed. Type it again.',
};

/** Ends every session of the person, this one too, and answers the token of a new one. */
export async function changePassword(
  actor: PersonActor,
  typed: PasswordChange,
): Promise<Outcome<{ token: string }>> {
  const { person, now } = actor;
  const wait = await inTransaction((tx) =>
    countTry(tx, SIGN_IN_HERE, `password ${person.id} ${actor.address}`, now),
  );
  if (wait !== null) return tooManyTries('change the password', wait);
  const before = await inTransaction((tx) => findSignInById(tx, person.id));
  const stored = before?.passwordHash ?? null;
  if (!(await passwordMatches(typed.currentPassword, stored))) return err(WRONG);
  const accepted = acceptNewPassword('newPassword', typed.newPassword, person);
  if (!accepted.ok) return accepted;
  const passwordHash = await hashPassword(accepted.value);
  // Without the key: the answer is a token, which no table may keep.
  return write({ ...actor, idempotencyKey: null }, 'change-password', null, async (tx) => {
    const current = await findSignInById(tx, person.id);
    if (!current?.isActive || current.passwordHash !== stored) return err(WRONG);
    await setPasswordHash(tx, person.id, passwordHash);
    await voidTokens(tx, { purpose: 'reset-password', personId: person.id, now });
    await endSessionsOf(tx, person.id);
    const token = await startSession(tx, person.id, now);
    await audit(tx, actor, {
      action: 'password-changed',
      subjectKind: 'person',
      subjectId: String(person.id),
      borrowerId: null,
      deskId: null,
      summary: 'Changed the password; all other sessions ended',
      before: null,
      after: null,
    });
    return ok({ token });
  });
}
