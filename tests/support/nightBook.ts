/** A desk of three borrowers with eight quarters each: one with room, one that is thin, one not met. */
import type { Transaction } from 'sequelize';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { select } from '../../src/server/db/sql.ts';
import {
  buildBorrower,
  buildCovenant,
  buildDesk,
  buildStatements,
  type BuiltBorrower,
  type BuiltDesk,
} from './factories.ts';

export interface NightBook {
  readonly desk: BuiltDesk;
  readonly roomy: BuiltBorrower;
  readonly thin: BuiltBorrower;
  readonly notMet: BuiltBorrower;
}

export const ACCEPTED = new Date('2026-11-20T10:00:00Z');
export const LAST_QUARTER = '2026-09-30';
/** Four quarters of one million each. */
export const QUARTERLY_EBITDA = 1_000_000;

export const buildNightBook = (): Promise<NightBook> =>
  inTransaction(async (tx) => {
    const desk = await buildDesk(tx, ACCEPTED);
    return {
      desk,
      roomy: await withDebt(tx, desk, 8_000_000),
      thin: await withDebt(tx, desk, 13_800_000),
      notMet: await withDebt(tx, desk, 16_000_000),
    };
  });

/** Total leverage is the debt over four million. */
async function withDebt(tx: Transaction, desk: BuiltDesk, debt: number): Promise<BuiltBorrower> {
  const borrower = await buildBorrower(tx, desk, { now: ACCEPTED });
  await buildCovenant(tx, borrower, { knownFrom: ACCEPTED });
  await buildStatements(tx, borrower, {
    last: LAST_QUARTER,
    quarters: Array.from({ length: 8 }, () => ({ ebitda: QUARTERLY_EBITDA, debt })),
    knownFrom: ACCEPTED,
  });
  return borrower;
}

export const rows = <Row extends object>(
  text: string,
  values: Parameters<typeof select>[2] = {},
): Promise<Row[]> => inTransaction((tx) => select<Row>(tx, text, values));
