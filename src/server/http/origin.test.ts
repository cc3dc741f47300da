import { expect, test } from 'vitest';
import { isOwnRequest } from './origin.ts';

const OWN = 'https://underkeel.lender.example';

test.each<[string, string, Record<string, string>, boolean]>([
  ['reading from anywhere', 'GET', { origin: 'https://evil.example', 'sec-fetch-site': 'cross-site' }, true],
  ['writing with the own origin', 'POST', { origin: OWN }, true],
  ['writing with the own origin in other letters', 'POST', { origin: OWN.toUpperCase() }, false],
  ['writing from another port', 'POST', { origin: `${OWN}:8443` }, false],
  ['writing from plain http', 'POST', { origin: OWN.replace('https', 'http') }, false],
  ['writing from a longer host', 'POST', { origin: `${OWN}.evil.example` }, false],
  ['writing without a word', 'DELETE', {}, false],
  ['writing as the browser calls it own', 'PUT', { 'sec-fetch-site': 'same-origin' }, true],
  [
    'writing as the browser calls it same-site, with the own origin',
    'POST',
    { 'sec-fetch-site': 'same-site', origin: OWN },
    false,
  ],
  ['writing from the address bar', 'POST', { 'sec-fetch-site': 'none', origin: OWN }, false],
  ['a method that is not known', 'PROPFIND', {}, false],
])('%s', (_what, method, headers, isOwn) => {
  expect(isOwnRequest(method, '/api/v1/proposals', new Headers(headers), OWN)).toBe(isOwn);
});

test('only the unsubscribe address of mail programs is open to posts from elsewhere', () => {
  expect(isOwnRequest('POST', '/api/v1/unsubscribe', new Headers(), OWN)).toBe(true);
  expect(isOwnRequest('DELETE', '/api/v1/unsubscribe', new Headers(), OWN)).toBe(false);
  expect(isOwnRequest('POST', '/api/v1/unsubscribe/more', new Headers(), OWN)).toBe(false);
});
