/** Exact fractions out of whole numbers of any length: what decimals are held against in tests. Knows no decimals. */
export interface Rational {
  readonly numerator: bigint;
  /** Above nought. */
  readonly denominator: bigint;
}

/** From plain decimal text: '-1250.75'. */
export function rational(text: string): Rational {
  const match = /^(-?)(\d+)(?:\.(\d+))?$/.exec(text);
  if (!match) throw new Error(`not plain decimal text: ${text}`);
  const [, sign = '', whole = '', fraction = ''] = match;
  return {
    numerator: BigInt(`${sign}${whole}${fraction}`),
    denominator: 10n ** BigInt(fraction.length),
  };
}

export const plus = (a: Rational, b: Rational): Rational => ({
  numerator: a.numerator * b.denominator + b.numerator * a.denominator,
  denominator: a.denominator * b.denominator,
});
const negated = ({ numerator, denominator }: Rational): Rational => ({
  numerator: -numerator,
  denominator,
});
export const minus = (a: Rational, b: Rational): Rational => plus(a, negated(b));
export const times = (a: Rational, b: Rational): Rational => ({
  numerator: a.numerator * b.numerator,
  denominator: a.denominator * b.denominator,
});
export function over(a: Rational, b: Rational): Rational {
  if (b.numerator === 0n) throw new Error('nothing divides by nought');
  const sign = b.numerator < 0n ? -1n : 1n;
  return {
    numerator: sign * a.numerator * b.denominator,
    denominator: sign * b.numerator * a.denominator,
  };
}

/** -1, 0 or 1. */
export function compared(a: Rational, b: Rational): number {
  const difference = a.numerator * b.denominator - b.numerator * a.denominator;
  return difference < 0n ? -1 : difference > 0n ? 1 : 0;
}

export const least = (a: Rational, b: Rational): Rational => (compared(a, b) <= 0 ? a : b);

/** Decimal text at so many significant digits, halves away from nought, without trailing noughts. */
export function atDigits({ numerator, denominator }: Rational, digits: number): string {
  if (numerator === 0n) return '0';
  const size = numerator < 0n ? -numerator : numerator;
  // The power of ten at which the first digit stands, found by comparing, not by logarithms.
  let exponent = size.toString().length - denominator.toString().length;
  if (scaled(size, denominator, -exponent) < 1n) exponent -= 1;
  const places = digits - 1 - exponent;
  return (numerator < 0n ? '-' : '') + placed(halfUp(size, denominator, places), places);
}

/** Decimal text at so many places, halves away from nought, without trailing noughts. */
export function atPlaces({ numerator, denominator }: Rational, places: number): string {
  const size = numerator < 0n ? -numerator : numerator;
  const text = placed(halfUp(size, denominator, places), places);
  return numerator < 0n && text !== '0' ? `-${text}` : text;
}

/** floor(size / denominator x 10^places), also for negative places. */
const scaled = (size: bigint, denominator: bigint, places: number): bigint =>
  places >= 0 ? (size * 10n ** BigInt(places)) / denominator : size / (denominator * 10n ** BigInt(-places));

function halfUp(size: bigint, denominator: bigint, places: number): bigint {
  const doubled = scaled(2n * size, denominator, places);
  return (doubled + 1n) / 2n;
}

/** A whole number of units of 10^-places as plain text. */
function placed(units: bigint, places: number): string {
  if (places <= 0) return (units * 10n ** BigInt(-places)).toString();
  const text = units.toString().padStart(places + 1, '0');
  const [whole, fraction] = [text.slice(0, -places), text.slice(-places).replace(/0+$/, '')];
  return fraction === '' ? whole : `${whole}.${fraction}`;
}
