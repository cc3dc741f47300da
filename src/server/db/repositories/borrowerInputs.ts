/** Everything an assessment rests on, as known at one moment: one query a table, for one borrower or many. */
import type { Transaction } from 'sequelize';
import type { BorrowerInputs, LegalForm, Undertaking } from '../../../core/borrowerInputs.ts';
import { groupRows } from '../groupRows.ts';
import { execute, select, selectOne } from '../sql.ts';
import { loadCovenants } from './covenantInputs.ts';
import { loadCurrencyRates } from './currencyRates.ts';
import { loadPrevious } from './assessments.ts';
import { loadStatements } from './statementInputs.ts';

interface BorrowerRow {
  readonly id: number;
  readonly name: string;
  readonly legalForm: LegalForm;
  readonly sector: string;
  readonly currency: string;
  readonly fiscalYearEndMonth: number;
  readonly inputVersion: number;
}

/** Null where there is no such borrower. What became known after `knownAt` is left out. */
export async function loadBorrowerInputs(
  tx: Transaction,
  borrowerId: number,
  knownAt: Date,
): Promise<BorrowerInputs | null> {
  return (await loadManyBorrowerInputs(tx, [borrowerId], knownAt))[0] ?? null;
}

/** The same for many borrowers at once, in order of their ids, with as many queries as for one. */
export async function loadManyBorrowerInputs(
  tx: Transaction,
  borrowerIds: readonly number[],
  knownAt: Date,
): Promise<BorrowerInputs[]> {
  const borrowers = await select<BorrowerRow>(
    tx,
    `select b.id, b.name, b.legal_form as legalForm, b.sector_code as sector, b.currency,
       b.fiscal_year_end_month as fiscalYearEndMonth, cast(coalesce(v.input_version, 0) as unsigned) as inputVersion
     from borrowers b left join borrower_input_versions v on v.borrower_id = b.id
     where b.id in (:borrowerIds) order by b.id`,
    { borrowerIds },
  );
  const statements = await loadStatements(tx, borrowerIds, knownAt);
  const covenants = await loadCovenants(tx, borrowerIds, knownAt);
  const undertakings = await loadUndertakings(tx, borrowerIds, knownAt);
  const rates = await loadCurrencyRates(tx, knownAt);
  const previous = await loadPrevious(tx, borrowers, knownAt);
  return borrowers.map(({ id, ...borrower }) => ({
    borrowerId: id,
    ...borrower,
    statements: statements.get(id) ?? [],
    covenants: covenants.get(id) ?? [],
    undertakings: undertakings.get(id) ?? [],
    rates,
    previous: previous.get(id) ?? null,
  }));
}

async function loadUndertakings(
  tx: Transaction,
  borrowerIds: readonly number[],
  knownAt: Date,
): Promise<ReadonlyMap<number, Undertaking[]>> {
  const rows = await select<Undertaking & { borrowerId: number }>(
    tx,
    `select id, borrower_id as borrowerId, kind, every_months as everyMonths, due_days as dueDays, day_count as dayCount,
       grace_days as graceDays, first_period_end as firstPeriodEnd
     from undertakings
     where borrower_id in (:borrowerIds) and known_from <= :knownAt and (known_to is null or known_to > :knownAt)
     order by id`,
    { borrowerIds, knownAt },
  );
  return groupRows(
    rows,
    (row) => row.borrowerId,
    ({ borrowerId: _, ...undertaking }) => undertaking,
  );
}

/** A borrower as the night and the alerts need it. */
export interface BorrowerPlace {
  readonly id: number;
  readonly name: string;
  readonly deskId: number;
  readonly relationshipManagerId: number;
}

/**
 * The borrower's place, holding its input-version row until the transaction ends: whoever assesses the borrower
 * or changes its inputs waits here, so an assessment never overtakes the figures it should have seen.
 */
export async function holdBorrower(tx: Transaction, borrowerId: number): Promise<BorrowerPlace | null> {
  await execute(
    tx,
    `insert into borrower_input_versions (borrower_id, input_version)
     select id, 0 from borrowers where id = :borrowerId
     on duplicate key update input_version = input_version`,
    { borrowerId },
  );
  return selectOne<BorrowerPlace>(
    tx,
    `select id, name, desk_id as deskId, relationship_manager_id as relationshipManagerId
     from borrowers where id = :borrowerId`,
    { borrowerId },
  );
}

export async function listBorrowerIds(tx: Transaction): Promise<number[]> {
  const rows = await select<{ id: number }>(tx, 'select id from borrowers order by id');
  return rows.map((row) => row.id);
}
