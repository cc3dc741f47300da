/** Web processes that are flooded, ended, killed and doubled. */
import '../support/useDatabase.ts';
import { readFileSync } from 'node:fs';
import { request, type IncomingMessage } from 'node:http';
import { setTimeout as sleep } from 'node:timers/promises';
import { expect, inject, test } from 'vitest';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { select } from '../../src/server/db/sql.ts';
import { openLossyWay } from '../support/lossyWay.ts';
import { makePersonAlone, makeTwoDesks, PASSWORD } from '../support/twoDesks.ts';
import { startWebProcess, type WebProcess } from '../support/webProcess.ts';

const MEGABYTE = 1024 * 1024;

const post = (
  web: WebProcess,
  path: string,
  json: unknown,
  headers: Record<string, string> = {},
): Promise<Response> =>
  fetch(web.address + path, {
    method: 'POST',
    headers: { origin: web.address, 'content-type': 'application/json', ...headers },
    body: JSON.stringify(json),
  });

async function cookieOf(web: WebProcess, email: string): Promise<string> {
  const answer = await post(web, '/api/v1/session', { email, password: PASSWORD });
  expect(answer.status).toBe(204);
  return answer.headers.getSetCookie()[0]?.split(';')[0] ?? '';
}

/** Largest resident memory of a process so far. */
function peakBytes(pid: number): number {
  const kilobytes = /VmHWM:\s+(\d+) kB/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1];
  return Number(kilobytes) * 1024;
}

/** Sends up to so many bytes for as long as they are taken; the answer's status. */
function pour(
  web: WebProcess,
  path: string,
  headers: Readonly<Record<string, string | number | undefined>>,
  bytes: number,
): Promise<{ status: number; sent: number }> {
  return new Promise((done) => {
    let sent = 0;
    let status = 0;
    const { hostname, port } = new URL(web.address);
    const sending = request({
      hostname,
      port,
      path,
      method: 'POST',
      headers: { origin: web.address, ...headers },
    });
    const piece = Buffer.alloc(MEGABYTE / 4, 'x');
    const more = (): void => {
      while (sent < bytes && !sending.destroyed) {
        sent += piece.length;
        if (!sending.write(piece)) return void sending.once('drain', more);
      }
      sending.end();
    };
    sending.on('response', (answer: IncomingMessage) => {
      status = answer.statusCode ?? 0;
      sending.destroy();
    });
    sending.on('error', () => undefined).on('close', () => done({ status, sent }));
    more();
  });
}

test('300 MB are refused while they arrive, declared or not, and the memory of the process stays where it is', async () => {
  const web = await startWebProcess();
  const person = (await makeTwoDesks()).north.analyst;
  const cookie = await cookieOf(web, person.email);
  const form = { 'content-type': 'multipart/form-data; boundary=x' };
  await pour(web, '/api/v1/imports', { ...form, cookie }, MEGABYTE);
  const before = peakBytes(web.pid);
  for (const [path, headers] of [
    ['/api/v1/session', { 'content-type': 'application/json' }],
    ['/api/v1/session', form],
    ['/api/v1/imports', { ...form, cookie }],
    ['/api/v1/imports', form],
  ] as const)
    for (const length of [{}, { 'content-length': 300 * MEGABYTE }]) {
      const { status, sent } = await pour(web, path, { ...headers, ...length }, 300 * MEGABYTE);
      expect([413, 401], `${path} ${JSON.stringify(length)} after ${sent}`).toContain(status);
      expect(sent).toBeLessThan(100 * MEGABYTE);
    }
  expect(peakBytes(web.pid) - before).toBeLessThan(64 * MEGABYTE);
  expect((await fetch(`${web.address}/livez`)).status).toBe(200);
  web.kill('SIGTERM');
  expect(await web.ended).toBe(0);
});

test('a request that is under way at SIGTERM is answered, a new one is told to come back, the end is clean', async () => {
  const web = await startWebProcess();
  const person = await makePersonAlone('auditor');
  const body = JSON.stringify({ email: person.email, password: PASSWORD });
  const { hostname, port } = new URL(web.address);
  const answered = new Promise<number>((done, failed) => {
    const sending = request({
      hostname,
      port,
      path: '/api/v1/session',
      method: 'POST',
      headers: { origin: web.address, 'content-type': 'application/json', 'content-length': body.length },
    });
    sending.on('response', (answer) => {
      answer.resume();
      done(answer.statusCode ?? 0);
    });
    sending.on('error', failed);
    sending.write(body.slice(0, 10));
    setTimeout(() => sending.end(body.slice(10)), 1_500);
  });
  await sleep(500);
  web.kill('SIGTERM');
  await sleep(200);
  const refused = await fetch(`${web.address}/sign-in`);
  expect(refused.status).toBe(503);
  expect(Number(refused.headers.get('retry-after'))).toBeGreaterThan(0);
  expect(await answered).toBe(204);
  expect(await web.ended).toBe(0);
});

test('a change whose COMMIT is not answered is said to be uncertain, and its repeat with the key is not made twice', async () => {
  const way = await openLossyWay(inject('databaseUrl'));
  const web = await startWebProcess({ DATABASE_URL: way.url });
  const person = await makePersonAlone('auditor');
  const cookie = await cookieOf(web, person.email);
  const choose = () =>
    post(
      web,
      '/api/v1/account/digest',
      { digest: 'not wanted' },
      { cookie, 'idempotency-key': 'unanswered' },
    );
  way.loseNextCommit();
  const unanswered = await choose();
  expect(unanswered.status).toBe(503);
  expect(Number(unanswered.headers.get('retry-after'))).toBeGreaterThan(0);
  expect(await unanswered.text()).toContain('It is not certain whether your change was made');
  expect((await choose()).status).toBe(204);
  const rows = await inTransaction((tx) =>
    select(tx, `select seq from audit_entries where person_id = :id and action = 'digest-unsubscribed'`, {
      id: person.id,
    }),
  );
  expect(rows).toHaveLength(1);
  web.kill('SIGTERM');
  await web.ended;
  await way.close();
});

test('a process that is killed after COMMIT and before its answer: the repeat with the key is answered and nothing is done twice', async () => {
  const way = await openLossyWay(inject('databaseUrl'));
  const first = await startWebProcess({ DATABASE_URL: way.url });
  const { manager, alert } = (await makeTwoDesks()).north;
  const cookie = await cookieOf(first, manager.email);
  const step = (web: WebProcess, text: string) =>
    post(
      web,
      `/api/v1/alerts/${alert}/steps`,
      { step: 'assess', text },
      { cookie, 'idempotency-key': 'killed-after-commit', 'if-match': '"1"' },
    );
  const told = () =>
    inTransaction((tx) =>
      select<{ action: string }>(
        tx,
        `select action from audit_entries where person_id = :id and action <> 'sign-in' order by seq`,
        { id: manager.id },
      ),
    );

  way.loseNextCommit(() => first.kill('SIGKILL'));
  await expect(step(first, 'Looked at the figures.')).rejects.toThrow();
  expect(await first.ended).toBe('SIGKILL');
  const second = await startWebProcess();
  const answer = await step(second, 'Looked at the figures.');
  expect(await answer.json()).toEqual({ id: alert, version: 2, state: 'assessed' });
  expect(await told()).toEqual([{ action: 'alert-assess' }]);
  expect((await step(second, 'Another text under the same key.')).status).toBe(409);
  expect(await told()).toEqual([{ action: 'alert-assess' }]);
  second.kill('SIGTERM');
  await second.ended;
  await way.close();
});

test('two processes share the count of wrong passwords, and a new process knows it too', async () => {
  const webs = await Promise.all([startWebProcess(), startWebProcess()]);
  const person = await makePersonAlone('auditor');
  const statuses: number[] = [];
  for (let n = 0; n < 11; n += 1)
    for (const web of webs.slice(n % 2, (n % 2) + 1))
      statuses.push(
        (
          await post(
            web,
            '/api/v1/session',
            { email: person.email, password: `wrong number ${n}` },
            {
              'x-forwarded-for': `203.0.113.${n}`,
            },
          )
        ).status,
      );
  expect(statuses).toEqual([...Array<number>(10).fill(401), 429]);
  for (const web of webs) web.kill('SIGTERM');
  await Promise.all(webs.map(({ ended }) => ended));
  const anew = await startWebProcess();
  expect((await post(anew, '/api/v1/session', { email: person.email, password: PASSWORD })).status).toBe(429);
  anew.kill('SIGTERM');
  await anew.ended;
});
