import { expect, test } from 'vitest';
import { rewriteForwarded } from './forwarded.ts';

const claimed = () => ({
  host: 'desk.example',
  forwarded: 'for=6.6.6.6',
  'x-forwarded-for': '6.6.6.6, 10.1.2.3',
  'x-forwarded-host': 'evil.example',
  'x-forwarded-proto': 'https',
  'x-real-ip': '6.6.6.6',
});

test('without a named proxy nothing of what the client claims stays', () => {
  const headers = claimed();
  rewriteForwarded(headers, { behindProxy: false, appUrl: 'http://127.0.0.1:4321' });
  expect(headers).toEqual({ host: 'desk.example', 'x-forwarded-proto': 'http' });
});

test('behind a named proxy the address that it added last stays, and the protocol is that of APP_URL', () => {
  const headers = claimed();
  rewriteForwarded(headers, { behindProxy: true, appUrl: 'https://desk.example' });
  expect(headers).toEqual({
    host: 'desk.example',
    'x-forwarded-for': '10.1.2.3',
    'x-forwarded-proto': 'https',
  });
});
