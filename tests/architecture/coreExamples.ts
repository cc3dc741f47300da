/** How an example of core is evaluated and held against what it gives: docstrings and method pages share it. */
import { compileFunction } from 'node:vm';
import { Decimal } from '../../src/core/money/decimal.ts';
export const evaluate = (expression: string, scope: Readonly<Record<string, unknown>>): unknown =>
  (compileFunction(`return (${expression});`, Object.keys(scope)) as (...values: unknown[]) => unknown)(
    ...Object.values(scope),
  );

export const REST = Symbol('and more');

/** A number of which only the first digits are written. */
export class Beginning {
  constructor(readonly text: string) {}
}

/** `0.12…` and `…` at the end of a list or record, made into what evaluates. */
export const marked = (expected: string): string =>
  expected
    .replaceAll(/(-?\d+(?:\.\d+)?)…/g, "begins('$1')")
    .replaceAll(/,\s*…\s*\}/g, ', [REST]: true }')
    .replaceAll(/,\s*…\s*\]/g, ', REST]');

/** Decimals as numbers and instants as text, all the way down. */
export function plain(value: unknown): unknown {
  if (value instanceof Decimal) return value.toNumber();
  if (value instanceof Date) return value.toISOString();
  if (value instanceof Map) return plain([...value]);
  if (ArrayBuffer.isView(value)) return Array.from(value as Float64Array);
  if (Array.isArray(value)) return value.map(plain);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([key, member]) => [key, plain(member)]));
}

export function agrees(actual: unknown, wanted: unknown): boolean {
  if (wanted instanceof Beginning)
    return typeof actual === 'number' && String(actual).startsWith(wanted.text);
  if (typeof actual === 'number' && typeof wanted === 'number')
    return Object.is(actual, wanted) || Math.abs(actual - wanted) <= 1e-12 * Math.abs(wanted);
  if (Array.isArray(wanted)) {
    const members: unknown[] = wanted.filter((member) => member !== REST);
    return (
      Array.isArray(actual) &&
      (actual.length === members.length || (wanted.includes(REST) && actual.length > members.length)) &&
      members.every((member, place) => agrees(actual[place], member))
    );
  }
  if (typeof wanted !== 'object' || wanted === null) return actual === wanted;
  if (typeof actual !== 'object' || actual === null || Array.isArray(actual)) return false;
  const given = actual as Record<string, unknown>;
  const names = Object.keys(wanted);
  return (
    names.every((name) => name in given && agrees(given[name], (wanted as Record<string, unknown>)[name])) &&
    (REST in wanted || Object.keys(given).length === names.length)
  );
}
