/** What the reader may know of a borrower before it opens a file. */
import type { Transaction } from 'sequelize';
import { decimal } from '../../../core/money/decimal.ts';
import { selectOne } from '../sql.ts';

export const readingFacts = (
  tx: Transaction,
  borrowerId: number,
): Promise<{ name: string; currency: string; fiscalYearEndMonth: number } | null> =>
  selectOne(
    tx,
    'select name, currency, fiscal_year_end_month as fiscalYearEndMonth from borrowers where id = :borrowerId',
    { borrowerId },
  );

/** Revenue of the latest quarter on file in whole units, as decimal text; null where there is none. */
export async function lastQuarterRevenue(tx: Transaction, borrowerId: number): Promise<string | null> {
  const row = await selectOne<{ revenue: string }>(
    tx,
    `select revenue from statements
     where borrower_id = :borrowerId and months = 3 and revenue is not null and known_to is null and basis <> 'forecast'
     order by period_end desc, statement_version desc limit 1`,
    { borrowerId },
  );
  return row ? decimal(row.revenue).toFixed() : null;
}
