/** The end of a run: digests, the administrators' heartbeat, and the run's own state, in one transaction. */
import type { Transaction } from 'sequelize';
import { formatInstant } from '../../core/calendar/printInstant.ts';
import { formatDay } from '../../core/calendar/printDay.ts';
import { holdAuditHead } from '../db/repositories/audit.ts';
import { countWaitingMail, listDigestReaders } from '../db/repositories/digestAlerts.ts';
import { renewLock } from '../db/repositories/jobLocks.ts';
import { findLender, type Lender } from '../db/repositories/lender.ts';
import { queueMail } from '../db/repositories/outbox.ts';
import {
  findRun,
  finishRun,
  isLaterDateDone,
  lastMailedThrough,
  previousDigestDate,
  type RunRecord,
} from '../db/repositories/runs.ts';
import { listFailures, listOutputs, type TaskFailure } from '../db/repositories/runTasks.ts';
import { heartbeatMail, type Heartbeat } from '../mail/heartbeat.ts';
import { systemActor } from './actor.ts';
import { LOCK_SECONDS, RunLockLost, type Night } from './eachBorrower.ts';
import type { AlertCounts } from './raiseAlerts.ts';
import { address, sendDigests } from './sendDigest.ts';
import { audit } from './write.ts';

export interface RunSummary {
  readonly outcome: 'done';
  readonly runId: number;
  readonly attempt: number;
  readonly tested: number;
  readonly total: number;
  readonly failed: number;
  readonly alertsRaised: number;
  readonly alertsWorsened: number;
  readonly alertsClosed: number;
  /** Digests and heartbeats queued. */
  readonly mails: number;
}

export async function finishNight(tx: Transaction, { run: begun, lock }: Night): Promise<RunSummary> {
  // First of all, and with its row held to the end: a second process can finish nothing beside this one.
  if (!(await renewLock(tx, lock, LOCK_SECONDS))) throw new RunLockLost();
  const auditHead = await holdAuditHead(tx);
  const run = await findRun(tx, begun.id);
  const lender = await findLender(tx);
  if (!run || !lender) throw new Error(`run ${begun.id} or the lender is gone`);
  const failures = await listFailures(tx, run.id);
  const counts = sumOf(
    (await listOutputs(tx, run.id, 'scores')).map((text) => JSON.parse(text) as AlertCounts),
  );
  const key = { businessDate: run.businessDate, kind: run.kind };
  const isLookBack = await isLaterDateDone(tx, key);

  const digests = isLookBack ? 0 : await queueDigests(tx, run, lender, failures);
  const heartbeats = await queueHeartbeats(tx, run, {
    lenderName: lender.name,
    day: formatDay(run.businessDate),
    attempt: run.attempt,
    isLookBack,
    ...instants(run, lender),
    tested: run.borrowersDone,
    total: run.borrowersTotal,
    alerts: counts,
    digests,
    mailsWaiting: (await countWaitingMail(tx)) - digests,
    failures: failures.map(
      (failure) =>
        `Borrower ${failure.borrowerId} (${failure.deskName}), ${failure.phase}: ${failure.reason}`,
    ),
    auditHead,
    runsUrl: address('/desk-settings/runs'),
  });
  await finishRun(tx, { id: run.id, mailedThrough: isLookBack ? null : run.knownAt });
  const summary: RunSummary = {
    outcome: 'done',
    runId: run.id,
    attempt: run.attempt,
    tested: run.borrowersDone,
    total: run.borrowersTotal,
    failed: run.borrowersFailed,
    alertsRaised: counts.raised,
    alertsWorsened: counts.worsened,
    alertsClosed: counts.closed,
    mails: digests + heartbeats,
  };
  await audit(tx, systemActor(`night-${run.id}-${run.attempt}`, run.knownAt), {
    action: 'finish-run',
    subjectKind: 'run',
    subjectId: String(run.id),
    borrowerId: null,
    deskId: null,
    summary: `Nightly run for ${run.businessDate}: tested ${summary.tested} of ${summary.total}, ${summary.failed} failed`,
    before: null,
    after: summary,
  });
  return summary;
}

async function queueDigests(
  tx: Transaction,
  run: RunRecord,
  lender: Lender,
  failures: readonly TaskFailure[],
): Promise<number> {
  const { knownAt, runAt } = instants(run, lender);
  return sendDigests(tx, {
    runId: run.id,
    attempt: run.attempt,
    businessDate: run.businessDate,
    since: await previousDigestDate(tx, { businessDate: run.businessDate, kind: run.kind }),
    tellsDueDates: run.attempt === 1,
    changedAfter: await lastMailedThrough(tx, run.kind),
    knownAt: run.knownAt,
    knownAtText: knownAt,
    runAtText: runAt,
    tested: run.borrowersDone,
    total: run.borrowersTotal,
    failures,
  });
}

async function queueHeartbeats(tx: Transaction, run: RunRecord, heartbeat: Heartbeat): Promise<number> {
  const mail = heartbeatMail(heartbeat);
  let queued = 0;
  for (const reader of await listDigestReaders(tx)) {
    if (!reader.isAdministrator) continue;
    const isNew = await queueMail(tx, {
      messageKey: `heartbeat:${run.id}:${run.attempt}:${reader.id}`,
      personId: reader.id,
      toName: reader.name,
      toAddress: reader.email,
      ...mail,
      headers: {},
      now: run.knownAt,
    });
    if (isNew) queued += 1;
  }
  return queued;
}

const instants = (run: RunRecord, { zone }: Lender) => ({
  knownAt: formatInstant(run.knownAt, zone),
  runAt: formatInstant(run.startedAt, zone),
});

const sumOf = (counts: readonly AlertCounts[]): { raised: number; worsened: number; closed: number } => ({
  raised: counts.reduce((sum, one) => sum + one.raised, 0),
  worsened: counts.reduce((sum, one) => sum + one.worsened, 0),
  closed: counts.reduce((sum, one) => sum + one.closed, 0),
});
