import { Decimal } from '#core/money/decimal.ts';

export interface Mismatch {
  readonly id: string;
  readonly key: string;
  readonly expected: unknown;
  readonly got: unknown;
}

/** What a topic gave as plain JSON: decimals become numbers, as the files write them. */
export function plain(value: unknown): unknown {
  if (Decimal.isDecimal(value)) return value.toNumber();
  if (Array.isArray(value)) return value.map(plain);
  if (typeof value === 'object' && value !== null)
    return Object.fromEntries(Object.entries(value).map(([key, each]) => [key, plain(each)]));
  return value;
}

/**
 * Every key of `expected` that was not given as it should be. A number is right within tolerance x max(1,
 * |expected|); text, yes or no, and null must be equal; a list must be as long.
 */
export function mismatches(
  id: string,
  expected: Readonly<Record<string, unknown>>,
  got: Readonly<Record<string, unknown>>,
  tolerance: number,
): readonly Mismatch[] {
  return Object.entries(expected).flatMap(([key, value]) => compared(id, key, value, got[key], tolerance));
}

function compared(
  id: string,
  key: string,
  expected: unknown,
  got: unknown,
  tolerance: number,
): readonly Mismatch[] {
  if (typeof expected === 'object' && expected !== null) {
    if (typeof got !== 'object' || got === null) return [{ id, key, expected, got }];
    const isShorter = Array.isArray(expected) && (!Array.isArray(got) || got.length !== expected.length);
    if (isShorter) return [{ id, key, expected, got }];
    return Object.entries(expected).flatMap(([inner, value]) =>
      compared(id, `${key}.${inner}`, value, (got as Record<string, unknown>)[inner], tolerance),
    );
  }
  return isRight(expected, got, tolerance) ? [] : [{ id, key, expected, got }];
}

const isRight = (expected: unknown, got: unknown, tolerance: number): boolean =>
  typeof expected === 'number' && typeof got === 'number'
    ? Math.abs(got - expected) <= tolerance * Math.max(1, Math.abs(expected))
    : got === expected;
