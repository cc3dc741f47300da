import type { Transaction } from 'sequelize';
import type { RunKind } from '../../contracts/runs.ts';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { listBorrowerIds } from '../db/repositories/borrowerInputs.ts';
import {
  beginAttempt,
  findRun,
  findRunOf,
  insertRun,
  queueAnotherAttempt,
  resumeAttempt,
  type RunRecord,
} from '../db/repositories/runs.ts';
import { layOutTasks } from '../db/repositories/runTasks.ts';
import { systemActor } from './actor.ts';
import { audit } from './write.ts';

interface RunOrder {
  readonly businessDate: PlainDate;
  readonly kind: RunKind;
  readonly startedBy: number | null;
  readonly now: Date;
  readonly again?: boolean;
}

/**
 * The run of the date, ready to be computed: new, taken up where it was cut, or once more where that was asked.
 * Null where the date is done. The caller holds the night's lock, so nobody else decides about it.
 */
export async function beginRun(tx: Transaction, order: RunOrder): Promise<RunRecord | null> {
  const { businessDate, kind, startedBy, now } = order;
  const found = await findRunOf(tx, { businessDate, kind });
  if (found?.state === 'done' && !order.again) return null;
  if (found && (found.state === 'running' || found.state === 'interrupted')) {
    await resumeAttempt(tx, found.id);
    await record(tx, found, now, 'resume-run', `taken up again, attempt ${found.attempt}`);
    return findRun(tx, found.id);
  }
  if (found?.state === 'done') await queueAnotherAttempt(tx, { id: found.id, startedBy, now });
  const id = found?.id ?? (await insertRun(tx, { businessDate, kind, state: 'running', startedBy, now }));
  const borrowerIds = await listBorrowerIds(tx);
  await beginAttempt(tx, { id, knownAt: now, borrowersTotal: borrowerIds.length });
  await layOutTasks(tx, { id, phases: ['tests', 'scores'], borrowerIds });
  const run = await findRun(tx, id);
  if (!run) throw new Error(`run ${id} is gone`);
  await record(tx, run, now, 'begin-run', `begun, attempt ${run.attempt}, ${borrowerIds.length} borrowers`);
  return run;
}

const record = (tx: Transaction, run: RunRecord, now: Date, action: string, what: string) =>
  audit(tx, systemActor(`night-${run.id}`, now), {
    action,
    subjectKind: 'run',
    subjectId: String(run.id),
    borrowerId: null,
    deskId: null,
    summary: `Nightly run for ${run.businessDate}: ${what}`,
    before: null,
    after: { attempt: run.attempt, knownAt: run.knownAt.toISOString() },
  });
