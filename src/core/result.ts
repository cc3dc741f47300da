/** A value, or an error that a user can cause. Bugs and outages throw instead. */
export type Result<T, E> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly error: E };

/**
 * A value as a result.
 *
 * @example ok(3) // => { ok: true, value: 3 }
 */
export const ok = <T>(value: T): Result<T, never> => ({ ok: true, value });

/**
 * An error as a result.
 *
 * @example err('too short') // => { ok: false, error: 'too short' }
 */
export const err = <E>(error: E): Result<never, E> => ({ ok: false, error });

/**
 * Narrowing that the compiler checks: reaching it at run time is a bug.
 *
 * @example (() => { try { return unreachable('other'); } catch (error) { return error.message; } })() // => 'unexpected case: "other"'
 */
export function unreachable(value: never): never {
  throw new Error(`unexpected case: ${JSON.stringify(value)}`);
}
