import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { decimal, Decimal, decimalFromDouble } from './decimal.ts';
import { atDigits, atPlaces, compared, minus, over, plus, rational, times } from './rational.fixture.ts';

const DIGITS = 34;

/** Amounts as the database holds them, DECIMAL(20,4): sixteen digits and four places, often at the edges. */
const amountText = fc
  .oneof(
    fc.bigInt({ min: -(10n ** 20n - 1n), max: 10n ** 20n - 1n }),
    fc.bigInt({ min: -100_000n, max: 100_000n }),
    fc.constantFrom(0n, 1n, -1n, 10n ** 20n - 1n, 1n - 10n ** 20n, 5n * 10n ** 19n),
  )
  .map((units) => {
    const digits = (units < 0n ? -units : units).toString().padStart(5, '0');
    return `${units < 0n ? '-' : ''}${digits.slice(0, -4)}.${digits.slice(-4)}`;
  });

describe('decimals against exact fractions of whole numbers', () => {
  test('the oracle itself rounds as written by hand', () => {
    expect(atDigits(over(rational('2'), rational('3')), 5)).toBe('0.66667');
    expect(atDigits(over(rational('-1'), rational('8')), 2)).toBe('-0.13');
    expect(atDigits(rational('99995'), 4)).toBe('100000');
    expect(atPlaces(rational('2.345'), 2)).toBe('2.35');
    expect(atPlaces(rational('-0.004'), 2)).toBe('0');
  });

  test('a sum of up to forty amounts is exact, in whatever order', () => {
    fc.assert(
      fc.property(fc.array(amountText, { maxLength: 40 }), (amounts) => {
        const exact = amounts.map(rational).reduce(plus, rational('0'));
        const sum = Decimal.sum(0, ...amounts.map(decimal));
        expect(compared(rational(sum.toFixed()), exact)).toBe(0);
        expect(Decimal.sum(0, ...[...amounts].reverse().map(decimal)).eq(sum)).toBe(true);
      }),
      { numRuns: 300 },
    );
  });

  test('a difference is exact', () => {
    fc.assert(
      fc.property(amountText, amountText, (a, b) => {
        const exact = minus(rational(a), rational(b));
        expect(compared(rational(decimal(a).minus(b).toFixed()), exact)).toBe(0);
      }),
      { numRuns: 500 },
    );
  });

  test('a product is the exact one at 34 digits, halves away from nought', () => {
    fc.assert(
      fc.property(amountText, amountText, (a, b) => {
        const exact = atDigits(times(rational(a), rational(b)), DIGITS);
        expect(decimal(a).times(b).toFixed()).toBe(exact);
      }),
      { numRuns: 1_000 },
    );
  });

  test('a quotient is the exact one at 34 digits, halves away from nought', () => {
    fc.assert(
      fc.property(amountText, amountText, (a, b) => {
        fc.pre(Number(b) !== 0);
        const exact = atDigits(over(rational(a), rational(b)), DIGITS);
        expect(decimal(a).div(b).toFixed()).toBe(exact);
      }),
      { numRuns: 1_000 },
    );
  });

  test("an agreement's rounding is half up by size, at any number of places", () => {
    fc.assert(
      fc.property(amountText, fc.integer({ min: 0, max: 4 }), (a, places) => {
        const rounded = decimal(a).toDecimalPlaces(places);
        expect(rounded.isZero() ? '0' : rounded.toFixed()).toBe(atPlaces(rational(a), places));
      }),
      { numRuns: 500 },
    );
  });

  test('amounts compare as the exact ones do', () => {
    fc.assert(
      fc.property(amountText, amountText, (a, b) => {
        expect(decimal(a).cmp(b)).toBe(compared(rational(a), rational(b)));
      }),
      { numRuns: 500 },
    );
  });
});

describe('the double of a spreadsheet cell', () => {
  test('is the decimal that was typed, up to fifteen digits', () => {
    const typed = fc
      .tuple(fc.bigInt({ min: -(10n ** 15n - 1n), max: 10n ** 15n - 1n }), fc.integer({ min: 0, max: 6 }))
      .map(([units, places]) => new Decimal(units.toString()).times(`1e-${places}`).toFixed());
    fc.assert(
      fc.property(typed, (text) => {
        expect(compared(rational(decimalFromDouble(Number(text)).toFixed()), rational(text))).toBe(0);
      }),
      { numRuns: 500 },
    );
  });

  test('is refused where it is no amount', () => {
    for (const value of [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY])
      expect(() => decimalFromDouble(value)).toThrow(RangeError);
  });
});
