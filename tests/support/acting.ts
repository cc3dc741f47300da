/** People of a test asking the product for something. */
import { expect } from 'vitest';
import type { ServiceProblem } from '../../src/contracts/problem.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import type { PersonActor } from '../../src/server/services/actor.ts';
import type { Outcome } from '../../src/server/services/write.ts';

export const acting = (
  person: Person,
  now: Date,
  { key = null, request = 'request-1' }: { key?: string | null; request?: string } = {},
): PersonActor => ({ person, requestId: request, address: '192.0.2.1', idempotencyKey: key, now });

/** The value of what was done; what was refused fails the test with its words. */
export function done<T>(outcome: Outcome<T>): T {
  if (!outcome.ok) throw new Error(`refused: ${JSON.stringify(outcome.error)}`);
  return outcome.value;
}

/** Why it was not done; what was done all the same fails the test. */
export function refused(outcome: Outcome<unknown>): ServiceProblem {
  if (outcome.ok) throw new Error(`was done: ${JSON.stringify(outcome.value)}`);
  return outcome.error;
}

/** Refused with this kind, in words that say these things. */
export function expectRefused(
  outcome: Outcome<unknown>,
  kind: ServiceProblem['kind'],
  ...words: readonly string[]
): void {
  const problem = refused(outcome);
  expect(problem.kind).toBe(kind);
  for (const word of words) expect('detail' in problem ? problem.detail : '').toContain(word);
}
