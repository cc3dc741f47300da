/** Links that work once: only the SHA-256 of the token is stored. */
import type { Transaction } from 'sequelize';
import { execute, selectOne } from '../sql.ts';

export type TokenPurpose = 'set-up' | 'reset-password';

export async function insertToken(
  tx: Transaction,
  token: { tokenHash: string; purpose: TokenPurpose; personId: number | null; expiresAt: Date },
): Promise<void> {
  await execute(
    tx,
    `insert into one_time_tokens (token_hash, purpose, person_id, expires_at)
     values (:tokenHash, :purpose, :personId, :expiresAt)`,
    token,
  );
}

/** Is the link still good? Looking uses nothing up. */
export async function findToken(
  tx: Transaction,
  token: { tokenHash: string; purpose: TokenPurpose; now: Date },
): Promise<{ personId: number | null } | null> {
  const row = await selectOne<{ person_id: number | null }>(
    tx,
    `select person_id from one_time_tokens
     where token_hash = :tokenHash and purpose = :purpose and used_at is null and expires_at > :now`,
    token,
  );
  return row && { personId: row.person_id };
}

/** Uses the link up; false where it was used, has run out or never was. */
export async function useToken(
  tx: Transaction,
  token: { tokenHash: string; purpose: TokenPurpose; now: Date },
): Promise<boolean> {
  const { affectedRows } = await execute(
    tx,
    `update one_time_tokens set used_at = :now
     where token_hash = :tokenHash and purpose = :purpose and used_at is null and expires_at > :now`,
    token,
  );
  return affectedRows === 1;
}

/** A newer link, or a changed password, makes the older links of a person worthless. */
export async function voidTokens(
  tx: Transaction,
  token: { purpose: TokenPurpose; personId: number | null; now: Date },
): Promise<void> {
  await execute(
    tx,
    `update one_time_tokens set used_at = :now
     where purpose = :purpose and person_id <=> :personId and used_at is null`,
    token,
  );
}
