/** The database is gone for a while: a web process of its own, whose way to the database is cut and joined again. */
import '../support/useDatabase.ts';
import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, inject, test } from 'vitest';
import { freePort } from '../../jobs/database.mjs';
import { openWay, type DatabaseWay } from '../support/databaseWay.ts';
import { makePersonAlone, PASSWORD } from '../support/twoDesks.ts';

let way: DatabaseWay;
let web: ChildProcess;
let address = '';
let cookie = '';

const get = (path: string, headers: Record<string, string> = {}) =>
  fetch(address + path, { headers: { cookie, ...headers }, redirect: 'manual' });

beforeAll(async () => {
  way = await openWay(inject('databaseUrl'));
  const port = await freePort();
  address = `http://127.0.0.1:${port}`;
  web = spawn(process.execPath, ['--import', 'tsx', 'jobs/server.ts'], {
    env: {
      ...process.env,
      ...inject('productSettings'),
      UNDERKEEL_SUPERVISED: '1',
      DATABASE_URL: way.url,
      APP_URL: address,
      HOST: '127.0.0.1',
      PORT: String(port),
    },
    // The standard input stays open as long as this process lives: a killed test run leaves nothing behind.
    stdio: ['pipe', 'ignore', 'ignore'],
  });
  for (let tries = 0; ; tries += 1) {
    try {
      if ((await fetch(`${address}/livez`)).ok) break;
    } catch (error) {
      if (tries > 100) throw error;
    }
    await sleep(100);
  }
  const person = await makePersonAlone('auditor');
  const signedIn = await fetch(`${address}/api/v1/session`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', origin: address },
    body: JSON.stringify({ email: person.email, password: PASSWORD }),
  });
  cookie = signedIn.headers.getSetCookie()[0]?.split(';')[0] ?? '';
  expect((await get('/api/v1/audit-log')).status).toBe(200);
});

afterAll(async () => {
  await way.cut();
  if (web.exitCode === null) {
    web.kill('SIGTERM');
    await once(web, 'exit');
  }
});

test('while the database is gone every request is told so at once, and after it the session goes on', async () => {
  await way.cut();
  const from = performance.now();
  const route = await get('/api/v1/audit-log');
  expect(route.status).toBe(503);
  expect(route.headers.get('content-type')).toBe('application/problem+json; charset=utf-8');
  expect(Number(route.headers.get('retry-after'))).toBeGreaterThan(0);
  const body = await route.text();
  expect(body).toContain('The database does not answer. Nothing was changed.');
  expect(body).not.toMatch(/ECONN|sequelize|select/i);

  const page = await get('/account', { accept: 'text/html' });
  expect(page.status).toBe(503);
  expect(page.headers.get('content-type')).toBe('text/html; charset=utf-8');
  expect(Number(page.headers.get('retry-after'))).toBeGreaterThan(0);
  expect(page.headers.get('content-security-policy')).toContain("default-src 'none'");
  expect(await page.text()).toContain('Nothing was changed');

  const form = await fetch(`${address}/api/v1/account/digest`, {
    method: 'POST',
    headers: {
      cookie,
      origin: address,
      accept: 'text/html',
      'content-type': 'application/x-www-form-urlencoded',
    },
    body: 'digest=wanted',
  });
  expect(form.status).toBe(503);
  expect(form.headers.get('content-type')).toBe('text/html; charset=utf-8');
  expect((await get('/livez')).status).toBe(200);
  expect(performance.now() - from, 'milliseconds for four answers').toBeLessThan(20_000);

  await way.join();
  let status = 0;
  for (let tries = 0; tries < 50 && status !== 200; tries += 1) {
    status = (await get('/api/v1/audit-log')).status;
    if (status !== 200) await sleep(100);
  }
  expect(status).toBe(200);
});
