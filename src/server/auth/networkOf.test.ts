import { expect, test } from 'vitest';
import { networkOf } from './networkOf.ts';

test.each([
  ['192.0.2.7', '192.0.2.7'],
  ['::ffff:192.0.2.7', '192.0.2.7'],
  ['2001:db8:1:2:3:4:5:6', '2001:db8:1:2::/64'],
  ['2001:DB8:1:2::9', '2001:db8:1:2::/64'],
  ['2001:0db8:0001:0002:ffff:ffff:ffff:ffff', '2001:db8:1:2::/64'],
  ['2001:db8:1:3::9', '2001:db8:1:3::/64'],
  ['2001:db8::9', '2001:db8:0:0::/64'],
  ['::1', '0:0:0:0::/64'],
  ['unknown', 'unknown'],
  ['ada@lender.example', 'ada@lender.example'],
])('%s is counted as %s', (text, network) => {
  expect(networkOf(text)).toBe(network);
});
