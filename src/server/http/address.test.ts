import { expect, test } from 'vitest';
import { clientAddress } from './address.ts';

test.each<[string, string | null, boolean, string]>([
  ['no proxy, no claim', null, false, '192.0.2.1'],
  ['no proxy: a claim is anybody’s', '203.0.113.9', false, '192.0.2.1'],
  ['behind the proxy: what it added itself, which is last', '10.0.0.1, 203.0.113.9', true, '203.0.113.9'],
  ['behind the proxy, nothing added', null, true, '192.0.2.1'],
  ['behind the proxy, no address at the end', '203.0.113.9, <script>', true, '192.0.2.1'],
  ['an address of the newer kind', '2001:db8::1', true, '2001:db8::1'],
])('%s', (_what, forwardedFor, behindProxy, address) => {
  expect(clientAddress('192.0.2.1', forwardedFor, behindProxy)).toBe(address);
});
