import type { NewWatchlistProposal } from '../../contracts/watchlist.ts';
import { err, ok } from '../../core/result.ts';
import type { Transaction } from 'sequelize';
import { deskScope } from '../auth/policy.ts';
import { isDuplicate } from '../db/inTransaction.ts';
import { findAlertForUpdate, moveAlert, type AlertRecord } from '../db/repositories/alertStates.ts';
import { findBorrowerDesk, isDeskMember } from '../db/repositories/borrowerDesks.ts';
import { insertWatchlistProposal } from '../db/repositories/proposals.ts';
import { standingEntry } from '../db/repositories/watchlist.ts';
import type { PersonActor } from './actor.ts';
import { NOT_CARRIED } from './alertHindrance.ts';
import { lenderDay } from './lenderDay.ts';
import { audit, write, type Outcome } from './write.ts';

/** Proposes that a borrower enters the watchlist, changes grade, or begins to leave it; another person decides. */
export function proposeWatchlist(
  actor: PersonActor,
  command: NewWatchlistProposal,
): Promise<Outcome<{ id: number }>> {
  const scope = deskScope(actor.person, 'propose');
  return write(actor, 'propose-watchlist', command, async (tx) => {
    const alert = command.alertId === null ? null : await findAlertForUpdate(tx, command.alertId, scope);
    const borrower = await findBorrowerDesk(tx, command.borrowerId, scope);
    if (!borrower) return err({ kind: 'not-found', what: 'borrower' });
    if (command.alertId !== null && alert?.borrowerId !== command.borrowerId)
      return err({ kind: 'not-found', what: 'alert' });
    if (alert && NOT_CARRIED.includes(alert.state))
      return err({
        kind: 'conflict',
        detail: `This alert is ${alert.state}, so that no proposal can carry it. Nothing was changed. Propose without it, from the borrower’s page.`,
      });
    if (command.nextReviewOn <= (await lenderDay(tx, actor.now)))
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

    let id: number;
    try {
      id = await insertWatchlistProposal(tx, {
        borrowerId: command.borrowerId,
        deskId: borrower.deskId,
        alertId: command.alertId,
        content: command,
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
    if (alert) await carry(tx, actor, alert, command);
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

/** The owner who proposes works the alert, and so has taken it. */
async function carry(
  tx: Transaction,
  actor: PersonActor,
  alert: AlertRecord,
  { grade, reason }: NewWatchlistProposal,
): Promise<void> {
  const takes = alert.takenBy === null && alert.ownerId === actor.person.id;
  const moved = await moveAlert(tx, {
    alert,
    state: 'carried into a proposal',
    personId: actor.person.id,
    what: `Proposed for watchlist at ${grade}`,
    text: reason,
    now: actor.now,
    ...(takes && { takenBy: actor.person.id }),
  });
  if (!moved) throw new Error(`alert ${alert.id} was held and moved all the same`);
}

const invalid = (field: string, message: string) =>
  err({
    kind: 'invalid' as const,
    detail: `${message} Nothing was changed.`,
    errors: [{ field, code: 'invalid', message }],
  });
