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
  d.name as deskName, p.content, p.state, p.proposed_by as proposedById,
  proposer.name as proposedBy, coalesce(planner.name, '') as planOwner, p.proposed_at as proposedAt, decider.name as decidedBy, p.decided_at as decidedAt,
  p.decision_text as decisionText`;

const TABLES = `proposals p
  join borrowers b on b.id = p.borrower_id
  join desks d on d.id = b.desk_id
  join people proposer on proposer.id = p.proposed_by
  left join people planner on planner.id = json_value(p.content, '$.ownerId')
  left join people decider on decider.id = p.decided_by`;

async function findProposal(tx: Transaction, id: number, scope: DeskScope): Promise<ProposalRecord | null> {
  const desks = inScope(scope);
  return selectOne<ProposalRecord>(tx, `select ${COLUMNS} from ${TABLES} where p.id = :id and ${desks.sql}`, {
    id,
    ...desks.values,
  });
}

/** The same, with the row held until the transaction ends. First in its transaction, so that it is read as it is now. */
export async function findProposalForUpdate(
  tx: Transaction,
  id: number,
  scope: DeskScope,
): Promise<ProposalRecord | null> {
  const held = await selectOne<{ id: number }>(tx, 'select id from proposals where id = :id for update', {
    id,
  });
  return held && findProposal(tx, id, scope);
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

/** The watchlist proposal of a borrower that waits for a decision, and the alert that it carries. */
export const findWaitingProposal = (
  tx: Transaction,
  borrowerId: number,
): Promise<{ readonly id: number; readonly alertId: number | null } | null> =>
  selectOne(
    tx,
    `select id, if(subject_kind = 'alert', subject_id, null) as alertId from proposals where open_slot = :openSlot`,
    { openSlot: watchlistSlot(borrowerId) },
  );

const watchlistSlot = (borrowerId: number): string => `watchlist:${borrowerId}`;

export interface NewProposal {
  readonly borrowerId: number;
  readonly deskId: number;
  /** The alert that it carries; null where it is about the borrower only. */
  readonly alertId: number | null;
  readonly content: unknown;
  readonly proposedBy: number;
  readonly now: Date;
}

/** A borrower has one open watchlist proposal; the unique key refuses a second. */
export async function insertWatchlistProposal(tx: Transaction, proposal: NewProposal): Promise<number> {
  const { borrowerId, alertId, content } = proposal;
  const { insertId } = await execute(
    tx,
    `insert into proposals (kind, borrower_id, desk_id, subject_kind, subject_id, content, state, open_slot, proposed_by, proposed_at)
     values ('watchlist', :borrowerId, :deskId, :subjectKind, :subjectId, :content, 'proposed', :openSlot, :proposedBy, :now)`,
    {
      borrowerId,
      deskId: proposal.deskId,
      subjectKind: alertId === null ? 'borrower' : 'alert',
      subjectId: alertId ?? borrowerId,
      content: JSON.stringify(content),
      openSlot: watchlistSlot(borrowerId),
      proposedBy: proposal.proposedBy,
      now: proposal.now,
    },
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
