import '../support/useDatabase.ts';
import { request } from 'node:http';
import { beforeAll, describe, expect, test } from 'vitest';
import { baseUrl, Client, signedIn } from '../support/client.ts';
import { makePersonAlone, PASSWORD, type TestPerson } from '../support/twoDesks.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute, select } from '../../src/server/db/sql.ts';
import { tokenHash } from '../../src/server/auth/tokens.ts';

let person: TestPerson;

beforeAll(async () => {
  person = await makePersonAlone('auditor');
});

const statusOf = async (client: Client): Promise<number> => (await client.send('/api/v1/audit-log')).status;

const sql = (text: string, values: Record<string, string | number | Date>) =>
  inTransaction((tx) => execute(tx, text, values));

describe('a session', () => {
  test('begins with a cookie that scripts cannot read and other sites do not send, and never in a body', async () => {
    const client = new Client();
    const answer = await client.send('/api/v1/session', {
      json: { email: person.email, password: PASSWORD },
    });
    const [cookie = ''] = answer.headers.getSetCookie();
    expect(answer.status).toBe(204);
    expect(cookie).toMatch(/^(__Host-)?underkeel=[A-Za-z0-9_-]{43};/);
    expect(cookie).toContain('Path=/');
    expect(cookie).toContain('HttpOnly');
    expect(cookie).toContain('SameSite=Lax');
    expect(cookie).not.toMatch(/domain=/i);
    expect(cookie.includes('Secure')).toBe(baseUrl().startsWith('https:'));
    expect(await answer.text()).toBe('');
  });

  test('is stored as the hash of its token', async () => {
    const client = await signedIn(person.email, PASSWORD);
    const rows = await inTransaction((tx) =>
      select<{ id: string }>(tx, 'select id from sessions where person_id = :id', { id: person.id }),
    );
    expect(rows.map((row) => row.id)).toContain(tokenHash(client.session ?? ''));
    expect(rows.map((row) => row.id)).not.toContain(client.session);
  });

  test('gets a new token at sign-in; the one before is worth nothing', async () => {
    const client = await signedIn(person.email, PASSWORD);
    const before = new Client();
    before.cookies.set('underkeel', client.session ?? '');
    expect(await statusOf(before)).toBe(200);
    await client.send('/api/v1/session', { json: { email: person.email, password: PASSWORD } });
    expect(client.session).not.toBe(before.cookies.get('underkeel'));
    expect(await statusOf(client)).toBe(200);
    expect(await statusOf(before)).toBe(401);
  });

  test('does not take over a token that was planted before sign-in', async () => {
    const planted = 'A'.repeat(43);
    const client = new Client();
    client.cookies.set('underkeel', planted);
    await client.send('/api/v1/session', { json: { email: person.email, password: PASSWORD } });
    expect(client.session).not.toBe(planted);
    const other = new Client();
    other.cookies.set('underkeel', planted);
    expect(await statusOf(other)).toBe(401);
  });

  test('ends on the server at sign-out: its cookie cannot be replayed', async () => {
    const client = await signedIn(person.email, PASSWORD);
    const copy = new Client();
    copy.cookies.set('underkeel', client.session ?? '');
    expect((await client.send('/api/v1/session/end', { json: {} })).status).toBe(204);
    expect(client.session).toBeUndefined();
    expect(await statusOf(copy)).toBe(401);
  });

  test('ends after the idle time and is not ended just before', async () => {
    const client = await signedIn(person.email, PASSWORD);
    const id = tokenHash(client.session ?? '');
    const seenMinutesAgo = (minutes: number) =>
      sql('update sessions set last_seen_at = :at where id = :id', {
        id,
        at: new Date(Date.now() - minutes * 60_000),
      });
    await seenMinutesAgo(29.9);
    expect(await statusOf(client)).toBe(200);
    await seenMinutesAgo(30.1);
    expect(await statusOf(client)).toBe(401);
  });

  test('ends after its whole life however much it is used', async () => {
    const client = await signedIn(person.email, PASSWORD);
    const id = tokenHash(client.session ?? '');
    const endsInMs = (ms: number) =>
      sql('update sessions set expires_at = :at where id = :id', { id, at: new Date(Date.now() + ms) });
    await endsInMs(5_000);
    expect(await statusOf(client)).toBe(200);
    await endsInMs(-1);
    expect(await statusOf(client)).toBe(401);
  });

  test('ends with the next request where the person is made inactive, and a role goes at once', async () => {
    const other = await makePersonAlone('auditor');
    const client = await signedIn(other.email, PASSWORD);
    await sql('delete from person_roles where person_id = :id', { id: other.id });
    expect(await statusOf(client)).toBe(403);
    await sql('update people set is_active = 0 where id = :id', { id: other.id });
    expect(await statusOf(client)).toBe(401);
  });
});

describe('signing in', () => {
  test('answers an unknown address, a wrong password and an inactive person alike', async () => {
    const inactive = await makePersonAlone('auditor');
    await sql('update people set is_active = 0 where id = :id', { id: inactive.id });
    const answers = await Promise.all(
      [person.email, 'nobody.at.all@lender.example', inactive.email].map(async (email) => {
        const password = email === inactive.email ? PASSWORD : 'not the password at all';
        const answer = await new Client().send('/api/v1/session', { json: { email, password } });
        const { instance, ...body } = (await answer.json()) as Record<string, unknown>;
        expect(instance).toMatch(/^urn:request:/);
        const names = [...answer.headers.keys()].filter((name) => name !== 'date').sort();
        return { status: answer.status, names, body };
      }),
    );
    expect(answers[0]?.status).toBe(401);
    expect(answers[1]).toEqual(answers[0]);
    expect(answers[2]).toEqual(answers[0]);
  });

  test('spends a password hash on an unknown address too', async () => {
    const timed = async (email: string) => {
      const from = performance.now();
      await new Client().send('/api/v1/session', { json: { email, password: 'not the password at all' } });
      return performance.now() - from;
    };
    const known = await makePersonAlone('auditor');
    const times: { known: number[]; unknown: number[] } = { known: [], unknown: [] };
    for (let round = 0; round < 8; round += 1) {
      times.known.push(await timed(known.email));
      times.unknown.push(await timed(`nobody.${round}@lender.example`));
    }
    const median = (list: number[]) => [...list].sort((a, b) => a - b)[4] ?? 0;
    // An answer without a hash would come some 20 ms sooner; the machine's noise is wider than a finer bound.
    expect(median(times.unknown)).toBeGreaterThan(median(times.known) * 0.5);
    expect(median(times.unknown)).toBeLessThan(median(times.known) * 2);
  });

  test('refuses the eleventh wrong password of one account, says when to come back, and lets others in', async () => {
    const target = await makePersonAlone('auditor');
    const tries: number[] = [];
    let last: Response | null = null;
    for (let n = 1; n <= 11; n += 1) {
      last = await new Client().send('/api/v1/session', {
        json: { email: target.email, password: `wrong number ${n}` },
        headers: { 'x-forwarded-for': `203.0.113.${n}` },
      });
      tries.push(last.status);
    }
    expect(tries).toEqual([...Array<number>(10).fill(401), 429]);
    expect(Number(last?.headers.get('retry-after'))).toBeGreaterThan(0);
    expect(Number(last?.headers.get('retry-after'))).toBeLessThanOrEqual(900);
    const right = { json: { email: target.email, password: PASSWORD } };
    expect((await new Client().send('/api/v1/session', right)).status).toBe(429);
    await sql('update rate_limits set expire = :past where `key` like :name and points >= 10', {
      past: Date.now() - 1,
      name: 'sign-in-here:%',
    });
    expect((await new Client().send('/api/v1/session', right)).status).toBe(204);
  });

  test('leads to a page of the product and nowhere else', async () => {
    for (const next of [
      '//evil.example',
      '/\\evil.example',
      'https:evil.example',
      '/%2f%2fevil.example',
      '/\t/evil.example',
      'javascript:alert(1)',
    ]) {
      const answer = await new Client().send('/api/v1/session', {
        form: { email: person.email, password: PASSWORD, next },
      });
      expect(answer.status).toBe(303);
      const target = new URL(answer.headers.get('location') ?? '', baseUrl());
      expect(target.origin, next).toBe(baseUrl());
    }
    const good = await new Client().send('/api/v1/session', {
      form: { email: person.email, password: PASSWORD, next: '/alerts?sort=due' },
    });
    expect(good.headers.get('location')).toBe('/alerts?sort=due');
  });

  test('works without a script: what is wrong stands on the page, what was typed too, the password never', async () => {
    const client = new Client();
    const answer = await client.send('/api/v1/session', {
      form: { email: 'nobody.here@lender.example', password: 'a password that is wrong' },
    });
    expect(answer.status).toBe(303);
    const page = await (await client.send(answer.headers.get('location') ?? '')).text();
    expect(page).toContain('Address and password do not belong together');
    expect(page).toContain('nobody.here@lender.example');
    expect(page).not.toContain('a password that is wrong');
    const again = await (await client.send('/sign-in')).text();
    expect(again).not.toContain('do not belong together');
  });
});

describe('a page or route without a session', () => {
  test('leads to signing in and back', async () => {
    const answer = await new Client().send('/account?x=1');
    expect(answer.status).toBe(303);
    expect(answer.headers.get('location')).toBe('/sign-in?next=%2Faccount%3Fx%3D1');
  });

  test('answers 401 as a problem that says nothing was changed', async () => {
    const answer = await new Client().send('/api/v1/password', {
      json: { currentPassword: 'x', newPassword: 'y' },
    });
    expect(answer.status).toBe(401);
    expect(answer.headers.get('content-type')).toBe('application/problem+json; charset=utf-8');
    expect(await answer.text()).toContain('Nothing was changed');
  });

  test('leads a plain form to signing in, since nobody can read a problem there', async () => {
    const answer = await new Client().send('/api/v1/account/digest', {
      form: { digest: 'wanted' },
      headers: { accept: 'text/html', referer: `${baseUrl()}/account` },
    });
    expect(answer.status).toBe(303);
    expect(answer.headers.get('location')).toBe('/sign-in?next=%2Faccount&ended=1');
  });
});

describe('a password', () => {
  test('is changed only with the current one, ends all other sessions and leaves this one', async () => {
    const owner = await makePersonAlone('auditor');
    const here = await signedIn(owner.email, PASSWORD);
    const there = await signedIn(owner.email, PASSWORD);
    const change = (currentPassword: string, newPassword: string) =>
      here.send('/api/v1/password', { json: { currentPassword, newPassword } });
    expect((await change('not the current one', 'seven lanterns drift north')).status).toBe(403);
    expect((await change(PASSWORD, 'short of fiftee')).status, '15 characters').toBe(204);
    expect((await change('short of fiftee', 'short of fifte')).status, '14 characters').toBe(422);
    expect((await change('short of fiftee', 'passwordpassword1')).status, 'common words').toBe(422);
    expect(await statusOf(here)).toBe(200);
    expect(await statusOf(there)).toBe(401);
  });
});

describe('a forgotten password', () => {
  const mailsTo = (email: string) =>
    inTransaction((tx) =>
      select<{ text_body: string; html_body: string }>(
        tx,
        'select text_body, html_body from outbox where to_address = :email order by id',
        { email },
      ),
    );

  test('is answered alike for a known and an unknown address', async () => {
    const owner = await makePersonAlone('auditor');
    const ask = async (email: string) => {
      const from = performance.now();
      const answer = await new Client().send('/api/v1/password/forgot', { json: { email } });
      return { status: answer.status, body: await answer.text(), ms: performance.now() - from };
    };
    const known = await ask(owner.email);
    const unknown = await ask('nobody.at.all@lender.example');
    expect({ status: known.status, body: known.body }).toEqual({ status: 204, body: '' });
    expect({ status: unknown.status, body: unknown.body }).toEqual({ status: 204, body: '' });
    expect(Math.min(known.ms, unknown.ms)).toBeGreaterThanOrEqual(295);
    expect(await mailsTo(owner.email)).toHaveLength(1);
    expect(await mailsTo('nobody.at.all@lender.example')).toHaveLength(0);
  });

  test('sends a link to the configured address whatever the request says its host is', async () => {
    const owner = await makePersonAlone('auditor');
    const body = JSON.stringify({ email: owner.email });
    const { hostname, port } = new URL(baseUrl());
    await new Promise<void>((done, fail) => {
      const sent = request(
        {
          hostname,
          port,
          method: 'POST',
          path: '/api/v1/password/forgot',
          headers: {
            host: 'evil.example',
            'x-forwarded-host': 'evil.example',
            forwarded: 'host=evil.example',
            origin: baseUrl(),
            'content-type': 'application/json',
            'content-length': Buffer.byteLength(body),
          },
        },
        (answer) => answer.resume().on('end', done),
      );
      sent.on('error', fail);
      sent.end(body);
    });
    const [mail] = await mailsTo(owner.email);
    expect(mail?.text_body).toContain(`${baseUrl()}/reset-password?token=`);
    expect(mail?.text_body).not.toContain('evil');
    expect(mail?.html_body).not.toContain('evil');
  });

  test('is set anew by a link that works once, which looking does not use up, and all sessions end', async () => {
    const owner = await makePersonAlone('auditor');
    const session = await signedIn(owner.email, PASSWORD);
    await new Client().send('/api/v1/password/forgot', { json: { email: owner.email } });
    const [mail] = await mailsTo(owner.email);
    const token = /token=([A-Za-z0-9_-]{43})/.exec(mail?.text_body ?? '')?.[1] ?? '';
    for (let look = 0; look < 3; look += 1)
      expect((await new Client().send(`/reset-password?token=${token}`)).status).toBe(200);
    const set = (newPassword: string) =>
      new Client().send('/api/v1/password/reset', { json: { token, newPassword } });
    expect((await set('too short')).status).toBe(422);
    expect((await set('seven lanterns drift north')).status).toBe(204);
    expect((await set('eight lanterns drift south')).status).toBe(410);
    expect((await new Client().send(`/reset-password?token=${token}`)).status).toBe(410);
    expect(await statusOf(session)).toBe(401);
    expect(await statusOf(await signedIn(owner.email, 'seven lanterns drift north'))).toBe(200);
  });
});

describe('every answer', () => {
  test.each([
    ['a page', '/sign-in', 200],
    ['a redirect', '/', 303],
    ['a missing page', '/not-there', 404],
    ['a missing route', '/api/v1/not-there', 404],
    ['a refused route', '/api/v1/audit-log', 401],
    ['a stray file name', '/.git/HEAD', 404],
  ])('carries the security headers: %s', async (_what, path, status) => {
    const answer = await new Client().send(path);
    expect(answer.status).toBe(status);
    const policy = answer.headers.get('content-security-policy') ?? '';
    expect(policy).toContain("default-src 'none'");
    expect(policy).toContain("frame-ancestors 'none'");
    expect(policy).toContain("base-uri 'none'");
    expect(policy).not.toContain('unsafe-inline');
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
    expect(answer.headers.get('referrer-policy')).toBe('same-origin');
    expect(answer.headers.get('cross-origin-opener-policy')).toBe('same-origin');
    expect(answer.headers.get('cache-control')).toBe('no-store');
    expect(answer.headers.get('x-powered-by')).toBeNull();
    expect(answer.headers.get('access-control-allow-origin')).toBeNull();
    const type = answer.headers.get('content-type');
    if (type?.startsWith('text/html')) expect(type).toBe('text/html; charset=utf-8');
  });
});
