/** A value, or an error that a user can cause. Bugs and outages throw instead. */
export type Result<T, E> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly error: E };

export const ok = <T>(value: T): Result<T, never> => ({ ok: true, value });

export const err = <E>(error: E): Result<never, E> => ({ ok: false, error });

/** Narrowing that the compiler checks: reaching it at run time is a bug. */
export function unreachable(value: never): never {
  throw new Error(`unexpected case: ${JSON.stringify(value)}`);
}
