import { createHmac } from 'node:crypto';
import type { Transaction } from 'sequelize';
import { env } from '../../config/env.ts';
import { execute, selectOne } from '../sql.ts';

export interface AuditFacts {
  readonly at: Date;
  readonly personId: number | null;
  readonly personName: string;
  /** A verb of the policy table or the product: 'accept-import', 'take-alert'. */
  readonly action: string;
  readonly subjectKind: string;
  readonly subjectId: string;
  readonly borrowerId: number | null;
  readonly deskId: number | null;
  /** One plain sentence for the reader of the log. */
  readonly summary: string;
  readonly before: unknown;
  readonly after: unknown;
  readonly requestId: string;
  readonly address: string;
}

const SUMMARY_MOST = 500;

/**
 * Waits until this transaction is the next to append. Called before anything else is read: the server refuses (1020)
 * to lock a row that others have changed since this transaction's first look, and every change ends with the head.
 */
export async function holdAuditHead(tx: Transaction): Promise<AuditHead> {
  const head = await selectOne<AuditHead>(tx, 'select seq, hash from audit_heads where id = 1 for update');
  if (!head) throw new Error('audit_heads has no row');
  return head;
}

/** The last entry's number and hash; before the first, 0 and sixty-four zeros. */
export interface AuditHead {
  readonly seq: number;
  readonly hash: string;
}

/**
 * Appends one entry to the chain, in the caller's transaction: what is not audited does not happen. The hash
 * covers every field in a fixed order and the hash before it, keyed outside the database.
 */
export async function appendAudit(tx: Transaction, given: AuditFacts): Promise<number> {
  const facts = { ...given, summary: storable(given.summary, SUMMARY_MOST) };
  const head = await holdAuditHead(tx);
  const seq = head.seq + 1;
  const before = facts.before === undefined || facts.before === null ? null : JSON.stringify(facts.before);
  const after = facts.after === undefined || facts.after === null ? null : JSON.stringify(facts.after);
  const hash = auditHash({ ...facts, seq, previousHash: head.hash, before, after });
  await execute(
    tx,
    `insert into audit_entries (seq, at, person_id, person_name, action, subject_kind, subject_id, borrower_id, desk_id,
       summary, before_json, after_json, request_id, address, previous_hash, hash)
     values (:seq, :at, :personId, :personName, :action, :subjectKind, :subjectId, :borrowerId, :deskId,
       :summary, :before, :after, :requestId, :address, :previousHash, :hash)`,
    {
      seq,
      at: facts.at,
      personId: facts.personId,
      personName: facts.personName,
      action: facts.action,
      subjectKind: facts.subjectKind,
      subjectId: facts.subjectId,
      borrowerId: facts.borrowerId,
      deskId: facts.deskId,
      summary: facts.summary,
      before,
      after,
      requestId: facts.requestId,
      address: facts.address,
      previousHash: head.hash,
      hash,
    },
  );
  await execute(tx, 'update audit_heads set seq = :seq, hash = :hash where id = 1', { seq, hash });
  return seq;
}

/** As the column gives it back: a half of a surrogate pair would come back as another sign, and the hash would not hold. */
const storable = (text: string, most: number): string => text.slice(0, most).toWellFormed();

interface HashedFacts extends Omit<AuditFacts, 'before' | 'after'> {
  readonly seq: number;
  readonly previousHash: string;
  readonly before: string | null;
  readonly after: string | null;
}

export function auditHash(facts: HashedFacts): string {
  const fields = [
    String(facts.seq),
    facts.at.toISOString(),
    facts.personId === null ? null : String(facts.personId),
    facts.personName,
    facts.action,
    facts.subjectKind,
    facts.subjectId,
    facts.borrowerId === null ? null : String(facts.borrowerId),
    facts.deskId === null ? null : String(facts.deskId),
    facts.summary,
    facts.before,
    facts.after,
    facts.requestId,
    facts.address,
    facts.previousHash,
  ];
  return createHmac('sha256', env().AUDIT_KEY).update(JSON.stringify(fields)).digest('hex');
}
