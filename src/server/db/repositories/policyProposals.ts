import type { Transaction } from 'sequelize';
import { execute, select, selectOne } from '../sql.ts';

/** A proposal to change the policy: the common record, about no borrower and no desk. */
export interface PolicyProposalRecord {
  readonly id: number;
  readonly version: number;
  readonly content: string;
  readonly state: string;
  readonly proposedById: number;
  readonly proposedBy: string;
  readonly proposedAt: Date;
  readonly decidedBy: string | null;
  readonly decidedAt: Date | null;
  readonly decisionText: string | null;
}

const COLUMNS = `p.id, p.version, p.content, p.state, p.proposed_by as proposedById, proposer.name as proposedBy,
  p.proposed_at as proposedAt, decider.name as decidedBy, p.decided_at as decidedAt, p.decision_text as decisionText`;

const TABLES = `proposals p
  join people proposer on proposer.id = p.proposed_by
  left join people decider on decider.id = p.decided_by`;

/** With the row held until the transaction ends. First in its transaction, so that it is read as it is now. */
export async function findPolicyProposalForUpdate(
  tx: Transaction,
  id: number,
): Promise<PolicyProposalRecord | null> {
  const held = await selectOne<{ id: number }>(
    tx,
    `select id from proposals where id = :id and kind = 'policy' for update`,
    { id },
  );
  return (
    held && selectOne<PolicyProposalRecord>(tx, `select ${COLUMNS} from ${TABLES} where p.id = :id`, { id })
  );
}

/** The one that waits first, then the latest decided; at most `limit`. */
export const listPolicyProposals = (tx: Transaction, limit: number): Promise<PolicyProposalRecord[]> =>
  select<PolicyProposalRecord>(
    tx,
    `select ${COLUMNS} from ${TABLES} where p.kind = 'policy'
     order by p.state = 'proposed' desc, p.id desc limit ${Math.trunc(limit)}`,
  );

/** Changes of the policy that wait for somebody else than their proposer. */
export async function countPolicyProposalsFor(tx: Transaction, personId: number): Promise<number> {
  const row = await selectOne<{ waiting: number }>(
    tx,
    `select count(*) as waiting from proposals
     where kind = 'policy' and state = 'proposed' and proposed_by <> :personId`,
    { personId },
  );
  return Number(row?.waiting ?? 0);
}

/** One change of the policy waits at a time; the unique key refuses a second. */
export async function insertPolicyProposal(
  tx: Transaction,
  proposal: { readonly content: unknown; readonly proposedBy: number; readonly now: Date },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into proposals (kind, subject_kind, content, state, open_slot, proposed_by, proposed_at)
     values ('policy', 'policy', :content, 'proposed', 'policy', :proposedBy, :now)`,
    { ...proposal, content: JSON.stringify(proposal.content) },
  );
  return insertId;
}
