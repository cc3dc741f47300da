/**
 * Every route under src/pages/api/v1, as every role and as nobody, for a desk in reach and for another: the answer
 * is the one that the policy table gives. Routes are read from the file tree, so that a new one cannot be forgotten.
 */
import '../support/useDatabase.ts';
import { readdirSync, readFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import { deskScope, type Person, type Role } from '../../src/server/auth/policy.ts';
import { startSession } from '../../src/server/auth/sessions.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { selectOne } from '../../src/server/db/sql.ts';
import { OPEN_ROUTES } from '../../src/server/http/openPaths.ts';
import { baseUrl, Client } from '../support/client.ts';
import { makeTwoDesks, type DeskThings, type TestPerson, type TwoDesks } from '../support/twoDesks.ts';
import { MATRIX, type Sample } from './matrix.ts';

const ROUTES = join(import.meta.dirname, '../../src/pages/api/v1');
const METHODS = ['GET', 'POST', 'PUT', 'PATCH', 'DELETE', 'ALL'];

/** 'GET borrowers/[id]/index', from the files and the names that they export. */
const routes: readonly string[] = readdirSync(ROUTES, { recursive: true, encoding: 'utf8' })
  .filter((file) => file.endsWith('.ts'))
  .flatMap((file) => {
    const name = relative('.', file).replaceAll('\\', '/').replace(/\.ts$/, '');
    const text = readFileSync(join(ROUTES, file), 'utf8');
    return METHODS.filter((method) =>
      new RegExp(`export (const|function|async function) ${method}\\b`).test(text),
    ).map((method) => `${method} ${name}`);
  })
  .sort();

/** The rights as the routes declare them, read from their text: the files import what only a build resolves. */
function declaredRight(route: string): string | undefined {
  const [method = '', name = ''] = route.split(' ');
  const text = readFileSync(join(ROUTES, `${name}.ts`), 'utf8');
  const from = text.indexOf(`export const ${method} `);
  return /can:\s*'([^']+)'/.exec(text.slice(from))?.[1];
}

let desks: TwoDesks;
let clients: ReadonlyMap<string, Client>;

const asPerson = (person: TestPerson, role: Role, deskIds: readonly number[]): Person => ({
  ...person,
  roles: [role],
  deskIds,
});

const people = (): readonly Person[] => [
  asPerson(desks.north.analyst, 'analyst', [desks.north.desk]),
  asPerson(desks.north.manager, 'relationship manager', [desks.north.desk]),
  asPerson(desks.committee, 'committee member', []),
  asPerson(desks.administrator, 'administrator', []),
  asPerson(desks.auditor, 'auditor', []),
];

beforeAll(async () => {
  desks = await makeTwoDesks();
  const cookie = baseUrl().startsWith('https:') ? '__Host-underkeel' : 'underkeel';
  const pairs = await Promise.all(
    people().map(async (person) => {
      const client = new Client();
      client.cookies.set(cookie, await inTransaction((tx) => startSession(tx, person.id, new Date())));
      return [person.roles[0] ?? '', client] as const;
    }),
  );
  clients = new Map(pairs);
});

/** What the policy table says, and nothing else. */
function expectedStatus(sample: Sample, person: Person | null, deskId: number): number {
  if (sample.can === 'anyone') return sample.may;
  if (!person) return 401;
  if (sample.can === 'signed in') return sample.may;
  const scope = deskScope(person, sample.can);
  if (scope !== 'all' && scope.length === 0) return 403;
  if (sample.names === 'a thing' && scope !== 'all' && !scope.includes(deskId)) return 404;
  return sample.onlyFor === undefined || person.roles.includes(sample.onlyFor) ? sample.may : 403;
}

const ask = (client: Client, sample: Sample, desk: DeskThings): Promise<Response> =>
  client.send(`/api/v1${sample.path(desk)}`, sample.sending?.(desk) ?? {});

const sampleOf = (route: string): Sample => {
  const sample = MATRIX[route];
  if (!sample)
    throw new Error(`${route} has no line in tests/api/matrix.ts: say how it is asked and who may`);
  return sample;
};

test('every route has a line in the matrix, and every line a route', () => {
  expect(Object.keys(MATRIX).sort()).toEqual(routes);
});

describe.each(routes)('%s', (route) => {
  test('declares the right that the matrix gives it', () => {
    const { can, path } = sampleOf(route);
    expect(declaredRight(route)).toBe(can);
    const address = `/api/v1${path(desks.north)}`;
    expect((OPEN_ROUTES as readonly string[]).includes(address), 'listed as open').toBe(can === 'anyone');
  });

  test('answers nobody, and every role for the own desk and another, as the policy table says', async () => {
    const sample = sampleOf(route);
    for (const [where, desk] of [
      ['north', desks.north],
      ['south', desks.south],
    ] as const) {
      const nobody = await ask(new Client(), sample, desk);
      expect(nobody.status, `nobody, ${where}`).toBe(expectedStatus(sample, null, desk.desk));
      for (const person of people()) {
        const role = person.roles[0] ?? '';
        const answer = await ask(clients.get(role) ?? new Client(), sample, desk);
        const expected = expectedStatus(sample, person, desk.desk);
        expect(answer.status, `${role}, ${where}: ${await answer.text()}`).toBe(expected);
      }
    }
  });

  test('answers for a thing of another desk as for one that never was', async () => {
    const sample = sampleOf(route);
    const address = sample.path(desks.south);
    if (sample.names === 'nothing' || !/\d/.test(address)) return;
    const missing = address.replace(/\d+/, '999999999999');
    for (const person of people()) {
      const client = clients.get(person.roles[0] ?? '') ?? new Client();
      if (expectedStatus(sample, person, desks.south.desk) !== 404) continue;
      const sending = sample.sending?.(desks.south) ?? {};
      const bodies = await Promise.all(
        [address, missing].map(async (path) => {
          const answer = await client.send(`/api/v1${path}`, sending);
          const body = (await answer.json()) as Record<string, unknown>;
          delete body['instance'];
          return { status: answer.status, body };
        }),
      );
      expect(bodies[0]).toEqual(bodies[1]);
    }
  });
});

test('lists name nothing of another desk', async () => {
  for (const route of routes.filter((name) => name.startsWith('GET '))) {
    const sample = sampleOf(route);
    if (sample.names !== 'nothing' || sample.can !== 'read borrower') continue;
    for (const role of ['analyst', 'relationship manager']) {
      const text = await (await ask(clients.get(role) ?? new Client(), sample, desks.north)).text();
      expect(text, `${route} as ${role}`).not.toContain(desks.south.borrowerName);
    }
  }
});

test('what was refused leaves a line in the audit log, with who and what', async () => {
  const lastOf = (personId: number) =>
    inTransaction((tx) =>
      selectOne<{ summary: string; seq: number }>(
        tx,
        `select summary, seq from audit_entries where person_id = :personId and action = 'refused' order by seq desc limit 1`,
        { personId },
      ),
    );
  const { analyst } = desks.north;
  const client = clients.get('analyst') ?? new Client();
  await client.send(`/api/v1/borrowers/${desks.south.borrower}`);
  expect((await lastOf(analyst.id))?.summary).toBe(
    `Refused (404): GET /api/v1/borrowers/${desks.south.borrower}`,
  );
  await client.send('/api/v1/audit-log');
  expect((await lastOf(analyst.id))?.summary).toBe('Refused (403): GET /api/v1/audit-log');
});
