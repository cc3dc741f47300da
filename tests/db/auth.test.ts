import '../support/useDatabase.ts';
import { beforeAll, describe, expect, test } from 'vitest';
import { countSignIn, countTry, FORGOT_ACCOUNT, forgiveSignIn } from '../../src/server/auth/limits.ts';
import { personOfToken, startSession } from '../../src/server/auth/sessions.ts';
import { tokenHash } from '../../src/server/auth/tokens.ts';
import { env } from '../../src/server/config/env.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { findSignIn } from '../../src/server/db/repositories/people.ts';
import { findSession } from '../../src/server/db/repositories/sessions.ts';
import { execute, select, selectOne } from '../../src/server/db/sql.ts';
import { changePassword } from '../../src/server/services/changePassword.ts';
import { forgotPassword } from '../../src/server/services/forgotPassword.ts';
import { isResetLinkGood, resetPassword } from '../../src/server/services/resetPassword.ts';
import { isSetUpLinkGood, makeSetUpLink, setUp } from '../../src/server/services/setUp.ts';
import { signIn } from '../../src/server/services/signIn.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';
import { makePersonAlone, makeTwoDesks, PASSWORD } from '../support/twoDesks.ts';

await useOwnDatabase();

const MINUTE = 60_000;
const later = (from: Date, ms: number) => new Date(from.getTime() + ms);
const actor = (now: Date, address = '192.0.2.1') => ({
  person: null,
  requestId: 'request of the tests',
  address,
  idempotencyKey: null,
  now,
});
const tokenIn = (link: string | null | undefined) => /token=([A-Za-z0-9_-]{43})/.exec(link ?? '')?.[1] ?? '';

/** First, because it asks for an installation without people. */
describe('an empty installation', () => {
  const typed = (token: string) => ({
    token,
    lenderName: 'Harbour Lending',
    zone: 'Europe/Amsterdam',
    personName: 'Ada North',
    email: 'Ada@harbour.example',
    password: 'kettle marble fathom osier',
    deskName: 'Northern desk',
  });

  test('is set up once by the newest link, by one of two at the same moment', async () => {
    const now = new Date();
    const first = tokenIn(await makeSetUpLink(now));
    const second = tokenIn(await makeSetUpLink(now));
    expect(await isSetUpLinkGood(first, now), 'a newer link voids the older').toBe(false);
    expect(await isSetUpLinkGood(second, later(now, 24 * 60 * MINUTE - 1))).toBe(true);
    expect(await isSetUpLinkGood(second, later(now, 24 * 60 * MINUTE)), 'a day later').toBe(false);
    const outcomes = await Promise.all([
      setUp(actor(now), typed(second)),
      setUp(actor(now), { ...typed(second), email: 'other@harbour.example', deskName: 'Other desk' }),
    ]);
    expect(outcomes.filter((outcome) => outcome.ok)).toHaveLength(1);
    expect(outcomes.find((outcome) => !outcome.ok)).toMatchObject({ error: { kind: 'gone' } });
    expect(await isSetUpLinkGood(second, now)).toBe(false);
    expect(await makeSetUpLink(now), 'nobody gets a link once there are people').toBeNull();
  });

  test('then has one lender, one desk, one administrator who can sign in, and an audit entry by them', async () => {
    const counts = await inTransaction((tx) =>
      selectOne<{ lenders: number; desks: number; people: number }>(
        tx,
        `select (select count(*) from lenders) as lenders, (select count(*) from desks) as desks,
           (select count(*) from people) as people`,
      ),
    );
    expect(counts).toEqual({ lenders: 1, desks: 1, people: 1 });
    const entry = await inTransaction((tx) =>
      selectOne<{ person_name: string; after_json: string }>(
        tx,
        `select person_name, after_json from audit_entries where action = 'set-up'`,
      ),
    );
    expect(entry?.after_json).not.toContain('kettle');
    const email = String((JSON.parse(entry?.after_json ?? '{}') as { administrator?: string }).administrator);
    const signedIn = await signIn(actor(new Date()), { email, password: 'kettle marble fathom osier' }, null);
    expect(signedIn.ok).toBe(true);
  });
});

describe('a session', () => {
  test('ends when its idle time is over, not a millisecond before', async () => {
    const person = await makePersonAlone('analyst');
    const now = new Date();
    const token = await inTransaction((tx) => startSession(tx, person.id, now));
    const idle = env().SESSION_IDLE_MINUTES * MINUTE;
    const seenAt = (at: Date) =>
      inTransaction((tx) =>
        execute(tx, 'update sessions set last_seen_at = :at where id = :id', { at, id: tokenHash(token) }),
      );
    const alive = async (at: Date) => (await inTransaction((tx) => personOfToken(tx, token, at))) !== null;
    expect(await alive(later(now, idle - 1))).toBe(true);
    await seenAt(now);
    expect(await alive(later(now, idle))).toBe(false);
    expect(await inTransaction((tx) => findSession(tx, tokenHash(token))), 'and is gone').toBeNull();
  });

  test('writes down its last use at most once a minute', async () => {
    const person = await makePersonAlone('analyst');
    const now = new Date();
    const token = await inTransaction((tx) => startSession(tx, person.id, now));
    const lastSeen = async (useAt: Date) => {
      await inTransaction((tx) => personOfToken(tx, token, useAt));
      return (await inTransaction((tx) => findSession(tx, tokenHash(token))))?.lastSeenAt;
    };
    expect(await lastSeen(later(now, MINUTE - 1))).toEqual(now);
    expect(await lastSeen(later(now, MINUTE))).toEqual(later(now, MINUTE));
  });

  test('never moves its end, however much it is used', async () => {
    const person = await makePersonAlone('analyst');
    const now = new Date();
    const token = await inTransaction((tx) => startSession(tx, person.id, now));
    for (let minutes = 20; minutes <= 60; minutes += 20)
      await inTransaction((tx) => personOfToken(tx, token, later(now, minutes * MINUTE)));
    const session = await inTransaction((tx) => findSession(tx, tokenHash(token)));
    expect(session?.expiresAt).toEqual(later(now, env().SESSION_LIFETIME_HOURS * 60 * MINUTE));
  });

  test('knows roles, desks and their names as they are at this moment', async () => {
    const { north, south } = await makeTwoDesks();
    const now = new Date();
    const token = await inTransaction((tx) => startSession(tx, north.analyst.id, now));
    const read = () => inTransaction((tx) => personOfToken(tx, token, now));
    expect((await read())?.person).toMatchObject({ roles: ['analyst'], deskIds: [north.desk] });
    await inTransaction((tx) =>
      execute(tx, 'insert into desk_members (desk_id, person_id) values (:desk, :person)', {
        desk: south.desk,
        person: north.analyst.id,
      }),
    );
    await inTransaction((tx) =>
      execute(tx, `insert into person_roles (person_id, role) values (:person, 'no such role')`, {
        person: north.analyst.id,
      }),
    );
    const now2 = await read();
    expect(now2?.person.deskIds).toEqual([north.desk, south.desk].sort((a, b) => a - b));
    expect(now2?.person.roles, 'a role that the policy does not know gives nothing').toEqual(['analyst']);
    expect(now2?.deskNames).toHaveLength(2);
  });
});

describe('the limit of tries', () => {
  const tries = async (n: number, account: string, address: string, now: Date) => {
    const waits: (number | null)[] = [];
    for (let i = 0; i < n; i += 1)
      waits.push(await inTransaction((tx) => countSignIn(tx, account, address, now)));
    return waits;
  };

  test('allows ten for one account from one address in a quarter of an hour, and begins anew after it', async () => {
    const now = new Date();
    const waits = await tries(11, 'ten@lender.example', '192.0.2.10', now);
    expect(waits.slice(0, 10)).toEqual(Array(10).fill(null));
    expect(waits[10]).toBe(900);
    expect(
      await tries(1, 'TEN@lender.example ', '192.0.2.10', now),
      'the same account in other letters',
    ).toEqual([900]);
    expect(await tries(1, 'ten@lender.example', '192.0.2.10', later(now, 900_000 - 1))).toEqual([1]);
    expect(await tries(1, 'ten@lender.example', '192.0.2.10', later(now, 900_000))).toEqual([null]);
  });

  test('allows a hundred from one address over all accounts', async () => {
    const now = new Date();
    const waits: (number | null)[] = [];
    for (let n = 0; n < 101; n += 1)
      waits.push(...(await tries(1, `many.${n}@lender.example`, '192.0.2.20', now)));
    expect(waits.slice(0, 100)).toEqual(Array(100).fill(null));
    expect(waits[100]).toBe(900);
  });

  test('does not let a stranger lock out a person who signed in from this address before', async () => {
    const now = new Date();
    const account = 'wanted@lender.example';
    await inTransaction((tx) => countSignIn(tx, account, '192.0.2.30', now));
    await inTransaction((tx) => forgiveSignIn(tx, account, '192.0.2.30', now));
    for (let n = 0; n < 60; n += 1) await tries(1, account, `198.51.100.${n}`, now);
    expect(await tries(1, account, '203.0.113.7', now), 'from a new address').toEqual([900]);
    expect(await tries(1, account, '192.0.2.30', now), 'from the address of before').toEqual([null]);
  });

  test('counts tries that come at the same moment one by one', async () => {
    const now = new Date();
    const waits = await Promise.all(
      Array.from({ length: 8 }, () => inTransaction((tx) => countTry(tx, FORGOT_ACCOUNT, 'at once', now))),
    );
    expect(waits.filter((wait) => wait === null)).toHaveLength(FORGOT_ACCOUNT.points);
  });
});

describe('a link to set a new password', () => {
  const ask = async (email: string, now: Date) => {
    await forgotPassword(actor(now, `198.51.100.${Math.trunc(now.getTime() % 200)}`), { email });
    const mails = await inTransaction((tx) =>
      select<{ text_body: string }>(
        tx,
        'select text_body from outbox where to_address = :email order by id',
        {
          email,
        },
      ),
    );
    return tokenIn(mails.at(-1)?.text_body);
  };

  test('holds for thirty minutes, and a newer one voids it', async () => {
    const person = await makePersonAlone('analyst');
    const now = new Date();
    const older = await ask(person.email, now);
    expect(await isResetLinkGood(older, later(now, 30 * MINUTE - 1))).toBe(true);
    expect(await isResetLinkGood(older, later(now, 30 * MINUTE))).toBe(false);
    const newer = await ask(person.email, now);
    expect(await isResetLinkGood(older, now)).toBe(false);
    expect(await isResetLinkGood(newer, now)).toBe(true);
  });

  test('is stored as a hash, sets the password once, and is void after the password was changed otherwise', async () => {
    const person = await makePersonAlone('analyst');
    const now = new Date();
    const token = await ask(person.email, now);
    const stored = await inTransaction((tx) =>
      select<{ token_hash: string }>(tx, 'select token_hash from one_time_tokens where person_id = :id', {
        id: person.id,
      }),
    );
    expect(stored.map((row) => row.token_hash)).toEqual([tokenHash(token)]);
    const both = await Promise.all([
      resetPassword(actor(now), { token, newPassword: 'seven lanterns drift north' }),
      resetPassword(actor(now), { token, newPassword: 'eight lanterns drift south' }),
    ]);
    expect(both.filter((outcome) => outcome.ok)).toHaveLength(1);

    const unused = await ask(person.email, now);
    const currentPassword = both[0]?.ok ? 'seven lanterns drift north' : 'eight lanterns drift south';
    const self = { ...actor(now), person: { ...person, roles: [], deskIds: [] } };
    const changed = await changePassword(self, { currentPassword, newPassword: 'nine lanterns drift home' });
    expect(changed.ok).toBe(true);
    expect(await isResetLinkGood(unused, now)).toBe(false);
  });

  test('goes three times an hour to one person, whoever asks', async () => {
    const person = await makePersonAlone('analyst');
    const now = new Date();
    for (let n = 0; n < 5; n += 1) await ask(person.email, later(now, n));
    const mails = await inTransaction((tx) =>
      select(tx, 'select id from outbox where to_address = :email', { email: person.email }),
    );
    expect(mails).toHaveLength(3);
  });
});

describe('a password', () => {
  let stored: string;
  beforeAll(async () => {
    const person = await makePersonAlone('analyst');
    stored = (await inTransaction((tx) => findSignIn(tx, person.email.toUpperCase())))?.passwordHash ?? '';
  });

  test('is stored by argon2id with 19 MiB, two passes and one lane', () => {
    expect(stored).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    expect(stored).not.toContain(PASSWORD);
  });
});

test('no password, token or cookie stands in the audit log or in the keys of the limits', async () => {
  const person = await makePersonAlone('analyst');
  await signIn(actor(new Date()), { email: person.email, password: 'the wrong password here' }, null);
  await signIn(actor(new Date()), { email: 'typed my password here', password: PASSWORD }, null);
  const signedIn = await signIn(actor(new Date()), { email: person.email, password: PASSWORD }, null);
  const token = signedIn.ok ? signedIn.value.token : '';
  expect(token).toHaveLength(43);
  const rows = await inTransaction(async (tx) => [
    ...(await select(tx, 'select summary, subject_id, before_json, after_json from audit_entries')),
    ...(await select(tx, 'select `key` from rate_limits')),
    ...(await select(tx, 'select response from idempotency_keys')),
  ]);
  const text = JSON.stringify(rows);
  for (const secret of [PASSWORD, 'the wrong password here', 'typed my password here', token])
    expect(text).not.toContain(secret);
});
