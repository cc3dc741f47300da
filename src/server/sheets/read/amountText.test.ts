import fc from 'fast-check';
import { expect, test } from 'vitest';
import { decimalMarkOf, readAmountText, type DecimalMark } from './amountText.ts';

const amountOf = (text: string, mark: DecimalMark = '.'): string | null => {
  const meaning = readAmountText(text, mark);
  return meaning.kind === 'amount' ? meaning.amount.toFixed() : null;
};

test.each([
  ['(1,234)', '-1234'],
  ['1,234-', '-1234'],
  ['−1,234', '-1234'],
  ['–1,234', '-1234'],
  ['1,234 CR', '-1234'],
  ['1,234 Dr', '1234'],
  ['(€ 1,234.50)', '-1234.5'],
  ['EUR 1,234', '1234'],
  ['1,234 kr', '1234'],
  ['1 234,5', '1234.5'],
  ['1\u00a0234\u202f567', '1234567'],
  ["1'234.50", '1234.5'],
  ['1,23,456', '123456'],
  ['1,234*', '1234'],
  ['1,234 (a)', '1234'],
  ['1,234²', '1234'],
  ['+12', '12'],
  ['.5', '0.5'],
])("'%s' is %s", (text, amount) => {
  expect(amountOf(text)).toBe(amount);
});

test('the decimal mark of the file decides what one group of three means', () => {
  expect(amountOf('1.234', ',')).toBe('1234');
  expect(amountOf('1.234', '.')).toBe('1.234');
  expect(readAmountText('1.234', null).kind).toBe('ambiguous');
});

test.each([
  ['-', 'zero'],
  ['—', 'zero'],
  ['nil', 'zero'],
  ['n/a', 'missing'],
  ['.', 'missing'],
  ['15 %', 'percent'],
  ['31.12.2025', 'text'],
  ['0400', 'text'],
  ['1,2345,6', 'text'],
  ['Q3 2026', 'text'],
])("'%s' is no amount but %s", (text, kind) => {
  expect(readAmountText(text, ',').kind).toBe(kind);
});

test('the mark is proven by two marks in one number, by a count of digits, or by three groups of three', () => {
  expect(decimalMarkOf(['86.482,5'])).toBe(',');
  expect(decimalMarkOf(['12.50'])).toBe('.');
  expect(decimalMarkOf(['1,234', '5,678', '9,012'])).toBe('.');
  expect(decimalMarkOf(['1,234', '5,678'])).toBeNull();
  expect(decimalMarkOf(['1,5', '1.5'])).toBeNull();
});

test('an amount written with thousands and two decimals is read back as it was', () => {
  fc.assert(
    fc.property(fc.integer({ min: -999_999_999, max: 999_999_999 }), fc.boolean(), (cents, german) => {
      const [group, mark] = german ? ['.', ','] : [',', '.'];
      const digits = Math.abs(cents).toString().padStart(3, '0');
      const whole = digits.slice(0, -2).replace(/\B(?=(\d{3})+$)/g, group);
      const text = `${cents < 0 ? '-' : ''}${whole}${mark}${digits.slice(-2)}`;
      expect(Number(amountOf(text, mark as DecimalMark))).toBe(cents / 100);
    }),
  );
});
