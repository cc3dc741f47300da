import type { Transaction } from 'sequelize';
import { execute, selectOne } from '../sql.ts';

export type KeyClaim =
  | { readonly kind: 'new' }
  | { readonly kind: 'answered'; readonly response: string }
  | { readonly kind: 'other-request' };

/** Claims the key, or finds what its first use answered. A use in progress is waited for: the insert blocks. */
export async function claimKey(
  tx: Transaction,
  claim: { personId: number; key: string; route: string; bodyHash: string; now: Date },
): Promise<KeyClaim> {
  const { affectedRows } = await execute(
    tx,
    `insert ignore into idempotency_keys (person_id, \`key\`, route, body_hash, created_at)
     values (:personId, :key, :route, :bodyHash, :now)`,
    claim,
  );
  if (affectedRows === 1) return { kind: 'new' };
  const row = await selectOne<{ route: string; body_hash: string; response: string | null }>(
    tx,
    'select route, body_hash, response from idempotency_keys where person_id = :personId and `key` = :key lock in share mode',
    { personId: claim.personId, key: claim.key },
  );
  if (!row || row.route !== claim.route || row.body_hash !== claim.bodyHash || row.response === null)
    return { kind: 'other-request' };
  return { kind: 'answered', response: row.response };
}

export async function storeAnswer(
  tx: Transaction,
  answer: { personId: number; key: string; response: string },
): Promise<void> {
  await execute(
    tx,
    'update idempotency_keys set status = 200, response = :response where person_id = :personId and `key` = :key',
    answer,
  );
}
