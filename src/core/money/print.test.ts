import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { decimal } from './decimal.ts';
import { parseMoney } from './parseMoney.ts';
import {
  formatLevel,
  formatMoney,
  formatMoneyInFull,
  formatMoneyLevel,
  formatRatio,
  formatShare,
} from './print.ts';

describe('a ratio', () => {
  test('has two decimals and an x', () => {
    expect(formatRatio(decimal('3.4512'))).toBe('3.45x');
    expect(formatRatio(decimal('-0.41666'))).toBe('−0.42x');
  });

  test.each([
    ['3.504', '3.5', '3.504x'],
    ['3.5008', '3.5', '3.501x'],
    ['3.5', '3.5', '3.50x'],
    ['3.4999996', '3.5', '3.4999996x'],
    ['3.46', '3.5', '3.46x'],
  ])('%s beside %s is printed %s: never on the other side, never on the line', (value, line, printed) => {
    expect(formatRatio(decimal(value), { beside: decimal(line) })).toBe(printed);
  });

  test('beside a limit always shows its side', () => {
    fc.assert(
      fc.property(fc.integer({ min: -40, max: 40 }), fc.integer({ min: 0, max: 7 }), (step, places) => {
        const line = decimal('3.5');
        const value = line.plus(decimal(step).div(decimal(10).pow(places)));
        const printed = formatRatio(value, { beside: line }).replace('−', '-').replace('x', '');
        expect(decimal(printed).comparedTo(line)).toBe(value.comparedTo(line));
      }),
    );
  });

  test('that is a level keeps the digits of the agreement', () => {
    expect(formatLevel(decimal('3.5'))).toBe('3.50x');
    expect(formatLevel(decimal('1.125'))).toBe('1.125x');
  });
});

describe('a share', () => {
  test('is per cent with one decimal', () => {
    expect(formatShare(decimal('0.0142'))).toBe('1.4\u00a0%');
    expect(formatShare(decimal('-0.0714'))).toBe('−7.1\u00a0%');
    expect(formatShare(decimal('0'))).toBe('0.0\u00a0%');
  });

  test('below nought is never printed as nought', () => {
    expect(formatShare(decimal('-0.0004'))).toBe('−0.04\u00a0%');
  });

  test('just below a line is not printed as the line', () => {
    expect(formatShare(decimal('0.09996'), { beside: decimal('0.1') })).toBe('9.996\u00a0%');
  });
});

describe('money', () => {
  test.each([
    ['12440000', '12.4m'],
    ['-850000', '−850.0k'],
    ['1200000000', '1.2bn'],
    ['999', '999'],
    ['999.96', '1.0k'],
    ['999960', '1.0m'],
    ['999940', '999.9k'],
    ['950000', '950.0k'],
    ['0', '0'],
  ])('%s in short is %s', (amount, printed) => {
    expect(formatMoney(decimal(amount))).toBe(printed);
  });

  test('just short of a minimum is not printed as the minimum', () => {
    expect(formatMoney(decimal(4_999_600), { beside: decimal(5_000_000) })).toBe('4.9996m');
  });

  test.each([
    ['5000000', '5.0m'],
    ['5250000', '5.25m'],
    ['750', '750'],
    ['1234567.89', '1.23456789m'],
  ])('that is a level of %s keeps every digit: %s', (level, printed) => {
    expect(formatMoneyLevel(decimal(level))).toBe(printed);
  });

  test('in full is read back as the same amount', () => {
    fc.assert(
      fc.property(fc.bigInt({ min: -(10n ** 19n), max: 10n ** 19n }), (tenThousandths) => {
        const amount = decimal(tenThousandths.toString()).div(10_000);
        const read = parseMoney(formatMoneyInFull(amount));
        expect(read.ok && read.value.eq(amount)).toBe(true);
      }),
    );
  });

  test.each([
    ['12.4m', '12400000'],
    ['(1,200)', '-1200'],
    ['−3 500.25', '-3500.25'],
    ['0', '0'],
    ['1.5bn', '1500000000'],
  ])('typed as %s is %s', (text, amount) => {
    const read = parseMoney(text);
    expect(read.ok && read.value.toFixed()).toBe(amount);
  });

  test.each(['', 'about 5', '1.234,5', '1,23', '12..5', '(-5)', '5 %', '1e5', '12345678901234567'])(
    'typed as "%s" is refused, with what is accepted',
    (text) => {
      const read = parseMoney(text);
      expect(!read.ok && read.error.message).toContain('12.4m');
    },
  );
});
