import type { NewRun } from '../../contracts/runs.ts';
import { businessDate } from '../../core/calendar/businessDate.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { err, ok } from '../../core/result.ts';
import { mayAnywhere } from '../auth/policy.ts';
import { findLender } from '../db/repositories/lender.ts';
import { findRunOf, insertRun, queueAnotherAttempt } from '../db/repositories/runs.ts';
import type { PersonActor } from './actor.ts';
import { audit, write, type Outcome } from './write.ts';

export interface StartedRun {
  readonly id: number;
  readonly businessDate: string;
  readonly attempt: number;
}

/** Queues the nightly run of a business date; the worker begins it. A date that is done is computed once more. */
export const startRun = (actor: PersonActor, command: NewRun): Promise<Outcome<StartedRun>> =>
  write(actor, 'start-run', command, async (tx) => {
    if (!mayAnywhere(actor.person, 'administer'))
      return err({
        kind: 'not-allowed',
        detail: 'An administrator starts the nightly run. Nothing was started.',
      });
    const lender = await findLender(tx);
    if (!lender) throw new Error('there is no lender yet');
    const today = businessDate(actor.now, lender.zone);
    const date = command.businessDate ?? today;
    if (date > today) {
      const message = `Choose ${formatDay(today)} or a day before it: a day to come has no figures yet.`;
      return err({
        kind: 'invalid',
        detail: `${message} Nothing was started.`,
        errors: [{ field: 'businessDate', code: 'in-the-future', message }],
      });
    }

    const key = { businessDate: date, kind: 'nightly' } as const;
    const found = await findRunOf(tx, key);
    if (found && (found.state === 'queued' || found.state === 'running'))
      return err({
        kind: 'conflict',
        detail: `The run for ${formatDay(date)} is ${found.state} already. Nothing was started. Watch it here; it can be started again once it is done.`,
      });
    const order = { startedBy: actor.person.id, now: actor.now };
    if (found) await queueAnotherAttempt(tx, { id: found.id, ...order });
    const id = found?.id ?? (await insertRun(tx, { ...key, state: 'queued', ...order }));
    const attempt = (found?.attempt ?? 0) + 1;
    await audit(tx, actor, {
      action: 'start-run',
      subjectKind: 'run',
      subjectId: String(id),
      borrowerId: null,
      deskId: null,
      summary: `Nightly run for ${date} started by hand, attempt ${attempt}`,
      before: found && { state: found.state, attempt: found.attempt },
      after: { state: 'queued', attempt },
    });
    return ok({ id, businessDate: date, attempt });
  });
