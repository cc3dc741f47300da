import type { Transaction } from 'sequelize';
import type { LegalForm } from '../../../core/borrowerInputs.ts';
import { inScope, type DeskScope } from '../deskScope.ts';
import { execute, selectOne } from '../sql.ts';

export interface NewBorrower {
  readonly name: string;
  readonly legalForm: LegalForm;
  readonly lei: string | null;
  readonly isListed: boolean;
  readonly sectorCode: string;
  /** ISO 3166-1 alpha-2. */
  readonly country: string;
  /** ISO 4217, of the borrower's accounts. */
  readonly currency: string;
  readonly fiscalYearEndMonth: number;
  readonly reportsEveryMonths: number;
  readonly deskId: number;
  readonly relationshipManagerId: number;
  readonly analystId: number;
}

export interface BorrowerRecord extends NewBorrower {
  readonly id: number;
  readonly version: number;
  readonly sectorLabel: string;
  readonly sectorScheme: string;
  readonly deskName: string;
  readonly relationshipManager: string;
  readonly analyst: string;
}

/** A borrower comes with the counter of its inputs. */
export async function insertBorrower(
  tx: Transaction,
  borrower: NewBorrower & { readonly now: Date },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into borrowers (name, legal_form, lei, is_listed, sector_code, country, currency, fiscal_year_end_month,
       reports_every_months, desk_id, relationship_manager_id, analyst_id, created_at)
     values (:name, :legalForm, :lei, :isListed, :sectorCode, :country, :currency, :fiscalYearEndMonth,
       :reportsEveryMonths, :deskId, :relationshipManagerId, :analystId, :now)`,
    { ...borrower },
  );
  await execute(
    tx,
    'insert into borrower_input_versions (borrower_id, input_version) values (:insertId, 0)',
    {
      insertId,
    },
  );
  return insertId;
}

/** Null where there is no such borrower on the desks in scope. */
export async function findBorrower(
  tx: Transaction,
  id: number,
  scope: DeskScope,
): Promise<BorrowerRecord | null> {
  const desks = inScope(scope);
  const row = await selectOne<Omit<BorrowerRecord, 'isListed'> & { isListed: number }>(
    tx,
    `select b.id, b.version, b.name, b.legal_form as legalForm, b.lei, b.is_listed as isListed,
       b.sector_code as sectorCode, s.label as sectorLabel, s.scheme as sectorScheme, b.country, b.currency,
       b.fiscal_year_end_month as fiscalYearEndMonth, b.reports_every_months as reportsEveryMonths,
       b.desk_id as deskId, d.name as deskName, b.relationship_manager_id as relationshipManagerId,
       m.name as relationshipManager, b.analyst_id as analystId, a.name as analyst
     from borrowers b
       join sectors s on s.code = b.sector_code
       join desks d on d.id = b.desk_id
       join people m on m.id = b.relationship_manager_id
       join people a on a.id = b.analyst_id
     where b.id = :id and ${desks.sql}`,
    { id, ...desks.values },
  );
  return row && { ...row, isListed: row.isListed === 1 };
}

/** Says that what the borrower is assessed on has changed: a statement, a covenant, a level, an add-back. */
export async function raiseInputVersion(tx: Transaction, borrowerId: number): Promise<void> {
  await execute(
    tx,
    `insert into borrower_input_versions (borrower_id, input_version) values (:borrowerId, 1)
     on duplicate key update input_version = input_version + 1`,
    { borrowerId },
  );
}
