/** One task per run, phase and borrower, so that a run goes on where it was cut. */
import type { Transaction } from 'sequelize';
import { insertRows } from '../insertRows.ts';
import { execute, select, selectOne } from '../sql.ts';

export interface TaskKey {
  readonly runId: number;
  readonly phase: string;
  readonly borrowerId: number;
}

/** Tasks of a fresh attempt in place of those of the last. */
export async function layOutTasks(
  tx: Transaction,
  run: {
    readonly id: number;
    readonly phases: readonly string[];
    readonly borrowerIds: readonly number[];
  },
): Promise<void> {
  await execute(tx, 'delete from run_tasks where run_id = :id', { id: run.id });
  await insertRows(
    tx,
    'run_tasks',
    run.phases.flatMap((phase) =>
      run.borrowerIds.map((borrowerId) => ({
        run_id: run.id,
        phase,
        borrower_id: borrowerId,
        state: 'queued',
      })),
    ),
  );
}

/** Borrowers whose task in this phase is neither done nor failed, in order of their ids. */
export async function listOpenTasks(tx: Transaction, runId: number, phase: string): Promise<number[]> {
  const rows = await select<{ borrowerId: number }>(
    tx,
    `select borrower_id as borrowerId from run_tasks
     where run_id = :runId and phase = :phase and state in ('queued', 'running') order by borrower_id`,
    { runId, phase },
  );
  return rows.map((row) => row.borrowerId);
}

/** Takes the task under the lock's fence; the number of tries so far, this one included. */
export async function claimTask(
  tx: Transaction,
  task: TaskKey & { readonly owner: string; readonly fence: number },
): Promise<number> {
  await execute(
    tx,
    `update run_tasks set state = 'running', owner = :owner, fence = :fence, tries = tries + 1
     where run_id = :runId and phase = :phase and borrower_id = :borrowerId and state in ('queued', 'running')
       and fence <= :fence`,
    { ...task },
  );
  const row = await selectOne<{ tries: number }>(
    tx,
    'select tries from run_tasks where run_id = :runId and phase = :phase and borrower_id = :borrowerId',
    { runId: task.runId, phase: task.phase, borrowerId: task.borrowerId },
  );
  if (!row) throw new Error(`run ${task.runId} has no task ${task.phase} for borrower ${task.borrowerId}`);
  return row.tries;
}

/** False where the task is not this fence's any more: then what was computed must not stay. */
export async function endTask(
  tx: Transaction,
  task: TaskKey & { readonly fence: number },
  end:
    | { readonly state: 'done'; readonly output: string | null }
    | { readonly state: 'failed'; readonly failure: string },
): Promise<boolean> {
  const { affectedRows } = await execute(
    tx,
    `update run_tasks set state = :state, output = :output, failure = :failure
     where run_id = :runId and phase = :phase and borrower_id = :borrowerId and fence = :fence and state = 'running'`,
    {
      runId: task.runId,
      phase: task.phase,
      borrowerId: task.borrowerId,
      fence: task.fence,
      state: end.state,
      output: end.state === 'done' ? end.output : null,
      failure: end.state === 'failed' ? end.failure.slice(0, 1_000) : null,
    },
  );
  return affectedRows === 1;
}

/** What the done tasks of a phase handed on, in order of the borrowers' ids. */
export async function listOutputs(tx: Transaction, runId: number, phase: string): Promise<string[]> {
  const rows = await select<{ output: string }>(
    tx,
    `select output from run_tasks
     where run_id = :runId and phase = :phase and state = 'done' and output is not null order by borrower_id`,
    { runId, phase },
  );
  return rows.map((row) => row.output);
}

/** The outputs of a phase are in the cross-section now; kept twice they would only take room. */
export async function dropOutputs(tx: Transaction, runId: number, phase: string): Promise<void> {
  await execute(tx, 'update run_tasks set output = null where run_id = :runId and phase = :phase', {
    runId,
    phase,
  });
}

export interface PhaseCount {
  readonly phase: string;
  readonly done: number;
  readonly failed: number;
  readonly total: number;
}

export async function countTasks(tx: Transaction, runId: number): Promise<PhaseCount[]> {
  const rows = await select<{ phase: string; done: string; failed: string; total: number }>(
    tx,
    `select phase, sum(state = 'done') as done, sum(state = 'failed') as failed, count(*) as total
     from run_tasks where run_id = :runId group by phase order by phase`,
    { runId },
  );
  return rows.map((row) => ({
    phase: row.phase,
    done: Number(row.done),
    failed: Number(row.failed),
    total: row.total,
  }));
}

export interface TaskFailure {
  readonly borrowerId: number;
  readonly borrowerName: string;
  readonly deskName: string;
  readonly relationshipManagerId: number;
  readonly phase: string;
  readonly reason: string;
}

export async function listFailures(tx: Transaction, runId: number): Promise<TaskFailure[]> {
  return select<TaskFailure>(
    tx,
    `select t.borrower_id as borrowerId, b.name as borrowerName, d.name as deskName,
       b.relationship_manager_id as relationshipManagerId,
       t.phase, coalesce(t.failure, '') as reason
     from run_tasks t join borrowers b on b.id = t.borrower_id join desks d on d.id = b.desk_id
     where t.run_id = :runId and t.state = 'failed' order by b.name, t.borrower_id, t.phase`,
    { runId },
  );
}
