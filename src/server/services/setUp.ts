/** The first minutes of an empty installation: one link, one page, one administrator. */
import type { FirstSetUp } from '../../contracts/session.ts';
import type { ServiceProblem } from '../../contracts/problem.ts';
import { err, ok } from '../../core/result.ts';
import { countTry, ONE_TIME_LINK } from '../auth/limits.ts';
import { hashPassword } from '../auth/passwords.ts';
import { hasTokenShape, newToken, tokenHash } from '../auth/tokens.ts';
import { env } from '../config/env.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { addDeskMember, insertDesk } from '../db/repositories/desks.ts';
import { findLender, insertLender } from '../db/repositories/lender.ts';
import { anybodyExists, insertPerson } from '../db/repositories/people.ts';
import { findToken, insertToken, useToken, voidTokens } from '../db/repositories/tokens.ts';
import type { Actor } from './actor.ts';
import { acceptNewPassword } from './newPassword.ts';
import { tooManyTries } from './tooManyTries.ts';
import { audit, write, type Outcome } from './write.ts';

const purpose = 'set-up';
const LINK_HOURS = 24;

/** The night starts after the day's last figures are in and before the morning's first reader; a setting. */
const NIGHT_AT_UTC = '01:30';

const LINK_IS_SPENT: ServiceProblem = {
  kind: 'gone',
  detail:
    'This link was used or has run out, or the product has been set up. Nothing was changed. Where it has not been set up, start the product again: it prints a new link.',
};

/** A new link to the set-up page, which voids the one before; null where there are people already. */
export const makeSetUpLink = (now: Date): Promise<string | null> =>
  inTransaction(async (tx) => {
    if (await anybodyExists(tx)) return null;
    const token = newToken();
    await voidTokens(tx, { purpose, personId: null, now });
    await insertToken(tx, {
      tokenHash: tokenHash(token),
      purpose,
      personId: null,
      expiresAt: new Date(now.getTime() + LINK_HOURS * 3_600_000),
    });
    return new URL(`/set-up?token=${token}`, env().APP_URL).href;
  });

export async function isSetUpLinkGood(token: string, now: Date): Promise<boolean> {
  if (!hasTokenShape(token)) return false;
  return inTransaction(
    async (tx) =>
      !(await anybodyExists(tx)) &&
      (await findToken(tx, { tokenHash: tokenHash(token), purpose, now })) !== null,
  );
}

/** Lender, first administrator and first desk in one transaction; the link is used up with it. */
export async function setUp(actor: Actor, typed: FirstSetUp): Promise<Outcome<null>> {
  const { now } = actor;
  const wait = await inTransaction((tx) => countTry(tx, ONE_TIME_LINK, actor.address, now));
  if (wait !== null) return tooManyTries('use a link', wait);
  if (!(await isSetUpLinkGood(typed.token, now))) return err(LINK_IS_SPENT);
  const named = { name: typed.personName, email: typed.email };
  const accepted = acceptNewPassword('password', typed.password, named, [typed.lenderName]);
  if (!accepted.ok) return accepted;
  const passwordHash = await hashPassword(accepted.value);
  return write(actor, 'set-up', null, async (tx) => {
    const used = await useToken(tx, { tokenHash: tokenHash(typed.token), purpose, now });
    if (!used || (await anybodyExists(tx)) || (await findLender(tx))) return err(LINK_IS_SPENT);
    await insertLender(tx, {
      name: typed.lenderName,
      zone: typed.zone,
      nightAtUtc: NIGHT_AT_UTC,
      seededOn: null,
    });
    const id = await insertPerson(tx, { ...named, passwordHash, roles: ['administrator'], now });
    const deskId = await insertDesk(tx, { name: typed.deskName, headId: null });
    await addDeskMember(tx, deskId, id);
    const person = { ...named, id, roles: ['administrator'] as const, deskIds: [deskId] };
    await audit(
      tx,
      { ...actor, person },
      {
        action: 'set-up',
        subjectKind: 'lender',
        subjectId: '1',
        borrowerId: null,
        deskId,
        summary: `Set up ${typed.lenderName}: first administrator ${typed.personName}, first desk ${typed.deskName}`,
        before: null,
        after: {
          lender: typed.lenderName,
          zone: typed.zone,
          administrator: typed.email,
          desk: typed.deskName,
        },
      },
    );
    return ok(null);
  });
}
