/**
 * A lock is a row that is written, with an end by the database's clock: it holds between processes and, unlike a
 * named lock of the server, between nodes. Whoever loses it sees so with its next renewal.
 */
import type { Transaction } from 'sequelize';
import { execute, selectOne } from '../sql.ts';

export interface HeldLock {
  readonly name: string;
  readonly owner: string;
  /** Rises with every taking: what an earlier owner still writes can be told. */
  readonly fence: number;
}

/** Null where somebody else holds it. */
export async function takeLock(
  tx: Transaction,
  lock: { readonly name: string; readonly owner: string; readonly seconds: number },
): Promise<HeldLock | null> {
  await execute(tx, 'insert ignore into job_locks (name) values (:name)', { name: lock.name });
  const { affectedRows } = await execute(
    tx,
    `update job_locks set owner = :owner, fence = fence + 1, held_until = now(6) + interval :seconds second
     where name = :name and (held_until is null or held_until < now(6))`,
    lock,
  );
  if (affectedRows !== 1) return null;
  const row = await selectOne<{ fence: number }>(tx, 'select fence from job_locks where name = :name', {
    name: lock.name,
  });
  if (!row) throw new Error(`the lock ${lock.name} is gone`);
  return { name: lock.name, owner: lock.owner, fence: row.fence };
}

/** False where the lock has gone to somebody else: then nothing more may be written. */
export async function renewLock(tx: Transaction, lock: HeldLock, seconds: number): Promise<boolean> {
  const { affectedRows } = await execute(
    tx,
    `update job_locks set held_until = now(6) + interval :seconds second
     where name = :name and owner = :owner and fence = :fence`,
    { ...lock, seconds },
  );
  return affectedRows === 1;
}

export async function releaseLock(tx: Transaction, lock: HeldLock): Promise<void> {
  await execute(
    tx,
    'update job_locks set held_until = null where name = :name and owner = :owner and fence = :fence',
    { ...lock },
  );
}
