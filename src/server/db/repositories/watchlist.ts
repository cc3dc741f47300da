import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { inScope, type DeskScope } from '../deskScope.ts';
import { execute, select, selectOne } from '../sql.ts';

export interface WatchlistRecord {
  readonly id: number;
  readonly version: number;
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskName: string;
  readonly grade: string;
  readonly reason: string;
  readonly ownerName: string;
  readonly plan: string;
  readonly nextReviewOn: PlainDate;
  readonly enteredOn: PlainDate;
  readonly state: string;
  readonly proposedBy: string;
  readonly decidedBy: string;
}

const QUERY = `select w.id, w.version, w.borrower_id as borrowerId, b.name as borrowerName, d.name as deskName, w.grade, w.reason,
    owner.name as ownerName, w.plan, w.next_review_on as nextReviewOn, w.entered_on as enteredOn, w.state,
    proposer.name as proposedBy, decider.name as decidedBy
  from watchlist_entries w
  join borrowers b on b.id = w.borrower_id
  join desks d on d.id = b.desk_id
  join people owner on owner.id = w.owner_id
  join proposals p on p.id = w.proposal_id
  join people proposer on proposer.id = p.proposed_by
  join people decider on decider.id = p.decided_by`;

/** Entries that stand, gravest grade first. */
export async function listWatchlist(tx: Transaction, scope: DeskScope): Promise<WatchlistRecord[]> {
  const desks = inScope(scope);
  return select<WatchlistRecord>(
    tx,
    `${QUERY} where w.state <> 'left' and ${desks.sql} order by w.grade desc, w.next_review_on, w.id`,
    desks.values,
  );
}

export async function standingEntry(tx: Transaction, borrowerId: number): Promise<WatchlistRecord | null> {
  return selectOne<WatchlistRecord>(
    tx,
    `${QUERY} where w.borrower_id = :borrowerId and w.open_slot is not null`,
    { borrowerId },
  );
}

export interface WatchlistTerms {
  readonly proposalId: number;
  readonly grade: string;
  readonly reason: string;
  readonly ownerId: number;
  readonly plan: string;
  readonly nextReviewOn: string;
}

export async function insertEntry(
  tx: Transaction,
  entry: WatchlistTerms & { borrowerId: number; enteredOn: string },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into watchlist_entries (borrower_id, proposal_id, grade, reason, owner_id, plan, next_review_on, state, open_slot, entered_on)
     values (:borrowerId, :proposalId, :grade, :reason, :ownerId, :plan, :nextReviewOn, 'active', :openSlot, :enteredOn)`,
    { ...entry, openSlot: `borrower:${entry.borrowerId}` },
  );
  return insertId;
}

/** A decided change of grade, or the step into probation. */
export async function changeEntry(
  tx: Transaction,
  entry: WatchlistTerms & { id: number; version: number; state: 'active' | 'probation' },
): Promise<boolean> {
  const { affectedRows } = await execute(
    tx,
    `update watchlist_entries
     set proposal_id = :proposalId, grade = :grade, reason = :reason, owner_id = :ownerId, plan = :plan,
         next_review_on = :nextReviewOn, state = :state, version = version + 1
     where id = :id and version = :version and open_slot is not null`,
    { ...entry },
  );
  return affectedRows === 1;
}
