import type { Transaction } from 'sequelize';
import { inScope, type DeskScope } from '../deskScope.ts';
import { pageOf, type ListPage } from '../listOrder.ts';
import { execute, select, selectOne } from '../sql.ts';
import { holdBorrower } from './borrowerInputs.ts';

export interface ImportRecord {
  readonly id: number;
  readonly version: number;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskId: number;
  readonly sha256: string;
  readonly fileName: string;
  readonly state: string;
  readonly basis: string | null;
  readonly scope: string | null;
  readonly layoutKey: string | null;
  readonly reading: string;
  readonly openQuestions: number;
  readonly periods: number;
  readonly uploadedById: number;
  readonly uploadedBy: string;
  readonly uploadedAt: Date;
  readonly acceptedBy: string | null;
  readonly acceptedAt: Date | null;
}

const COLUMNS = `i.id, i.version, i.borrower_id as borrowerId, b.name as borrowerName, b.desk_id as deskId, i.file_sha256 as sha256,
  i.file_name as fileName, i.state, i.basis, i.scope, i.layout_key as layoutKey, i.open_questions as openQuestions, i.periods,
  i.uploaded_by as uploadedById, uploader.name as uploadedBy, i.uploaded_at as uploadedAt, accepter.name as acceptedBy,
  i.accepted_at as acceptedAt`;

const TABLES = `imports i
  join borrowers b on b.id = i.borrower_id
  join people uploader on uploader.id = i.uploaded_by
  left join people accepter on accepter.id = i.accepted_by`;

export async function findImport(
  tx: Transaction,
  id: number,
  scope: DeskScope,
): Promise<ImportRecord | null> {
  const desks = inScope(scope);
  return selectOne<ImportRecord>(
    tx,
    `select ${COLUMNS}, i.reading from ${TABLES} where i.id = :id and ${desks.sql}`,
    { id, ...desks.values },
  );
}

/**
 * The same, with the row and the borrower's figures held until the transaction ends. First in its transaction: what
 * is read after it is what the last holder left.
 */
export async function findImportForUpdate(
  tx: Transaction,
  id: number,
  scope: DeskScope,
): Promise<ImportRecord | null> {
  const held = await selectOne<{ borrowerId: number }>(
    tx,
    'select borrower_id as borrowerId from imports where id = :id for update',
    { id },
  );
  if (!held) return null;
  await holdBorrower(tx, held.borrowerId);
  return findImport(tx, id, scope);
}

/** The draft or accepted import of these very bytes for this borrower, if there is one. */
export async function findSameFile(
  tx: Transaction,
  borrowerId: number,
  sha256: string,
): Promise<Omit<ImportRecord, 'reading'> | null> {
  return selectOne(tx, `select ${COLUMNS} from ${TABLES} where i.open_slot = :openSlot`, {
    openSlot: openSlot(borrowerId, sha256),
  });
}

const openSlot = (borrowerId: number, sha256: string): string => `${borrowerId}:${sha256}`;

/** Newest first, without the readings. */
export async function listImports(
  tx: Transaction,
  scope: DeskScope,
  filter: { state: string | null; borrowerId: number | null },
  page: ListPage,
): Promise<{ rows: Omit<ImportRecord, 'reading'>[]; total: number }> {
  const desks = inScope(scope);
  const where = `${desks.sql} and (:state is null or i.state = :state) and (:borrowerId is null or i.borrower_id = :borrowerId)`;
  const values = { ...desks.values, ...filter };
  const rows = await select<Omit<ImportRecord, 'reading'>>(
    tx,
    `select ${COLUMNS} from ${TABLES} where ${where} order by i.id desc ${pageOf(page)}`,
    values,
  );
  const count = await selectOne<{ total: number }>(
    tx,
    `select count(*) as total from ${TABLES} where ${where}`,
    values,
  );
  return { rows, total: count?.total ?? 0 };
}

export interface StagedReading {
  readonly reading: string;
  readonly layoutKey: string;
  readonly openQuestions: number;
  readonly periods: number;
}

export async function insertImport(
  tx: Transaction,
  staged: StagedReading & {
    borrowerId: number;
    sha256: string;
    fileName: string;
    uploadedBy: number;
    now: Date;
  },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into imports (borrower_id, file_sha256, file_name, state, open_slot, layout_key, reading, open_questions, periods, uploaded_by, uploaded_at)
     values (:borrowerId, :sha256, :fileName, 'draft', :openSlot, :layoutKey, :reading, :openQuestions, :periods, :uploadedBy, :now)`,
    { ...staged, openSlot: openSlot(staged.borrowerId, staged.sha256) },
  );
  return insertId;
}

/** A new reading of a draft, after an answer; false where the draft has moved on. */
export async function updateReading(
  tx: Transaction,
  staged: StagedReading & { id: number; version: number },
): Promise<boolean> {
  const { affectedRows } = await execute(
    tx,
    `update imports set reading = :reading, layout_key = :layoutKey, open_questions = :openQuestions, periods = :periods, version = version + 1
     where id = :id and version = :version and state = 'draft'`,
    { ...staged },
  );
  return affectedRows === 1;
}

export async function markAccepted(
  tx: Transaction,
  accepted: { id: number; version: number; basis: string; scope: string; acceptedBy: number; now: Date },
): Promise<boolean> {
  const { affectedRows } = await execute(
    tx,
    `update imports set state = 'accepted', basis = :basis, scope = :scope, accepted_by = :acceptedBy, accepted_at = :now, version = version + 1
     where id = :id and version = :version and state = 'draft'`,
    accepted,
  );
  return affectedRows === 1;
}

/** Frees the slot of the file, so that it may be imported again. */
export async function markWithdrawn(
  tx: Transaction,
  withdrawn: { id: number; version: number },
): Promise<boolean> {
  const { affectedRows } = await execute(
    tx,
    `update imports set state = 'withdrawn', open_slot = null, version = version + 1
     where id = :id and version = :version and state <> 'withdrawn'`,
    withdrawn,
  );
  return affectedRows === 1;
}
