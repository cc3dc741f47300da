import type { Result } from '#core/result.ts';

/** One topic of a vector file: its inputs as the file writes them, to the keys that its `expected` has. */
export type Topic = (inputs: unknown) => Record<string, unknown>;

/** A vector that has no result where the file expects one fails with the reason. */
export function valueOf<T, E extends { readonly kind: string }>(result: Result<T, E>): T {
  if (!result.ok) throw new Error(`no result: ${result.error.kind}`);
  return result.value;
}
