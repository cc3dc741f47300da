import type { Transaction } from 'sequelize';
import { pageOf, type ListPage } from '../listOrder.ts';
import { select, selectOne, type SqlValues } from '../sql.ts';
import { auditHash } from './audit.ts';

export interface AuditRecord {
  readonly seq: number;
  readonly at: Date;
  readonly personId: number | null;
  readonly personName: string;
  readonly action: string;
  readonly subjectKind: string;
  readonly subjectId: string;
  readonly borrowerId: number | null;
  readonly borrowerName: string | null;
  readonly deskId: number | null;
  readonly summary: string;
  readonly before: string | null;
  readonly after: string | null;
  readonly requestId: string;
  readonly address: string;
  readonly previousHash: string;
  readonly hash: string;
}

const COLUMNS = `e.seq, e.at, e.person_id as personId, e.person_name as personName, e.action, e.subject_kind as subjectKind,
  e.subject_id as subjectId, e.borrower_id as borrowerId, b.name as borrowerName, e.desk_id as deskId, e.summary,
  e.before_json as \`before\`, e.after_json as \`after\`, e.request_id as requestId, e.address, e.previous_hash as previousHash, e.hash`;

export interface AuditFilter {
  readonly action: string | null;
  readonly personId: number | null;
  readonly borrowerId: number | null;
  readonly from: string | null;
  /** Inclusive. */
  readonly to: string | null;
}

const CONDITIONS = `(:action is null or e.action = :action) and (:personId is null or e.person_id = :personId)
  and (:borrowerId is null or e.borrower_id = :borrowerId) and (:from is null or e.at >= :from)
  and (:to is null or e.at < date_add(:to, interval 1 day))`;

/** Newest first. */
export async function listAudit(
  tx: Transaction,
  filter: AuditFilter,
  page: ListPage,
): Promise<{ rows: AuditRecord[]; total: number }> {
  const values: SqlValues = { ...filter };
  const rows = await select<AuditRecord>(
    tx,
    `select ${COLUMNS} from audit_entries e left join borrowers b on b.id = e.borrower_id where ${CONDITIONS} order by e.seq desc ${pageOf(page)}`,
    values,
  );
  const count = await selectOne<{ total: number }>(
    tx,
    `select count(*) as total from audit_entries e where ${CONDITIONS}`,
    values,
  );
  return { rows, total: count?.total ?? 0 };
}

const CHUNK = 5_000;

/** Recomputes every hash from the stored fields, in order. */
export async function checkAuditChain(
  tx: Transaction,
): Promise<{ entries: number; firstBroken: number | null; headHash: string }> {
  const head = await selectOne<{ seq: number; hash: string }>(
    tx,
    'select seq, hash from audit_heads where id = 1',
  );
  if (!head) throw new Error('audit_heads has no row');
  let previousHash = '0'.repeat(64);
  let seq = 0;
  for (;;) {
    const rows = await select<AuditRecord>(
      tx,
      `select ${COLUMNS} from audit_entries e left join borrowers b on b.id = e.borrower_id where e.seq > :seq order by e.seq limit ${CHUNK}`,
      { seq },
    );
    for (const row of rows) {
      const hash = auditHash({ ...row, previousHash });
      if (row.seq !== seq + 1 || row.previousHash !== previousHash || row.hash !== hash)
        return { entries: head.seq, firstBroken: seq + 1, headHash: head.hash };
      seq = row.seq;
      previousHash = hash;
    }
    if (rows.length < CHUNK) break;
  }
  const cut = seq !== head.seq || previousHash !== head.hash;
  return { entries: head.seq, firstBroken: cut ? seq + 1 : null, headHash: head.hash };
}
