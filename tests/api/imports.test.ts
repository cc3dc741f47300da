/** Imports as a browser sends them: a file, its version, a key; and what comes back. */
import '../support/useDatabase.ts';
import { randomUUID } from 'node:crypto';
import { beforeAll, expect, test } from 'vitest';
import type { ImportView } from '../../src/contracts/imports.ts';
import type { ProblemBody } from '../../src/contracts/problem.ts';
import type { Client } from '../support/client.ts';
import { signedIn, type Sending } from '../support/client.ts';
import { pack } from '../support/importedFile.ts';
import { makeTwoDesks, PASSWORD, type TwoDesks } from '../support/twoDesks.ts';

let desks: TwoDesks;
let analyst: Client;

beforeAll(async () => {
  desks = await makeTwoDesks();
  analyst = await signedIn(desks.north.analyst.email, PASSWORD);
});

function form(bytes: Buffer, borrower = desks.north.borrower): FormData {
  const sent = new FormData();
  sent.set('borrowerId', String(borrower));
  sent.set('file', new File([new Uint8Array(bytes)], 'Figures “Q3”.xlsx'));
  return sent;
}
const ask = async <T>(
  path: string,
  sending?: Sending,
  client = analyst,
): Promise<{ status: number; body: T }> => {
  const answer = await client.send(`/api/v1${path}`, sending);
  return { status: answer.status, body: (await answer.json()) as T };
};
const upload = <T>(bytes: Buffer, key?: string) =>
  ask<T>('/imports', {
    form: form(bytes),
    ...(key !== undefined && { headers: { 'idempotency-key': key } }),
  });
const show = async (id: number) => (await ask<ImportView>(`/imports/${id}`)).body;

test('a file comes in once, whether its answer was lost or it is sent again', async () => {
  const bytes = await pack();
  const key = randomUUID();
  const first = await upload<{ id: number }>(bytes, key);
  expect(first.status).toBe(200);
  expect(await show(first.body.id)).toMatchObject({
    fileName: 'Figures “Q3”.xlsx',
    state: 'draft',
    periods: 8,
  });
  expect(await upload(bytes, key)).toEqual(first);

  const again = await upload<ProblemBody>(bytes);
  expect(again.status).toBe(409);
  expect(again.body.detail).toContain(`import ${first.body.id}`);
  const otherFile = await upload<ProblemBody>(await pack({ costsNegative: true }), key);
  expect(otherFile.status, 'a key says one thing').toBe(409);
});

test('a file that cannot be read is refused with a reason, and nothing is there', async () => {
  const refused = await upload<ProblemBody>(Buffer.from('%PDF-1.7\n'));
  expect(refused.status).toBe(422);
  expect(refused.body.errors).toMatchObject([{ code: 'not-a-workbook' }]);
});

test('accepting needs the version that was seen, basis and scope, and takes the figures once', async () => {
  const bytes = await pack({ borrower: 'Another heading' });
  const { id } = (await upload<{ id: number }>(bytes)).body;
  const { version } = await show(id);
  const accept = (json: unknown, headers?: Record<string, string>) =>
    ask<ProblemBody>(`/imports/${id}/acceptance`, { json, ...(headers && { headers }) });
  const seen = { 'if-match': `"${version}"` };
  const said = { basis: 'management', scope: 'group' };

  expect((await accept(said)).status).toBe(428);
  const unsaid = await accept({}, seen);
  expect(unsaid.status).toBe(422);
  expect(unsaid.body.errors?.map(({ field }) => field)).toEqual(['basis', 'scope']);
  const stale = await accept(said, { 'if-match': `"${version + 1}"` });
  expect([stale.status, stale.body.currentVersion]).toEqual([412, version]);
  expect((await show(id)).state).toBe('draft');

  expect((await accept(said, seen)).status).toBe(200);
  const second = await accept(said, seen);
  expect(second.status).toBe(409);
  expect(second.body.detail).toContain(`${desks.north.analyst.name} accepted this import already`);
});

test('two desks: the other desk’s analyst finds neither the borrower nor the import', async () => {
  const stranger = await signedIn(desks.south.analyst.email, PASSWORD);
  const sent = await ask('/imports', { form: form(await pack({ borrower: 'Third heading' })) }, stranger);
  expect(sent.status).toBe(404);
  expect((await ask(`/imports/${desks.north.import}`, {}, stranger)).status).toBe(404);
});
