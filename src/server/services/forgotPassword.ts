import type { Transaction } from 'sequelize';
import { countTry, FORGOT_ACCOUNT, FORGOT_ADDRESS } from '../auth/limits.ts';
import { newToken, tokenHash } from '../auth/tokens.ts';
import { env } from '../config/env.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { holdAuditHead } from '../db/repositories/audit.ts';
import { queueMail } from '../db/repositories/outbox.ts';
import { findSignIn, mailKey, type SignInRecord } from '../db/repositories/people.ts';
import { insertToken, voidTokens } from '../db/repositories/tokens.ts';
import type { ForgottenPassword } from '../../contracts/session.ts';
import { ok } from '../../core/result.ts';
import { resetMail } from '../mail/resetMail.ts';
import type { Actor } from './actor.ts';
import { tooManyTries } from './tooManyTries.ts';
import { audit, type Outcome } from './write.ts';

const LINK_MINUTES = 30;

/** Longer than the work takes: a known and an unknown address are answered after the same time. */
const ANSWER_AFTER_MS = 300;

/** Queues a mail with a link where the address is a person's; the answer never says whether it is. */
export async function forgotPassword(actor: Actor, typed: ForgottenPassword): Promise<Outcome<null>> {
  const wait = await inTransaction((tx) => countTry(tx, FORGOT_ADDRESS, actor.address, actor.now));
  if (wait !== null) return tooManyTries('ask for a link', wait);
  const pause = new Promise((resume) => setTimeout(resume, ANSWER_AFTER_MS));
  await Promise.all([pause, inTransaction((tx) => queueLink(tx, actor, typed.email))]);
  return ok(null);
}

async function queueLink(tx: Transaction, actor: Actor, email: string): Promise<void> {
  await holdAuditHead(tx);
  const tooOften = await countTry(tx, FORGOT_ACCOUNT, mailKey(email), actor.now);
  const found = await findSignIn(tx, email);
  const person = tooOften === null && found?.isActive ? found : null;
  if (person) await queueLinkFor(tx, actor, person);
  await audit(tx, actor, {
    action: 'password-link-asked',
    subjectKind: 'person',
    subjectId: found ? String(found.id) : '-',
    borrowerId: null,
    deskId: null,
    summary: `Link to set a new password asked for ${found?.name ?? 'an unknown address'}${person ? '' : '; no mail sent'}`,
    before: null,
    after: null,
  });
}

async function queueLinkFor(tx: Transaction, actor: Actor, person: SignInRecord): Promise<void> {
  const { now } = actor;
  const token = newToken();
  const hash = tokenHash(token);
  const purpose = 'reset-password';
  await voidTokens(tx, { purpose, personId: person.id, now });
  const expiresAt = new Date(now.getTime() + LINK_MINUTES * 60_000);
  await insertToken(tx, { tokenHash: hash, purpose, personId: person.id, expiresAt });
  const link = new URL(`/reset-password?token=${token}`, env().APP_URL).href;
  await queueMail(tx, {
    messageKey: `reset-password:${hash.slice(0, 32)}`,
    personId: person.id,
    toName: person.name,
    toAddress: person.email,
    ...resetMail({ name: person.name, link, minutes: LINK_MINUTES }),
    headers: {},
    now,
  });
}
