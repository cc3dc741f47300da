import type { Transaction } from 'sequelize';
import { execute } from '../sql.ts';

/** From now on the figures of this import do not count; what was computed on them keeps its inputs. */
export async function endStatementsOfImport(
  tx: Transaction,
  ended: { importId: number; now: Date },
): Promise<void> {
  await execute(
    tx,
    'update statements set known_to = :now where import_id = :importId and known_to is null',
    ended,
  );
}
