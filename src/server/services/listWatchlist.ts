import {
  newWatchlistProposal,
  type GradeCode,
  type ProposalRow,
  type ProposalState,
  type WatchlistRow,
  type WatchlistView,
} from '../../contracts/watchlist.ts';
import { ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { listProposals, type ProposalRecord } from '../db/repositories/proposals.ts';
import { listWatchlist as listRecords, type WatchlistRecord } from '../db/repositories/watchlist.ts';
import type { PersonActor } from './actor.ts';
import type { Outcome } from './write.ts';

const PROPOSALS_SHOWN = 100;

/** What stands on the watchlist of the desks that the person reads, and what waits for a decision. */
export function listWatchlist(
  actor: PersonActor,
  borrowerId: number | null = null,
): Promise<Outcome<WatchlistView>> {
  const scope = deskScope(actor.person, 'read borrower');
  return inTransaction(async (tx) => {
    const today = actor.now.toISOString().slice(0, 10);
    const entries = (await listRecords(tx, scope)).map((record) => toWatchlistRow(record, today));
    const proposals = await listProposals(tx, scope, { borrowerId, limit: PROPOSALS_SHOWN });
    return ok({
      entries: borrowerId === null ? entries : entries.filter((entry) => entry.borrowerId === borrowerId),
      proposals: proposals.map(toProposalRow),
    });
  });
}

const toWatchlistRow = (record: WatchlistRecord, today: string): WatchlistRow => ({
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
