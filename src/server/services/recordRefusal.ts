import type { Person } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { audit } from './write.ts';

/** Somebody asked for what they may not do or may not see. */
export async function recordRefusal(refusal: {
  person: Person;
  status: number;
  method: string;
  path: string;
  requestId: string;
  address: string;
  now: Date;
}): Promise<void> {
  const asked = `${refusal.method} ${refusal.path}`;
  await inTransaction((tx) =>
    audit(
      tx,
      { ...refusal, idempotencyKey: null },
      {
        action: 'refused',
        subjectKind: 'request',
        subjectId: asked.slice(0, 80),
        borrowerId: null,
        deskId: null,
        summary: `Refused (${refusal.status}): ${asked}`.slice(0, 500),
        before: null,
        after: null,
      },
    ),
  );
}
