import type { BorrowerView, StatementView } from '../../contracts/borrowers.ts';
import { ok } from '../../core/result.ts';
import type { PersonActor } from './actor.ts';
import { listStatements } from './listStatements.ts';
import { showBorrower } from './showBorrower.ts';
import type { Outcome } from './write.ts';

export interface StatementsPage {
  readonly borrower: BorrowerView;
  /** Newest first. */
  readonly balances: readonly StatementView[];
  readonly flows: readonly StatementView[];
  /** Superseded versions are shown too. */
  readonly versions: boolean;
}

const COLUMNS_MOST = 24;

export async function showStatementsPage(
  actor: PersonActor,
  borrowerId: number,
  versions: boolean,
): Promise<Outcome<StatementsPage>> {
  const [borrower, listed] = await Promise.all([
    showBorrower(actor, borrowerId),
    listStatements(actor, borrowerId),
  ]);
  if (!borrower.ok) return borrower;
  if (!listed.ok) return listed;
  const shown = listed.value.statements.filter((statement) => versions || statement.inForce);
  return ok({
    borrower: borrower.value,
    balances: shown.filter((statement) => statement.months === 0).slice(0, COLUMNS_MOST),
    flows: shown.filter((statement) => statement.months > 0).slice(0, COLUMNS_MOST),
    versions,
  });
}
