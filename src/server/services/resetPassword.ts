import { countTry, forgiveSignIn, ONE_TIME_LINK } from '../auth/limits.ts';
import { hashPassword } from '../auth/passwords.ts';
import { endSessionsOf } from '../auth/sessions.ts';
import { hasTokenShape, tokenHash } from '../auth/tokens.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findSignInById, setPasswordHash, type SignInRecord } from '../db/repositories/people.ts';
import { findToken, useToken, voidTokens } from '../db/repositories/tokens.ts';
import { err, ok } from '../../core/result.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';
import type { PasswordReset } from '../../contracts/session.ts';
import type { Actor } from './actor.ts';
import { acceptNewPassword } from './newPassword.ts';
import { tooManyTries } from './tooManyTries.ts';
import { audit, write, type Outcome } from './write.ts';

const purpose = 'reset-password';

const LINK_IS_SPENT: ServiceProblem = {
  kind: 'gone',
  detail: 'This link was used or has run out. Nothing was changed. Ask for a new link.',
};

/** Whether the link in a mail is still good. Looking uses nothing up: mail scanners look. */
export const isResetLinkGood = async (token: string, now: Date): Promise<boolean> =>
  (await personOfLink(token, now)) !== null;

/** Sets the password of the person whose link it is, uses the link up and ends all their sessions. */
export async function resetPassword(actor: Actor, typed: PasswordReset): Promise<Outcome<null>> {
  const { now, address } = actor;
  const wait = await inTransaction((tx) => countTry(tx, ONE_TIME_LINK, address, now));
  if (wait !== null) return tooManyTries('use a link', wait);
  const person = await personOfLink(typed.token, now);
  if (!person) return err(LINK_IS_SPENT);
  const accepted = acceptNewPassword('newPassword', typed.newPassword, person);
  if (!accepted.ok) return accepted;
  const passwordHash = await hashPassword(accepted.value);
  return write(actor, 'reset-password', null, async (tx) => {
    if (!(await useToken(tx, { tokenHash: tokenHash(typed.token), purpose, now }))) return err(LINK_IS_SPENT);
    await setPasswordHash(tx, person.id, passwordHash);
    await voidTokens(tx, { purpose, personId: person.id, now });
    await endSessionsOf(tx, person.id);
    await forgiveSignIn(tx, person.email, address, now);
    await audit(
      tx,
      { ...actor, person: { ...person, roles: [], deskIds: [] } },
      {
        action: 'password-reset',
        subjectKind: 'person',
        subjectId: String(person.id),
        borrowerId: null,
        deskId: null,
        summary: 'Set a new password by a link from a mail; all sessions ended',
        before: null,
        after: null,
      },
    );
    return ok(null);
  });
}

async function personOfLink(token: string, now: Date): Promise<SignInRecord | null> {
  if (!hasTokenShape(token)) return null;
  return inTransaction(async (tx) => {
    const found = await findToken(tx, { tokenHash: tokenHash(token), purpose, now });
    if (!found || found.personId === null) return null;
    const person = await findSignInById(tx, found.personId);
    return person?.isActive ? person : null;
  });
}
