import { isIPv6 } from 'node:net';

const IPV4_IN_IPV6 = /^::ffff:(\d+\.\d+\.\d+\.\d+)$/i;

/**
 * What is counted as one place on the net: an IPv4 address, or the /64 of an IPv6 address, which is the least that
 * anybody is given (RFC 6177) and would be addresses without end to try from. Other text comes back as it is.
 */
export function networkOf(text: string): string {
  if (!isIPv6(text)) return text;
  const plain = IPV4_IN_IPV6.exec(text)?.[1];
  if (plain) return plain;
  const [before = '', after] = text.toLowerCase().split('::');
  const head = before === '' ? [] : before.split(':');
  const tail = after === undefined || after === '' ? [] : after.split(':');
  const gap = after === undefined ? 0 : Math.max(0, 8 - head.length - tail.length);
  const groups = [...head, ...Array<string>(gap).fill('0'), ...tail].slice(0, 4);
  return `${groups.map((group) => group.replace(/^0+(?=.)/, '')).join(':')}::/64`;
}
