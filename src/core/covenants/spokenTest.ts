import type { Outcome } from './covenantTest.ts';

/**
 * The latest test that says something, of tests that are oldest first: one that awaits its figures says nothing yet.
 * Where none has said anything, the latest of all. A test without a ratio does speak: it is not hidden behind an
 * older one that had one.
 *
 * @example spokenTest([{ outcome: 'met' }, { outcome: 'awaiting figures' }]) // => { outcome: 'met' }
 */
export const spokenTest = <Test extends { readonly outcome: Outcome }>(
  tests: readonly Test[],
): Test | undefined => tests.findLast(({ outcome }) => outcome !== 'awaiting figures') ?? tests.at(-1);
