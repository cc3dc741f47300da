import type { Transaction } from 'sequelize';
import { hasTokenShape, tokenHash, unsubscribeToken } from '../auth/tokens.ts';
import { env } from '../config/env.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findByUnsubscribeHash, setWantsDigest, storeUnsubscribeHash } from '../db/repositories/people.ts';
import { err, ok } from '../../core/result.ts';
import type { Actor, PersonActor } from './actor.ts';
import { audit, write, type Outcome } from './write.ts';

/** Where a digest leads who wants no more: a page for the reader, an address for the mail program (RFC 8058). */
export async function unsubscribeLinks(
  tx: Transaction,
  personId: number,
): Promise<{ page: string; oneClick: string }> {
  const token = unsubscribeToken(personId);
  await storeUnsubscribeHash(tx, personId, tokenHash(token));
  const address = (path: string) => new URL(`${path}?token=${token}`, env().APP_URL).href;
  return { page: address('/unsubscribe'), oneClick: address('/api/v1/unsubscribe') };
}

/** Whose link it is, for the page that asks before it does anything. */
export async function personOfUnsubscribeLink(
  token: string,
): Promise<{ name: string; wantsDigest: boolean } | null> {
  if (!hasTokenShape(token)) return null;
  return inTransaction((tx) => findByUnsubscribeHash(tx, tokenHash(token)));
}

/** No more digests for the person of the link; escalations are not digests and go on. */
export const unsubscribe = (actor: Actor, token: string): Promise<Outcome<null>> =>
  write(actor, 'unsubscribe', null, async (tx) => {
    const person = await findByUnsubscribeHash(tx, tokenHash(token));
    if (!person) return err({ kind: 'not-found', what: 'link' });
    if (person.wantsDigest) await recordChoice(tx, actor, person.id, false);
    return ok(null);
  });

/** The person's own choice on the account page. */
export const chooseDigest = (actor: PersonActor, wanted: boolean): Promise<Outcome<null>> =>
  write(actor, 'choose-digest', { wanted }, async (tx) => {
    await recordChoice(tx, actor, actor.person.id, wanted);
    return ok(null);
  });

async function recordChoice(tx: Transaction, actor: Actor, personId: number, wanted: boolean): Promise<void> {
  await setWantsDigest(tx, personId, wanted);
  await audit(tx, actor, {
    action: wanted ? 'digest-subscribed' : 'digest-unsubscribed',
    subjectKind: 'person',
    subjectId: String(personId),
    borrowerId: null,
    deskId: null,
    summary: wanted ? 'Morning mail wanted again' : 'Morning mail no longer wanted',
    before: { wantsDigest: !wanted },
    after: { wantsDigest: wanted },
  });
}
