import type { Transaction } from 'sequelize';
import { execute } from '../sql.ts';

/** Names a kept file in the database; the same file again changes nothing. */
export async function insertFile(
  tx: Transaction,
  file: { sha256: string; sizeBytes: number; mediaType: string; now: Date },
): Promise<void> {
  await execute(
    tx,
    `insert ignore into files (sha256, size_bytes, media_type, stored_at)
     values (:sha256, :sizeBytes, :mediaType, :now)`,
    file,
  );
}
