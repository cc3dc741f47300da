import type { NewWatchlistProposal } from '../../contracts/watchlist.ts';
import { err, ok } from '../../core/result.ts';
import { may } from '../auth/policy.ts';
import { isDuplicate } from '../db/inTransaction.ts';
import { findAlertForUpdate, moveAlert } from '../db/repositories/alertStates.ts';
import { findBorrowerDesk, isDeskMember } from '../db/repositories/borrowerDesks.ts';
import { insertProposal } from '../db/repositories/proposals.ts';
import { standingEntry } from '../db/repositories/watchlist.ts';
import type { PersonActor } from './actor.ts';
import { audit, write, type Outcome } from './write.ts';

/** Proposes that a borrower enters the watchlist, changes grade, or begins to leave it; another person decides. */
export function proposeWatchlist(
  actor: PersonActor,
  command: NewWatchlistProposal,
): Promise<Outcome<{ id: number }>> {
  return write(actor, 'propose-watchlist', command, async (tx) => {
    const borrower = await findBorrowerDesk(tx, command.borrowerId);
    if (!borrower || !may(actor.person, 'propose', borrower.deskId))
      return err({ kind: 'not-found', what: 'borrower' });
    if (command.nextReviewOn <= actor.now.toISOString().slice(0, 10))
      return invalid('nextReviewOn', 'The next review must lie ahead.');
    if (!(await isDeskMember(tx, borrower.deskId, command.ownerId)))
      return invalid('ownerId', `The owner of the plan must belong to ${borrower.deskName}.`);

    const standing = await standingEntry(tx, command.borrowerId);
    if (command.change === 'entry' && standing)
      return err({
        kind: 'conflict',
        detail: `${borrower.name} stands on the watchlist at ${standing.grade} since ${standing.enteredOn}. Nothing was changed. Propose a change of grade instead.`,
      });
    if (command.change !== 'entry' && !standing)
      return err({
        kind: 'conflict',
        detail: `${borrower.name} is not on the watchlist. Nothing was changed. Propose an entry instead.`,
      });

    const alert = command.alertId === null ? null : await findAlertForUpdate(tx, command.alertId);
    if (command.alertId !== null && alert?.borrowerId !== command.borrowerId)
      return err({ kind: 'not-found', what: 'alert' });

    let id: number;
    try {
      id = await insertProposal(tx, {
        kind: 'watchlist',
        borrowerId: command.borrowerId,
        deskId: borrower.deskId,
        subjectKind: 'borrower',
        subjectId: command.borrowerId,
        content: command,
        openSlot: `watchlist:${command.borrowerId}`,
        proposedBy: actor.person.id,
        now: actor.now,
      });
    } catch (error) {
      if (!isDuplicate(error)) throw error;
      return err({
        kind: 'conflict',
        detail: `A watchlist proposal for ${borrower.name} is waiting for a decision. Nothing was changed. Wait for the decision, or ask the proposer to withdraw it.`,
      });
    }
    if (alert) {
      const moved = await moveAlert(tx, {
        alert,
        state: 'carried into a proposal',
        personId: actor.person.id,
        what: 'Proposed for watchlist',
        text: `${command.grade}: ${command.reason}`,
        now: actor.now,
      });
      if (!moved) return err({ kind: 'stale', detail: STALE, currentVersion: alert.version });
    }
    await audit(tx, actor, {
      action: 'propose-watchlist',
      subjectKind: 'proposal',
      subjectId: String(id),
      borrowerId: command.borrowerId,
      deskId: borrower.deskId,
      summary: `Proposed ${borrower.name} for the watchlist: ${command.change} at ${command.grade}`,
      before: standing && { grade: standing.grade },
      after: command,
    });
    return ok({ id });
  });
}

const STALE =
  'Somebody changed this alert while you wrote. Nothing was changed. Look at it again and send once more.';

const invalid = (field: string, message: string) =>
  err({
    kind: 'invalid' as const,
    detail: `${message} Nothing was changed.`,
    errors: [{ field, code: 'invalid', message }],
  });
