import { expect, test } from 'vitest';
import { isLei, leiCheckDigits } from './lei.ts';

/** Invented bodies; check digits computed apart by ISO/IEC 7064 MOD 97-10. Nobody holds these codes. */
const VALID = [
  'ZZ0000UKEEL000000A65',
  'ZZ0000UKEEL000000B62',
  'ZZ0000NORDVK00001C48',
  'ZZ0000QUILL000002D85',
  'ZZ00TARNFELL00003E55',
];

test.each(VALID)(
  '%s is a legal entity identifier and its check digits come from its first eighteen',
  (code) => {
    expect(isLei(code)).toBe(true);
    expect(leiCheckDigits(code.slice(0, 18))).toBe(code.slice(18));
  },
);

test('a changed last digit is noticed', () => {
  expect(isLei('ZZ0000UKEEL000000A66')).toBe(false);
});

test('two swapped neighbours are noticed', () => {
  expect(isLei('ZZ0000UKELE000000A65')).toBe(false);
});

test.each([
  '',
  'ZZ0000UKEEL000000A6',
  'ZZ0000UKEEL000000A655',
  'zz0000ukeel000000a65',
  'ZZ0000UKEEL000000AAB',
])('"%s" has not the shape of one', (text) => {
  expect(isLei(text)).toBe(false);
});

test('check digits of anything but eighteen characters are refused', () => {
  expect(() => leiCheckDigits('ZZ0000UKEEL000000')).toThrow(RangeError);
});
