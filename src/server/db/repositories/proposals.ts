import type { Transaction } from 'sequelize';
import { inScope, type DeskScope } from '../deskScope.ts';
import { execute, select, selectOne } from '../sql.ts';

export interface ProposalRecord {
  readonly id: number;
  readonly version: number;
  readonly kind: string;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskId: number;
  readonly deskName: string;
  readonly subjectId: number | null;
  readonly content: string;
  readonly state: string;
  readonly proposedById: number;
  readonly proposedBy: string;
  readonly proposedAt: Date;
  readonly planOwner: string;
  readonly decidedBy: string | null;
  readonly decidedAt: Date | null;
  readonly decisionText: string | null;
}

const COLUMNS = `p.id, p.version, p.kind, p.borrower_id as borrowerId, b.name as borrowerName, b.desk_id as deskId,
  d.name as deskName, p.subject_id as subjectId, p.content, p.state, p.proposed_by as proposedById,
  proposer.name as proposedBy, coalesce(planner.name, '') as planOwner, p.proposed_at as proposedAt, decider.name as decidedBy, p.decided_at as decidedAt,
  p.decision_text as decisionText`;

const TABLES = `proposals p
  join borrowers b on b.id = p.borrower_id
  join desks d on d.id = b.desk_id
  join people proposer on proposer.id = p.proposed_by
  left join people planner on planner.id = json_value(p.content, '$.ownerId')
  left join people decider on decider.id = p.decided_by`;

export async function findProposal(
  tx: Transaction,
  id: number,
  scope: DeskScope,
): Promise<ProposalRecord | null> {
  const desks = inScope(scope);
  return selectOne<ProposalRecord>(tx, `select ${COLUMNS} from ${TABLES} where p.id = :id and ${desks.sql}`, {
    id,
    ...desks.values,
  });
}

/** Open proposals first, then the latest decided; at most `limit`. */
export async function listProposals(
  tx: Transaction,
  scope: DeskScope,
  filter: { borrowerId: number | null; limit: number },
): Promise<ProposalRecord[]> {
  const desks = inScope(scope);
  return select<ProposalRecord>(
    tx,
    `select ${COLUMNS} from ${TABLES}
     where ${desks.sql} and (:borrowerId is null or p.borrower_id = :borrowerId)
     order by p.state = 'proposed' desc, p.id desc limit ${Math.trunc(filter.limit)}`,
    { ...desks.values, borrowerId: filter.borrowerId },
  );
}

export async function hasOpenProposal(tx: Transaction, openSlot: string): Promise<boolean> {
  return (
    (await selectOne<{ id: number }>(tx, 'select id from proposals where open_slot = :openSlot', {
      openSlot,
    })) !== null
  );
}

export interface NewProposal {
  readonly kind: string;
  readonly borrowerId: number;
  readonly deskId: number;
  readonly subjectKind: string;
  readonly subjectId: number | null;
  readonly content: unknown;
  /** One open proposal for each of these; a second one is refused by the unique key. */
  readonly openSlot: string;
  readonly proposedBy: number;
  readonly now: Date;
}

export async function insertProposal(tx: Transaction, proposal: NewProposal): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into proposals (kind, borrower_id, desk_id, subject_kind, subject_id, content, state, open_slot, proposed_by, proposed_at)
     values (:kind, :borrowerId, :deskId, :subjectKind, :subjectId, :content, 'proposed', :openSlot, :proposedBy, :now)`,
    { ...proposal, content: JSON.stringify(proposal.content) },
  );
  return insertId;
}

/** Decides in one statement: the state, the version and that the decider is not the proposer, all at once. */
export async function decideProposal(
  tx: Transaction,
  decision: {
    id: number;
    version: number;
    state: 'approved' | 'declined';
    decidedBy: number;
    text: string;
    now: Date;
  },
): Promise<boolean> {
  const { affectedRows } = await execute(
    tx,
    `update proposals
     set state = :state, decided_by = :decidedBy, decided_at = :now, decision_text = :text, open_slot = null, version = version + 1
     where id = :id and version = :version and state = 'proposed' and proposed_by <> :decidedBy`,
    decision,
  );
  return affectedRows === 1;
}

export async function withdrawProposal(
  tx: Transaction,
  own: { id: number; version: number; personId: number },
): Promise<boolean> {
  const { affectedRows } = await execute(
    tx,
    `update proposals set state = 'withdrawn', open_slot = null, version = version + 1
     where id = :id and version = :version and state = 'proposed' and proposed_by = :personId`,
    own,
  );
  return affectedRows === 1;
}
