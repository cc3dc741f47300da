import type { Transaction } from 'sequelize';
import { execute } from '../sql.ts';

/** Something that the borrower's assessment rests on has changed; held until the transaction ends. */
export async function raiseInputVersion(tx: Transaction, borrowerId: number): Promise<void> {
  await execute(
    tx,
    `insert into borrower_input_versions (borrower_id, input_version) values (:borrowerId, 1)
     on duplicate key update input_version = input_version + 1`,
    { borrowerId },
  );
}
