/** One phase of a run over its borrowers: one transaction each, under the run's lock. */
import type { Transaction } from 'sequelize';
import { inTransaction, isOutage } from '../db/inTransaction.ts';
import { renewLock, type HeldLock } from '../db/repositories/jobLocks.ts';
import { countProgress, type RunRecord } from '../db/repositories/runs.ts';
import { claimTask, endTask, listOpenTasks, type TaskKey } from '../db/repositories/runTasks.ts';

export const NIGHT_LOCK = 'nightly-run';
/** Far longer than one borrower or one cross-section takes; this long a cut run waits for its successor. */
export const LOCK_SECONDS = 60;
/** A borrower that took the process down so often is marked failed, so that the others get their turn. */
const MOST_TRIES = 3;

/** Somebody else holds the run: nothing that was computed since may stay. */
export class RunLockLost extends Error {
  constructor() {
    super('another process has taken over this run');
  }
}

/** Told to end between two borrowers: the run stays as it is and goes on with the next start. */
export class RunStopped extends Error {
  constructor() {
    super('told to stop; the run goes on with the next start');
  }
}

export interface Night {
  readonly run: RunRecord;
  readonly lock: HeldLock;
  readonly signal: AbortSignal | null;
}

/**
 * Does the work for every borrower whose task is open. What the work returns is kept with its task; what it throws
 * is that borrower's failure, unless the database or the lock is gone.
 */
export async function eachBorrower(
  { run, lock, signal }: Night,
  phase: 'tests' | 'scores',
  work: (tx: Transaction, borrowerId: number) => Promise<string>,
): Promise<void> {
  const borrowerIds = await inTransaction((tx) => listOpenTasks(tx, run.id, phase));
  for (const borrowerId of borrowerIds) {
    if (signal?.aborted) throw new RunStopped();
    const task = { runId: run.id, phase, borrowerId, owner: lock.owner, fence: lock.fence };
    const tries = await inTransaction((tx) => claimTask(tx, task));
    const failure =
      tries > MOST_TRIES
        ? `started ${MOST_TRIES} times and never ended`
        : await attempt(task, lock, (tx) => work(tx, borrowerId));
    if (failure !== null) await inTransaction((tx) => end(tx, task, lock, { state: 'failed', failure }));
  }
}

/** Null where the task is done; the reason where it failed. */
async function attempt(
  task: TaskKey & { readonly fence: number },
  lock: HeldLock,
  work: (tx: Transaction) => Promise<string>,
): Promise<string | null> {
  try {
    await inTransaction(async (tx) => end(tx, task, lock, { state: 'done', output: await work(tx) }));
    return null;
  } catch (error) {
    if (error instanceof RunLockLost || isOutage(error) || !(error instanceof Error)) throw error;
    return error.message;
  }
}

async function end(
  tx: Transaction,
  task: TaskKey & { readonly fence: number },
  lock: HeldLock,
  result: Parameters<typeof endTask>[2],
): Promise<void> {
  if (!(await endTask(tx, task, result))) throw new RunLockLost();
  await countProgress(tx, task.runId);
  if (!(await renewLock(tx, lock, LOCK_SECONDS))) throw new RunLockLost();
}
