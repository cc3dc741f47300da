/** The server around the pages: limits, forwarded claims, files, and the end that lets requests finish. */
import '../support/useDatabase.ts';
import { once } from 'node:events';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { request as httpRequest } from 'node:http';
import { connect, type AddressInfo } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, inject, test } from 'vitest';
import { BODY_BYTES_MOST, UPLOAD_BYTES_MOST } from '../../src/server/http/bodyLimit.ts';
import { webServer, type Render, type WebServer } from '../../src/server/http/webServer.ts';
import { freePort } from '../../jobs/database.mjs';
import { untilAnswers } from '../../jobs/serve.mjs';
import { baseUrl } from '../support/client.ts';
import { startProgram } from '../support/program.ts';

let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'underkeel-files-'));
  mkdirSync(join(folder, '_astro'));
  writeFileSync(join(folder, '_astro', 'page.abc123.css'), 'body { color: black }');
  writeFileSync(join(folder, 'favicon.svg'), '<svg xmlns="http://www.w3.org/2000/svg"/>');
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** Answers with what reached it, after the wait that the address asks for. */
const echo: Render = async (request, response, _next, { address }) => {
  const waitMs = Number(/^\/wait\/(\d+)/.exec(request.url ?? '')?.[1] ?? 0);
  await new Promise((resume) => setTimeout(resume, waitMs));
  const { body } = request as typeof request & { body: AsyncIterable<Uint8Array> };
  let bytes = 0;
  try {
    for await (const piece of body) bytes += piece.byteLength;
  } catch {
    response.writeHead(500).end();
    return;
  }
  response.writeHead(200, { 'content-type': 'application/json' });
  response.end(JSON.stringify({ bytes, address, headers: request.headers }));
};

async function serving(render: Render = echo): Promise<WebServer & { url: string; port: number }> {
  const web = webServer(render, folder);
  await once(web.server.listen(0, '127.0.0.1'), 'listening');
  const { port } = web.server.address() as AddressInfo;
  return { ...web, port, url: `http://127.0.0.1:${port}` };
}

/** Sends without a declared length. */
async function* chunks(bytes: number): AsyncGenerator<Uint8Array> {
  for (let sent = 0; sent < bytes; sent += 65_536)
    yield await Promise.resolve(new Uint8Array(Math.min(65_536, bytes - sent)));
}

const post = (url: string, body: BodyInit | AsyncIterable<Uint8Array>, type: string): Promise<Response> =>
  fetch(url, {
    method: 'POST',
    body: body as BodyInit,
    headers: { 'content-type': type, origin: baseUrl() },
    duplex: 'half',
  } as RequestInit);

describe('a body', () => {
  test.each([
    ['application/json', BODY_BYTES_MOST],
    ['multipart/form-data; boundary=x', UPLOAD_BYTES_MOST],
  ])('of %s passes at its limit and is refused one byte above it, declared or not', async (type, most) => {
    const { url: origin, drain } = await serving();
    const url = `${origin}/api/v1/imports`;
    for (const body of [(n: number) => new Uint8Array(n), chunks]) {
      const passes = await post(url, body(most), type);
      expect([passes.status, ((await passes.json()) as { bytes: number }).bytes]).toEqual([200, most]);
      const refused = await post(url, body(most + 1), type);
      expect(refused.status).toBe(413);
      expect(refused.headers.get('content-type')).toBe('application/problem+json; charset=utf-8');
      expect(await refused.json()).toMatchObject({ status: 413, title: 'Too large' });
    }
    await drain();
  });

  test('that is too large for the product itself is refused by the product', async () => {
    const answer = await post(`${baseUrl()}/api/v1/session`, chunks(2 * BODY_BYTES_MOST), 'application/json');
    expect(answer.status).toBe(413);
    expect((await fetch(`${baseUrl()}/livez`)).status).toBe(200);
  });
});

/** A request that fetch would not send. */
const raw = (port: number, text: string): Promise<string> =>
  new Promise((done) => {
    let answer = '';
    const socket = connect(port, '127.0.0.1', () => socket.write(text));
    socket.on('data', (piece) => (answer += piece.toString())).on('close', () => done(answer));
  });

describe('a request', () => {
  test.each(['TRACE / HTTP/1.1', 'TRACE /livez HTTP/1.1'])('%s is not taken', async (line) => {
    const { port, drain } = await serving();
    const answer = await raw(port, `${line}\r\nHost: 127.0.0.1\r\nConnection: close\r\n\r\n`);
    expect(answer).toMatch(/^HTTP\/1\.1 405 /);
    expect(answer).toContain('allow: GET');
    await drain();
  });

  test.each(['GET http://elsewhere.example/ HTTP/1.1', 'GET /%zz HTTP/1.1', 'OPTIONS * HTTP/1.1'])(
    '%s has no address of ours',
    async (line) => {
      const { port, drain } = await serving();
      expect(await raw(port, `${line}\r\nHost: 127.0.0.1\r\nConnection: close\r\n\r\n`)).toMatch(
        /^HTTP\/1\.1 400 /,
      );
      await drain();
    },
  );

  test.each([
    'Content-Length: 4\r\nTransfer-Encoding: chunked\r\n\r\n0\r\n\r\n',
    'Content-Length: 4\r\nContent-Length: 5\r\n\r\nabcd',
    'Transfer-Encoding: chunked\r\n\r\nzz\r\n',
  ])('with unclear message ends is refused: %j', async (rest) => {
    const { port, drain } = await serving();
    const answer = await raw(
      port,
      `POST / HTTP/1.1\r\nHost: 127.0.0.1\r\nContent-Type: application/json\r\n${rest}`,
    );
    expect(answer).not.toContain('HTTP/1.1 200');
    await drain();
  });

  test('cannot say where it comes from: the address is the socket’s, forwarded claims are dropped', async () => {
    const { url, drain } = await serving();
    const claims = {
      'x-forwarded-for': '6.6.6.6',
      'x-forwarded-host': 'elsewhere.example',
      forwarded: 'for=6.6.6.6',
    };
    const seen = (await (await fetch(url, { headers: claims })).json()) as {
      address: string;
      headers: Record<string, string>;
    };
    expect(seen.address).toBe('127.0.0.1');
    for (const name of Object.keys(claims)) expect(seen.headers).not.toHaveProperty(name);
    await drain();
  });
});

describe('a file', () => {
  test('of the build may be kept for good, another for an hour; both say what they are and no more', async () => {
    const { url, drain } = await serving();
    const built = await fetch(`${url}/_astro/page.abc123.css`);
    expect(built.headers.get('cache-control')).toBe('public, max-age=31536000, immutable');
    expect(built.headers.get('content-type')).toMatch(/^text\/css/);
    expect(built.headers.get('x-content-type-options')).toBe('nosniff');
    const icon = await fetch(`${url}/favicon.svg`);
    expect(icon.headers.get('cache-control')).toBe('public, max-age=3600');
    expect(icon.headers.get('content-security-policy')).toContain("default-src 'none'");
    await drain();
  });

  test.each(['/../secrets.json', '/%2e%2e/secrets.json', '/_astro', '/_astro/', '/.hidden', '/none.css'])(
    '%s is not one: the pages answer',
    async (path) => {
      const { port, drain } = await serving();
      const answer = await raw(port, `GET ${path} HTTP/1.1\r\nHost: 127.0.0.1\r\nConnection: close\r\n\r\n`);
      expect(answer).toContain('"bytes":0');
      await drain();
    },
  );
});

describe('the end', () => {
  test('lets twenty requests in flight finish, refuses new ones at once, still says that it lives', async () => {
    const { url, drain } = await serving();
    const inFlight = Array.from({ length: 20 }, () => fetch(`${url}/wait/1000`));
    await new Promise((resume) => setTimeout(resume, 300));
    const began = performance.now();
    const drained = drain();
    const [refused, ready, live] = await Promise.all(
      ['/new', '/readyz', '/livez'].map((path) => fetch(url + path)),
    );
    expect([refused?.status, ready?.status, live?.status]).toEqual([503, 503, 200]);
    expect(refused?.headers.get('retry-after')).toBe('5');
    expect((await Promise.all(inFlight)).map(({ status }) => status)).toEqual(Array(20).fill(200));
    await drained;
    expect(performance.now() - began).toBeLessThan(5_000);
    await expect(fetch(url)).rejects.toThrow();
  });

  test('comes after ten seconds even where a request does not', async () => {
    const { url, drain } = await serving();
    const stuck = fetch(`${url}/wait/20000`).catch(() => 'cut');
    await new Promise((resume) => setTimeout(resume, 200));
    const began = performance.now();
    await drain();
    const seconds = (performance.now() - began) / 1_000;
    expect(seconds).toBeGreaterThan(9);
    expect(seconds).toBeLessThan(15);
    expect(await stuck).toBe('cut');
  });

  test.each(['SIGTERM', 'SIGINT'] as const)('of the web process by %s has exit code 0', async (signal) => {
    const port = await freePort();
    const program = startProgram('jobs/server.ts', { ...inject('productSettings'), PORT: String(port) });
    expect(await untilAnswers(`http://127.0.0.1:${port}/livez`, () => false)).toBe(true);
    program.kill(signal);
    expect(await program.ended).toBe(0);
  });
});

test('headers that come too slowly do not keep others out', async () => {
  const { url, port, drain } = await serving();
  const slow = Array.from({ length: 200 }, () => connect(port, '127.0.0.1'));
  for (const socket of slow)
    socket.on('error', () => undefined).write('GET / HTTP/1.1\r\nHost: 127.0.0.1\r\nX-');
  const began = performance.now();
  expect((await fetch(url)).status).toBe(200);
  expect(performance.now() - began).toBeLessThan(2_000);
  for (const socket of slow) socket.destroy();
  await drain();
});

test('more requests at once than can be answered are shed with 503', async () => {
  const { port, drain } = await serving();
  const status = (): Promise<number> =>
    new Promise((done, failed) => {
      httpRequest({ port, host: '127.0.0.1', path: '/wait/1500', agent: false }, (answer) => {
        answer.resume();
        done(answer.statusCode ?? 0);
      })
        .on('error', failed)
        .end();
    });
  const statuses = await Promise.all(Array.from({ length: 260 }, status));
  expect(statuses.filter((code) => code === 200)).toHaveLength(200);
  expect(statuses.filter((code) => code === 503)).toHaveLength(60);
  await drain();
});
