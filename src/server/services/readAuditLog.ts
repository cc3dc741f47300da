import type { AuditCheck, AuditQuery, AuditRow } from '../../contracts/audit.ts';
import type { Page } from '../../contracts/paging.ts';
import { ok } from '../../core/result.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { checkAuditChain, listAudit, type AuditRecord } from '../db/repositories/auditLists.ts';
import type { Outcome } from './write.ts';

/** The audit log, newest first; who may read it is the route's question, every desk is in it. */
export function readAuditLog(query: AuditQuery): Promise<Outcome<Page<AuditRow>>> {
  return inTransaction(async (tx) => {
    const filter = {
      action: query.action ?? null,
      personId: query.personId ?? null,
      borrowerId: query.borrowerId ?? null,
      from: query.from ?? null,
      to: query.to ?? null,
    };
    const { rows, total } = await listAudit(tx, filter, query);
    return ok({ rows: rows.map(toRow), page: query.page, perPage: query.perPage, total });
  });
}

export function checkAuditLog(): Promise<Outcome<AuditCheck>> {
  return inTransaction(async (tx) => {
    const chain = await checkAuditChain(tx);
    return ok({ ...chain, intact: chain.firstBroken === null });
  });
}

const toRow = (record: AuditRecord): AuditRow => ({
  seq: record.seq,
  at: record.at.toISOString(),
  who: record.personName,
  action: record.action,
  subject: `${record.subjectKind} ${record.subjectId}`,
  borrowerId: record.borrowerId,
  borrowerName: record.borrowerName,
  summary: record.summary,
  before: record.before,
  after: record.after,
  requestId: record.requestId,
  address: record.address,
  hash: record.hash,
});
