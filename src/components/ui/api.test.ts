import { afterEach, describe, expect, test, vi } from 'vitest';
import { get, getOrThrow, Refusal, send } from './api.ts';

const answering = (...answers: (Response | Error)[]) => {
  const asked: { readonly url: string; readonly init: RequestInit }[] = [];
  vi.stubGlobal('fetch', (url: string, init: RequestInit) => {
    asked.push({ url, init });
    const answer = answers[asked.length - 1];
    return answer instanceof Response
      ? Promise.resolve(answer)
      : Promise.reject(answer ?? new Error('asked too often'));
  });
  return asked;
};

const problem = (status: number, detail: string) =>
  new Response(
    JSON.stringify({ type: '/problems/x', title: 'X', status, detail, instance: 'urn:request:1' }),
    {
      status,
      headers: { 'content-type': 'application/problem+json' },
    },
  );

afterEach(() => vi.unstubAllGlobals());

describe('a write', () => {
  test('carries its body as JSON, the version in If-Match and the key that keeps it single', async () => {
    const asked = answering(Response.json({ id: 7 }));
    const answer = await send<{ id: number }>('POST', '/alerts/7/take', {
      body: { note: 'seen' },
      version: 3,
      idempotencyKey: 'k-1',
    });
    expect(answer).toEqual({ ok: true, value: { id: 7 } });
    expect(asked[0]?.url).toBe('/api/v1/alerts/7/take');
    expect(asked[0]?.init.body).toBe('{"note":"seen"}');
    expect(asked[0]?.init.headers).toEqual({
      accept: 'application/json',
      'content-type': 'application/json',
      'if-match': '"3"',
      'idempotency-key': 'k-1',
    });
  });

  test('of a file goes as a form, whose content type the browser writes', async () => {
    const asked = answering(Response.json(null));
    const form = new FormData();
    await send('POST', '/imports', { body: form });
    expect(asked[0]?.init.body).toBe(form);
    expect(asked[0]?.init.headers).not.toHaveProperty('content-type');
  });

  test('that is refused answers with the problem the server wrote', async () => {
    answering(problem(412, 'J. Sandoval took it at 09:14. Nothing was changed.'));
    const answer = await send('POST', '/alerts/7/take', { version: 1 });
    expect(answer).toMatchObject({
      ok: false,
      problem: { status: 412, detail: 'J. Sandoval took it at 09:14. Nothing was changed.' },
    });
  });

  test('without an answer never claims that nothing was changed', async () => {
    answering(new TypeError('Failed to fetch'), new TypeError('Failed to fetch'));
    const once = await send('POST', '/notes', { body: {} });
    const repeatable = await send('POST', '/notes', { body: {}, idempotencyKey: 'k' });
    expect(once).toMatchObject({ ok: false, problem: { status: 503 } });
    for (const answer of [once, repeatable])
      expect(answer.ok ? '' : answer.problem.detail).not.toContain('Nothing was changed');
    expect(repeatable.ok ? '' : repeatable.problem.detail).toContain('it is not done twice');
    expect(once.ok ? '' : once.problem.detail).toContain('look before you try again');
  });

  test('in an ended session says that what was typed is still here', async () => {
    answering(problem(401, 'Sign in first.'));
    const answer = await send('POST', '/notes', { body: {} });
    expect(answer).toMatchObject({ ok: false, problem: { status: 401 } });
    expect(answer.ok ? '' : answer.problem.detail).toContain('what you typed is still here');
  });
});

describe('a read', () => {
  test('gives the value', async () => {
    answering(Response.json({ rows: [] }));
    expect(await get('/alerts')).toEqual({ ok: true, value: { rows: [] } });
  });

  test.each([
    ['no network', new TypeError('Failed to fetch')],
    ['a proxy that answers 503 in its own words', new Response('<h1>Unavailable</h1>', { status: 503 })],
    ['an answer that is cut', new Response('{"rows":[', { status: 200 })],
  ])('with %s says that the server does not answer', async (_case, answer) => {
    answering(answer);
    expect(await get('/alerts')).toMatchObject({
      ok: false,
      problem: { status: 503, detail: 'The server does not answer. Nothing was changed. Try again.' },
    });
  });

  test('keeps the words of a server that is there but has lost its database', async () => {
    answering(problem(503, 'The database does not answer. Nothing was changed.'));
    expect(await get('/alerts')).toMatchObject({
      problem: { detail: 'The database does not answer. Nothing was changed.' },
    });
  });

  test('for a query throws its problem', async () => {
    answering(problem(404, 'There is nothing here that you can see.'));
    const refused = getOrThrow('/alerts/9');
    await expect(refused).rejects.toBeInstanceOf(Refusal);
    await expect(refused).rejects.toMatchObject({ problem: { status: 404 } });
  });

  test('that was taken back is thrown, as an answer that nobody waits for', async () => {
    answering(new DOMException('aborted', 'AbortError'));
    await expect(get('/alerts')).rejects.toMatchObject({ name: 'AbortError' });
  });
});
