import type { SourceCellView, StatementView } from '../../contracts/borrowers.ts';
import { err, ok } from '../../core/result.ts';
import { LINE_ITEM_CODES, isLineItemCode, type LineItemCode } from '../../core/statements/lineItems.ts';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findBorrowerDesk } from '../db/repositories/borrowerDesks.ts';
import { listSourceCells, listStatements as listRecords } from '../db/repositories/statementLists.ts';
import type { PersonActor } from './actor.ts';
import type { Outcome } from './write.ts';

const STATEMENTS_MOST = 400;

/** Every version on file, newest period first, with the amounts that are there. */
export function listStatements(
  actor: PersonActor,
  borrowerId: number,
): Promise<Outcome<{ statements: readonly StatementView[] }>> {
  return inTransaction(async (tx) => {
    if (!(await findBorrowerDesk(tx, borrowerId, deskScope(actor.person, 'read borrower'))))
      return err({ kind: 'not-found', what: 'borrower' });
    const records = await listRecords(tx, borrowerId, STATEMENTS_MOST);
    return ok({
      statements: records.map((record) => ({
        id: record.id,
        periodStart: record.periodStart,
        periodEnd: record.periodEnd,
        months: record.months,
        basis: record.basis,
        scope: record.scope,
        currency: record.currency,
        tie: record.tie,
        version: record.version,
        inForce: record.version === record.latestVersion,
        receivedOn: record.receivedOn,
        importId: record.importId,
        fileName: record.fileName,
        amounts: amountsOf(record),
      })),
    });
  });
}

/** Where an amount stands in the file it came from. */
export function showSource(
  actor: PersonActor,
  statementId: number,
  line: string,
): Promise<Outcome<{ cells: readonly SourceCellView[] }>> {
  return inTransaction(async (tx) => {
    const scope = deskScope(actor.person, 'read borrower');
    const cells = isLineItemCode(line) ? await listSourceCells(tx, { statementId, line }, scope) : [];
    if (cells.length === 0) return err({ kind: 'not-found', what: 'cell' });
    return ok({ cells: cells.map((cell) => ({ ...cell, fromFormula: cell.fromFormula === 1 })) });
  });
}

/** The lines that are there; a missing one is left out. */
function amountsOf(record: Readonly<Record<LineItemCode, string | null>>): Record<string, string> {
  const amounts: Record<string, string> = {};
  for (const code of LINE_ITEM_CODES) {
    const amount = record[code];
    if (amount !== null) amounts[code] = amount;
  }
  return amounts;
}
