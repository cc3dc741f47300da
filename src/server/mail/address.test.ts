import { expect, test } from 'vitest';
import { isSingleAddress, oneLine } from './address.ts';

test.each(['ada@desk.example', 'a.b+c@x-y.desk.example', `${'l'.repeat(64)}@desk.example`])(
  '%s is one address',
  (text) => expect(isSingleAddress(text)).toBe(true),
);

test.each([
  '',
  'ada',
  'ada@',
  '@desk.example',
  'ada@desk',
  'a@desk.example,b@desk.example',
  'a@desk.example;b@desk.example',
  'desk:a@desk.example;',
  '"b@x.example evil@x.example"@y.example',
  'a@desk.example\r\nBcc: evil@x.example',
  'Ada <a@desk.example>',
  '<a@desk.example>',
  'a(comment)@desk.example',
  'a..b@desk.example',
  '.a@desk.example',
  'a@@desk.example',
  'a@b@desk.example',
  'ä@desk.example',
  'a@desk..example',
  'a@-desk.example',
  'a@[127.0.0.1]',
  'a@desk.example ',
  `${'l'.repeat(65)}@desk.example`,
  `a@${'d'.repeat(60)}.${'d'.repeat(60)}.${'d'.repeat(60)}.${'d'.repeat(60)}.${'d'.repeat(20)}.example`,
])('%j is not one address', (text) => expect(isSingleAddress(text)).toBe(false));

test('a name stays on one line', () => {
  expect(oneLine('Ada\r\nBcc: evil@x.example\u2028 L')).toBe('Ada Bcc: evil@x.example  L');
});
