import type { Transaction } from 'sequelize';
import { selectOne } from '../sql.ts';

/** When the last finished nightly run ended; null before the first. */
export async function lastNightDoneAt(tx: Transaction): Promise<Date | null> {
  const row = await selectOne<{ at: Date | null }>(
    tx,
    `select max(finished_at) as at from runs where kind = 'nightly' and state = 'done'`,
  );
  return row?.at ?? null;
}
