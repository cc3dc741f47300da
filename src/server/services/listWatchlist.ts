import {
  newWatchlistProposal,
  type GradeCode,
  type ProposalRow,
  type ProposalState,
  type WatchlistRow,
  type WatchlistView,
} from '../../contracts/watchlist.ts';
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import type { DeskScope } from '../db/deskScope.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { listProposals, type ProposalRecord } from '../db/repositories/proposals.ts';
import {
  listWatchlist as listRecords,
  standingEntry,
  type WatchlistRecord,
} from '../db/repositories/watchlist.ts';
import type { PersonActor } from './actor.ts';
import { lenderDay } from './lenderDay.ts';
import type { Outcome } from './write.ts';

const PROPOSALS_SHOWN = 100;

/** What stands on the watchlist of the desks that the person reads, and what waits for a decision. */
export function listWatchlist(actor: PersonActor): Promise<Outcome<WatchlistView>> {
  const scope = deskScope(actor.person, 'read borrower');
  return inTransaction(async (tx) => {
    const today = await lenderDay(tx, actor.now);
    const entries = await listRecords(tx, scope);
    const proposals = await listProposals(tx, scope, { borrowerId: null, limit: PROPOSALS_SHOWN });
    return ok({
      entries: entries.map((record) => toWatchlistRow(record, today)),
      proposals: proposals.map(toProposalRow),
    });
  });
}

/** The same for one borrower's page. */
export async function borrowerWatch(
  tx: Transaction,
  scope: DeskScope,
  borrowerId: number,
  today: PlainDate,
): Promise<{ watchlist: WatchlistRow | null; proposals: ProposalRow[] }> {
  const standing = await standingEntry(tx, borrowerId);
  const proposals = await listProposals(tx, scope, { borrowerId, limit: PROPOSALS_SHOWN });
  return { watchlist: standing && toWatchlistRow(standing, today), proposals: proposals.map(toProposalRow) };
}

const toWatchlistRow = (record: WatchlistRecord, today: PlainDate): WatchlistRow => ({
  id: record.id,
  borrowerId: record.borrowerId,
  borrowerName: record.borrowerName,
  deskName: record.deskName,
  grade: record.grade as GradeCode,
  reason: record.reason,
  ownerName: record.ownerName,
  plan: record.plan,
  nextReviewOn: record.nextReviewOn,
  reviewOverdue: record.nextReviewOn < today,
  enteredOn: record.enteredOn,
  state: record.state,
  proposedBy: record.proposedBy,
  decidedBy: record.decidedBy,
});

function toProposalRow(record: ProposalRecord): ProposalRow {
  const content = newWatchlistProposal.parse(JSON.parse(record.content));
  return {
    id: record.id,
    version: record.version,
    kind: 'watchlist',
    change: content.change,
    borrowerId: record.borrowerId,
    borrowerName: record.borrowerName,
    deskName: record.deskName,
    grade: content.grade,
    reason: content.reason,
    ownerId: content.ownerId,
    ownerName: record.planOwner,
    plan: content.plan,
    nextReviewOn: content.nextReviewOn,
    alertId: content.alertId,
    state: record.state as ProposalState,
    proposedBy: record.proposedBy,
    proposedById: record.proposedById,
    proposedAt: record.proposedAt.toISOString(),
    decidedBy: record.decidedBy,
    decidedAt: record.decidedAt?.toISOString() ?? null,
    decisionText: record.decisionText,
  };
}
