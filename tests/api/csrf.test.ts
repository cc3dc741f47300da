/** Who may send what changes something: every content type, own and foreign origin, with and without the browser's word. */
import '../support/useDatabase.ts';
import { beforeAll, describe, expect, test } from 'vitest';
import { Client, signedIn, type Sending } from '../support/client.ts';
import { makePersonAlone, PASSWORD } from '../support/twoDesks.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { wantsDigest } from '../../src/server/db/repositories/people.ts';
import { unsubscribeLinks } from '../../src/server/services/unsubscribe.ts';

let client: Client;

beforeAll(async () => {
  const person = await makePersonAlone('auditor');
  client = await signedIn(person.email, PASSWORD);
});

const EVIL = 'https://evil.example';
const ROUTE = '/api/v1/account/digest';
const form = { digest: 'wanted' };
const typed = (type: string): Sending => ({ method: 'POST', headers: { 'content-type': type } });

describe('what may change something', () => {
  test.each<[string, Sending, number]>([
    ['a form from the product', { form }, 303],
    ['JSON from the product', { json: form }, 204],
    ['a form of several parts from the product', { form: parts() }, 303],
    ['a form from elsewhere', { form, origin: EVIL }, 403],
    ['a form of several parts from elsewhere', { form: parts(), origin: EVIL }, 403],
    ['a form without an origin', { form, origin: null }, 403],
    ['a form from a sandbox', { form, origin: 'null' }, 403],
    ['JSON from elsewhere', { json: form, origin: EVIL }, 403],
    ['JSON without an origin', { json: form, origin: null }, 403],
    ['plain text from elsewhere', { ...typed('text/plain'), origin: EVIL }, 403],
    ['plain text from the product', typed('text/plain'), 415],
    ['a report from elsewhere', { ...typed('application/csp-report'), origin: EVIL }, 403],
    ['nothing at all from elsewhere', { method: 'POST', origin: EVIL }, 403],
    ['a deletion from elsewhere', { method: 'DELETE', origin: EVIL }, 403],
    ['a form of our host on another port', { form, origin: 'http://127.0.0.1:1' }, 403],
    ['a form that the browser calls cross-site', { form, headers: { 'sec-fetch-site': 'cross-site' } }, 403],
    ['a form that the browser calls same-site', { form, headers: { 'sec-fetch-site': 'same-site' } }, 403],
    [
      'a form that the browser calls our own',
      { form, headers: { 'sec-fetch-site': 'same-origin' }, origin: null },
      303,
    ],
  ])('%s', async (_what, sending, status) => {
    expect((await client.send(ROUTE, sending)).status).toBe(status);
  });

  test('a method in a header is not a method', async () => {
    const answer = await client.send('/api/v1/audit-log', {
      headers: { 'x-http-method-override': 'DELETE' },
    });
    expect(answer.status).toBe(200);
  });

  test('signing in from elsewhere is refused as well', async () => {
    const answer = await client.send('/api/v1/session', {
      form: { email: 'a@lender.example', password: 'x' },
      origin: EVIL,
    });
    expect(answer.status).toBe(403);
    expect(answer.headers.get('content-type')).toContain('application/problem+json');
  });

  test('a mail program may unsubscribe without an origin, by the token alone', async () => {
    const person = await makePersonAlone('auditor');
    const { oneClick } = await inTransaction((tx) => unsubscribeLinks(tx, person.id));
    const { pathname, search } = new URL(oneClick);
    const wants = () => inTransaction((tx) => wantsDigest(tx, person.id));
    expect((await new Client().send(pathname + search)).status, 'looking changes nothing').toBe(405);
    expect(await wants()).toBe(true);
    const answer = await new Client().send(pathname + search, {
      form: { 'List-Unsubscribe': 'One-Click' },
      origin: null,
    });
    expect(answer.status).toBe(204);
    expect(await wants()).toBe(false);
  });
});

function parts(): FormData {
  const data = new FormData();
  data.set('digest', 'wanted');
  return data;
}
