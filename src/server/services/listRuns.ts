import type { Page, PageQuery } from '../../contracts/paging.ts';
import type { RunDetail, RunKind, RunPhase, RunRow, RunState } from '../../contracts/runs.ts';
import { err, ok } from '../../core/result.ts';
import { mayAnywhere } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findRun, listRuns as listRunRecords, type RunRecord } from '../db/repositories/runs.ts';
import { countTasks, listFailures } from '../db/repositories/runTasks.ts';
import type { PersonActor } from './actor.ts';
import type { Outcome } from './write.ts';

const NOT_ALLOWED = err({ kind: 'not-allowed' as const, detail: 'Runs are read by administrators.' });

/** The latest business date first. */
export async function listRuns(actor: PersonActor, query: PageQuery): Promise<Outcome<Page<RunRow>>> {
  if (!mayAnywhere(actor.person, 'administer')) return NOT_ALLOWED;
  const { rows, total } = await inTransaction((tx) => listRunRecords(tx, query));
  return ok({ rows: rows.map(toRow), page: query.page, perPage: query.perPage, total });
}

/** One run with its counts and what failed. Borrowers are named by number: administrators do not read them. */
export async function showRun(actor: PersonActor, id: number): Promise<Outcome<RunDetail>> {
  if (!mayAnywhere(actor.person, 'administer')) return NOT_ALLOWED;
  return inTransaction(async (tx) => {
    const run = await findRun(tx, id);
    if (!run) return err({ kind: 'not-found', what: 'run' });
    const failures = await listFailures(tx, id);
    return ok({
      ...toRow(run),
      steps: (await countTasks(tx, id)).map(({ phase, done, failed, total }) => ({
        phase,
        done,
        failed,
        total,
      })),
      failures: failures.map(({ borrowerId, deskName, phase, reason }) => ({
        borrowerId,
        deskName,
        phase,
        reason,
      })),
    });
  });
}

const toRow = (run: RunRecord): RunRow => ({
  id: run.id,
  businessDate: run.businessDate,
  kind: run.kind as RunKind,
  attempt: run.attempt,
  state: run.state as RunState,
  phase: run.phase as RunPhase,
  knownAt: run.knownAt.toISOString(),
  startedBy: run.startedBy,
  startedAt: run.startedAt.toISOString(),
  finishedAt: run.finishedAt?.toISOString() ?? null,
  borrowersTotal: run.borrowersTotal,
  borrowersDone: run.borrowersDone,
  borrowersFailed: run.borrowersFailed,
  failure: run.failure,
});
