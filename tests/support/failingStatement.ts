/** A statement in the middle of a transaction that the database refuses, as if it had gone away there. */
import { inject } from 'vitest';
import { QueryTypes } from 'sequelize';
import { connect } from '../../src/server/db/connection.ts';

export interface FailingStatement {
  readonly table: string;
  readonly at: 'insert' | 'update';
  /** SQL over `new` and `old`; left out, every row fails. */
  readonly when?: string;
}

/** Does the work while that statement fails. Needs the owner of the database that DATABASE_OWNER_URL names. */
export async function whileFailing<T>(failing: FailingStatement, work: () => Promise<T>): Promise<T> {
  const owner = connect(process.env['DATABASE_OWNER_URL'] ?? inject('databaseOwnerUrl'), 1);
  const { table, at, when = 'true' } = failing;
  const run = (sql: string) => owner.query(sql, { type: QueryTypes.RAW });
  try {
    await run(
      `create trigger fails_in_tests before ${at} on ${table} for each row
       if ${when} then signal sqlstate '45000' set message_text = 'fails in tests'; end if`,
    );
    return await work();
  } finally {
    await run('drop trigger if exists fails_in_tests');
    await owner.close();
  }
}
