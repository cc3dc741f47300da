/** What a request may hold beyond what is asked for, and what it gets: nothing taken, nothing told, no fault. */
import '../support/useDatabase.ts';
import { beforeAll, describe, expect, test } from 'vitest';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { select } from '../../src/server/db/sql.ts';
import { baseUrl, Client, signedIn, type Sending } from '../support/client.ts';
import { MATRIX } from './matrix.ts';
import { makeTwoDesks, PASSWORD, type TwoDesks } from '../support/twoDesks.ts';

let desks: TwoDesks;
let analyst: Client;
let manager: Client;
let administrator: Client;

beforeAll(async () => {
  desks = await makeTwoDesks();
  analyst = await signedIn(desks.north.analyst.email, PASSWORD);
  manager = await signedIn(desks.north.manager.email, PASSWORD);
  administrator = await signedIn(desks.administrator.email, PASSWORD);
});

const rowsOf = <Row extends object>(text: string, id: number) =>
  inTransaction((tx) => select<Row>(tx, text, { id }));

describe('an address that no page uses', () => {
  test.each([
    '/_image?href=/favicon.svg&f=png',
    '/_image?href=http://127.0.0.1:1/&f=svg',
    '/_image?href=/../../package.json',
    '/%5fimage?href=/favicon.svg',
    '/_server-islands/any',
    '/_actions/any',
    '/.env',
    '/package.json',
    '/server/entry.mjs',
  ])('is not there, signed in or not: %s', async (path) => {
    expect((await analyst.send(path)).status).toBe(404);
    expect([303, 404]).toContain((await new Client().send(path)).status);
  });
});

describe('a form with a file', () => {
  const boundary = 'multipart/form-data; boundary=x';
  const part = (name: string, value: string, file = '') =>
    `--x\r\nContent-Disposition: form-data; name="${name}"${file && `; filename="${file}"`}\r\n\r\n${value}\r\n`;
  const upload = async (type: string, body: string) => {
    const answer = await fetch(`${baseUrl()}/api/v1/imports`, {
      method: 'POST',
      headers: { 'content-type': type, origin: baseUrl(), cookie: `underkeel=${analyst.session ?? ''}` },
      body,
    });
    return { status: answer.status, text: await answer.text() };
  };

  test.each([
    ['no boundary', 'multipart/form-data', 'x'],
    ['an empty boundary', 'multipart/form-data; boundary=', 'x'],
    ['nothing between its boundaries', boundary, '--x--\r\n'],
    ['a part that is cut', boundary, '--x\r\nContent-Disposition: form'],
    ['no end', boundary, part('borrowerId', '1')],
    ['another type', 'application/octet-stream', 'x'],
  ])('with %s is refused and imports nothing', async (_what, type, body) => {
    const answer = await upload(type, body);
    expect(answer.status).toBe(422);
    expect(answer.text).toContain('Nothing was imported');
  });

  test('that says twice whose file it is, or holds two files, is refused: which one counts would be a guess', async () => {
    const id = part('borrowerId', String(desks.north.borrower));
    const file = part('file', 'not a workbook', 'a.xlsx');
    const other = part('borrowerId', String(desks.south.borrower));
    for (const body of [id + other + file, id + file + file])
      expect(await upload(boundary, `${body}--x--\r\n`)).toMatchObject({
        status: 422,
        text: expect.stringContaining('more than once') as string,
      });
  });
});

describe('fields that nobody asked for', () => {
  const proposal = () => ({
    borrowerId: desks.north.borrower,
    alertId: null,
    change: 'entry',
    grade: 'W1',
    reason: 'A reason, long enough.',
    ownerId: desks.north.manager.id,
    plan: 'A plan, long enough.',
    nextReviewOn: '2035-01-31',
  });

  test('are not taken: a proposal cannot decide itself or name its proposer', async () => {
    await analyst.send(`/api/v1/proposals/${desks.north.proposal}/withdrawal`, {
      method: 'POST',
      headers: { 'if-match': '"1"' },
    });
    const answer = await manager.send('/api/v1/proposals', {
      json: {
        ...proposal(),
        id: 1,
        state: 'approved',
        decidedBy: desks.committee.id,
        decided_by: desks.committee.id,
        proposedBy: desks.committee.id,
        proposed_by: desks.committee.id,
        deskId: desks.south.desk,
        desk_id: desks.south.desk,
        version: 9,
        open_slot: null,
      },
    });
    expect(answer.status).toBe(200);
    const { id } = (await answer.json()) as { id: number };
    const [row] = await rowsOf<Record<string, unknown>>(
      'select state, decided_by, proposed_by, desk_id, version, content from proposals where id = :id',
      id,
    );
    expect(row).toMatchObject({
      state: 'proposed',
      decided_by: null,
      proposed_by: desks.north.manager.id,
      desk_id: desks.north.desk,
      version: 1,
    });
    expect(JSON.parse(String(row?.['content']))).toEqual(proposal());
  });

  test('are not taken: a step of an alert changes its state alone', async () => {
    const before = await rowsOf(
      'select severity, owner_id, desk_id, kind, due_on from alerts where id = :id',
      desks.north.alert,
    );
    const answer = await manager.send(`/api/v1/alerts/${desks.north.alert}/steps`, {
      json: {
        step: 'assess',
        text: 'Looked at it.',
        severity: 'note',
        ownerId: 1,
        deskId: desks.south.desk,
        state: 'closed',
        due_on: '2099-01-01',
      },
      headers: { 'if-match': '"1"' },
    });
    expect(await answer.json()).toEqual({ id: desks.north.alert, version: 2, state: 'assessed' });
    expect(
      await rowsOf(
        'select severity, owner_id, desk_id, kind, due_on from alerts where id = :id',
        desks.north.alert,
      ),
    ).toEqual(before);
  });

  test('of the name __proto__ or constructor give nothing to this request nor to the next', async () => {
    for (const body of [
      '{"__proto__":{"digest":"wanted"}}',
      '{"constructor":{"prototype":{"digest":"wanted"}}}',
      '[{"__proto__":{"digest":"wanted"}}]',
    ])
      expect((await raw(body)).status, body).toBe(422);
    expect((await raw('{}')).status).toBe(422);
    const form = await analyst.send('/api/v1/account/digest', {
      form: { __proto__: 'x', 'constructor[digest]': 'wanted' },
    });
    expect(form.status).toBe(303);
    expect((await raw('{}')).status).toBe(422);
  });
});

const raw = (body: string, type = 'application/json'): Promise<Response> =>
  fetch(`${baseUrl()}/api/v1/account/digest`, {
    method: 'POST',
    headers: { 'content-type': type, origin: baseUrl(), cookie: `underkeel=${analyst.session ?? ''}` },
    body,
    redirect: 'manual',
  });

describe('a body', () => {
  test.each([
    ['application/xml', '<digest>wanted</digest>', 415],
    ['text/plain', '{"digest":"wanted"}', 415],
    ['application/csp-report', '{"digest":"wanted"}', 415],
    ['application/json, text/plain', '{"digest":"wanted"}', 415],
    ['application/x-www-form-urlencoded', 'digest=wanted&digest=not+wanted', 422],
    ['application/json', '', 400],
    ['application/json', '{', 400],
    ['application/json', '['.repeat(50_000), 400],
    ['application/json', `${'{"a":'.repeat(20_000)}1${'}'.repeat(20_000)}`, 422],
    ['application/json', '{"digest":["wanted"]}', 422],
    ['application/json', '{"digest":{"$ne":null}}', 422],
    ['application/json; charset=utf-8', '{"digest":"wanted"}', 204],
  ])('of %s is read as what it says it is or not at all: %s', async (type, body, status) => {
    expect((await raw(body, type)).status).toBe(status);
  });

  test('a name given twice in the address is refused by every list', async () => {
    for (const path of [
      'alerts?state=open&state=closed',
      'borrowers?page=1&page=2',
      'imports?borrowerId=1&borrowerId=2',
    ])
      expect((await analyst.send(`/api/v1/${path}`)).status, path).toBe(422);
  });
});

describe('a refusal', () => {
  const lastRefused = async (personId: number) =>
    (
      await rowsOf<{ summary: string; n: number }>(
        `select summary, count(*) over () as n from audit_entries where person_id = :id and action = 'refused' order by seq desc limit 1`,
        personId,
      )
    )[0];

  test('of a thing that only the body names leaves a line in the audit log too', async () => {
    const before = (await lastRefused(desks.north.manager.id))?.n ?? 0;
    const foreign: Sending = {
      json: {
        borrowerId: desks.south.borrower,
        alertId: null,
        change: 'entry',
        grade: 'W1',
        reason: 'A reason, long enough.',
        ownerId: desks.south.manager.id,
        plan: 'A plan, long enough.',
        nextReviewOn: '2035-01-31',
      },
    };
    expect((await manager.send('/api/v1/proposals', foreign)).status).toBe(404);
    expect(await lastRefused(desks.north.manager.id)).toEqual({
      summary: 'Refused (404): POST /api/v1/proposals',
      n: before + 1,
    });
  });

  test('of a page is one line, though the page that says so is drawn by a second pass', async () => {
    const before = (await lastRefused(desks.north.analyst.id))?.n ?? 0;
    expect((await analyst.send(`/borrowers/${desks.south.borrower}`)).status).toBe(404);
    expect((await lastRefused(desks.north.analyst.id))?.n).toBe(before + 1);
  });

  test.each([
    ['a bad id', '/api/v1/alerts/1%27%20or%201=1'],
    ['a sort that is none', '/api/v1/alerts?sort=id%20desc;--'],
    ['a foreign thing', '/api/v1/borrowers/999999999999'],
    ['a right that is missing', '/api/v1/audit-log'],
  ])('tells nothing of the inside: %s', async (_what, path) => {
    const answer = await analyst.send(path);
    expect(answer.status).toBeGreaterThanOrEqual(400);
    expect(answer.headers.get('content-type')).toBe('application/problem+json; charset=utf-8');
    expect(answer.headers.get('cache-control')).toBe('no-store');
    expect(await answer.text()).not.toMatch(/sequelize|select |node_modules|\bat .*\.m?[jt]s|errno|ER_/i);
  });

  test('of GET changes nothing: looking at every address of a write leaves its thing as it is', async () => {
    for (const path of [
      `/api/v1/alerts/${desks.south.alert}/steps`,
      `/api/v1/imports/${desks.south.import}/withdrawal`,
      `/api/v1/proposals/${desks.south.proposal}/withdrawal`,
      '/api/v1/runs/start',
      '/api/v1/session/end',
    ])
      expect([404, 405], path).toContain((await administrator.send(path)).status);
    expect((await administrator.send('/api/v1/runs')).status).toBe(200);
  });
});

describe('a thing of another desk', () => {
  const TABLES = [
    'borrowers',
    'alerts',
    'alert_events',
    'proposals',
    'imports',
    'import_answers',
    'statements',
  ];
  const MORE = ['watchlist_entries', 'idempotency_keys', 'assessments', 'files'];
  const checksums = () =>
    inTransaction((tx) => select(tx, `checksum table ${[...TABLES, ...MORE].join(', ')}`));

  test('is not changed by any route, whoever of this desk asks, with the version that it has', async () => {
    const before = await checksums();
    for (const [route, sample] of Object.entries(MATRIX)) {
      if (sample.names === 'nothing') continue;
      for (const client of [analyst, manager]) {
        const sending = sample.sending?.(desks.south) ?? {};
        const headers = {
          ...sending.headers,
          'if-match': '"1"',
          'idempotency-key': `foreign ${route}`.replaceAll(' ', '-'),
        };
        const answer = await client.send(`/api/v1${sample.path(desks.south)}`, { ...sending, headers });
        expect([403, 404], route).toContain(answer.status);
      }
    }
    expect(await checksums()).toEqual(before);
  });

  test('is the same page as one that never was', async () => {
    const south = desks.south;
    for (const path of [
      `/borrowers/${south.borrower}`,
      `/borrowers/${south.borrower}/quality`,
      `/borrowers/${south.borrower}/statements`,
      `/borrowers/${south.borrower}/facilities`,
      `/borrowers/${south.borrower}/alerts`,
      `/borrowers/${south.borrower}/review-sheet`,
      `/alerts/${south.alert}`,
      `/imports/${south.import}`,
      `/statements/${south.statement}/cells/revenue`,
    ]) {
      const pages = await Promise.all(
        [path, path.replace(/\d+/, '999999999999')].map(async (address) => {
          const answer = await analyst.send(address);
          return { status: answer.status, text: (await answer.text()).replaceAll(/[0-9a-f-]{36}/g, '') };
        }),
      );
      expect(pages[0]?.status, path).toBe(404);
      expect(pages[0], path).toEqual(pages[1]);
    }
  });
});
