/** Behind https and a named proxy: a process whose address is https, asked as the proxy would ask it. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { selectOne } from '../../src/server/db/sql.ts';
import { makePersonAlone, PASSWORD, type TestPerson } from '../support/twoDesks.ts';
import { startWebProcess, type WebProcess } from '../support/webProcess.ts';

const APP_URL = 'https://127.0.0.1';
let web: WebProcess;
let person: TestPerson;

beforeAll(async () => {
  web = await startWebProcess({ APP_URL, BEHIND_PROXY: '1', LOG_LEVEL: 'info' });
  person = await makePersonAlone('auditor');
});
afterAll(async () => {
  web.kill('SIGTERM');
  expect(await web.ended).toBe(0);
});

const send = (path: string, init: RequestInit = {}) =>
  fetch(web.address + path, { redirect: 'manual', ...init });

const signIn = (headers: Record<string, string> = {}, password = PASSWORD) =>
  send('/api/v1/session', {
    method: 'POST',
    headers: { origin: APP_URL, 'content-type': 'application/json', ...headers },
    body: JSON.stringify({ email: person.email, password }),
  });

describe('a cookie', () => {
  test('of a session is bound to this host and to https, and signs in under that name alone', async () => {
    const answer = await signIn();
    const cookies = answer.headers.getSetCookie();
    expect(cookies).toHaveLength(1);
    expect(cookies[0]).toMatch(
      /^__Host-underkeel=[A-Za-z0-9_-]{43}; (?=.*Path=\/)(?=.*HttpOnly)(?=.*Secure)(?=.*SameSite=Lax)/,
    );
    expect(cookies[0]).not.toMatch(/domain=|expires=|max-age=/i);
    const token = /=([^;]+)/.exec(cookies[0] ?? '')?.[1] ?? '';
    const status = async (cookie: string) =>
      (await send('/api/v1/audit-log', { headers: { cookie } })).status;
    expect(await status(`__Host-underkeel=${token}`)).toBe(200);
    expect(await status(`underkeel=${token}`), 'a name that another host could set').toBe(401);
  });

  test('of a form’s answer is bound likewise', async () => {
    const answer = await send('/api/v1/session', {
      method: 'POST',
      headers: { origin: APP_URL },
      body: new URLSearchParams({ email: person.email, password: 'not the password at all' }),
    });
    expect(answer.status).toBe(303);
    expect(answer.headers.getSetCookie().join()).toMatch(/^__Host-underkeel-form=.*Secure/);
  });
});

test.each([
  ['a page', '/sign-in', 200],
  ['a redirect', '/', 303],
  ['a redirect of the framework', '/sign-in//', 301],
  ['a missing page', '/not-there', 404],
  ['a refused route', '/api/v1/audit-log', 401],
  ['a file', '/favicon.svg', 200],
  ['a missing file', '/_astro/not-there.js', 404],
  ['an address that cannot be read', '/%zz', 400],
])(
  'every answer keeps the browser on https for a year, guesses no type and is not framed: %s',
  async (_, path, status) => {
    const answer = await send(path);
    expect(answer.status).toBe(status);
    expect(answer.headers.get('strict-transport-security')).toBe('max-age=31536000; includeSubDomains');
    expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
    expect(answer.headers.get('content-security-policy')).toContain("frame-ancestors 'none'");
    expect(answer.headers.get('location') ?? '/').toMatch(/^\/(?!\/)/);
  },
);

test.each([
  ['https', APP_URL, 204],
  ['http', 'http://127.0.0.1', 403],
  ['another port', 'https://127.0.0.1:8443', 403],
])('only a page of the https address may send: %s', async (_, origin, status) => {
  expect((await signIn({ origin })).status).toBe(status);
});

test('the audit log has the address that the proxy added last, whatever the client wrote before it', async () => {
  const answer = await signIn({ 'x-forwarded-for': '6.6.6.6, 198.51.100.77' }, 'not the password at all');
  expect(answer.status).toBe(401);
  const row = await inTransaction((tx) =>
    selectOne<{ address: string }>(
      tx,
      `select address from audit_entries where action = 'sign-in-failed' and subject_id = :id order by seq desc limit 1`,
      { id: person.id },
    ),
  );
  expect(row?.address).toBe('198.51.100.77');
});

test('the log is one JSON object a line whatever a request holds, and says no password, cookie or token', async () => {
  const cookie = (await signIn()).headers.getSetCookie()[0]?.split(';')[0] ?? '';
  const forged = '/api/v1/account/digest?x=%0d%0a{"level":60}';
  for (const path of [forged, '/api/v1/%0d%0aforged', '/\u2028'])
    expect(
      (await send(path, { method: 'POST', headers: { origin: 'https://evil.example\t', cookie } })).status,
    ).toBe(403);
  await send('/reset-password?token=' + 'T'.repeat(43));
  const lines = (
    await web.until(/foreign origin refused[\s\S]*foreign origin refused[\s\S]*foreign origin refused/, 5)
  )
    .trim()
    .split('\n');
  for (const line of lines) expect(() => JSON.parse(line) as unknown, line).not.toThrow();
  for (const secret of [PASSWORD, 'not the password at all', cookie.split('=')[1] ?? '', 'T'.repeat(43)])
    expect(lines.join('\n')).not.toContain(secret);
});
