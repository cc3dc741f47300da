import type { Person } from '../auth/policy.ts';

/** Who does something, and by which request: what every service call begins with. */
export interface Actor {
  /** null: the product itself (the night, a start-up step). */
  readonly person: Person | null;
  readonly requestId: string;
  readonly address: string;
  readonly idempotencyKey: string | null;
  readonly now: Date;
}

/** A signed-in person: what most services ask for. */
export type PersonActor = Actor & { readonly person: Person };

/** The product acting by itself. */
export const systemActor = (name: string, now: Date): Actor => ({
  person: null,
  requestId: name,
  address: 'local',
  idempotencyKey: null,
  now,
});
