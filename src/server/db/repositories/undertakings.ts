import type { Transaction } from 'sequelize';
import type { Undertaking } from '../../../core/borrowerInputs.ts';
import { execute } from '../sql.ts';

export async function insertUndertaking(
  tx: Transaction,
  undertaking: Omit<Undertaking, 'id'> & { readonly borrowerId: number; readonly knownFrom: Date },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into undertakings (borrower_id, kind, every_months, due_days, day_count, grace_days, first_period_end,
       known_from)
     values (:borrowerId, :kind, :everyMonths, :dueDays, :dayCount, :graceDays, :firstPeriodEnd, :knownFrom)`,
    { ...undertaking },
  );
  return insertId;
}
