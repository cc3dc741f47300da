/** Counters with an end, shared by every process and kept over a restart. `expire` is in Unix milliseconds. */
import type { Transaction } from 'sequelize';
import { execute, selectOne } from '../sql.ts';

export interface Counter {
  readonly points: number;
  readonly endsAtMs: number;
}

/** Adds points and answers the new count; a counter past its end begins anew. */
export async function addPoints(
  tx: Transaction,
  counter: { key: string; points: number; nowMs: number; endsAtMs: number },
): Promise<Counter> {
  await execute(
    tx,
    `insert into rate_limits (\`key\`, points, expire) values (:key, :points, :endsAtMs)
     on duplicate key update
       points = if(expire <= :nowMs, :points, greatest(0, points + :points)),
       expire = if(expire <= :nowMs, :endsAtMs, expire)`,
    counter,
  );
  const row = await findCounter(tx, counter.key, counter.nowMs, 'for update');
  return row ?? { points: 0, endsAtMs: counter.endsAtMs };
}

export async function findCounter(
  tx: Transaction,
  key: string,
  nowMs: number,
  lock: '' | 'for update' = '',
): Promise<Counter | null> {
  const row = await selectOne<{ points: number; expire: number }>(
    tx,
    `select points, expire from rate_limits where \`key\` = :key and expire > :nowMs ${lock}`,
    { key, nowMs },
  );
  return row && { points: row.points, endsAtMs: row.expire };
}

export async function deleteCounter(tx: Transaction, key: string): Promise<void> {
  await execute(tx, 'delete from rate_limits where `key` = :key', { key });
}

export async function deleteEndedCounters(tx: Transaction, nowMs: number): Promise<void> {
  await execute(tx, 'delete from rate_limits where expire <= :nowMs', { nowMs });
}
