/** Runs: one row per business date and kind, computed in one or several attempts. */
import type { Transaction } from 'sequelize';
import type { PlainDate } from '../../../core/calendar/plainDate.ts';
import { execute, select, selectOne } from '../sql.ts';

export interface RunRecord {
  readonly id: number;
  readonly businessDate: PlainDate;
  readonly kind: string;
  readonly attempt: number;
  readonly state: string;
  readonly phase: string;
  /** What became known later is left out of this attempt. */
  readonly knownAt: Date;
  readonly startedById: number | null;
  readonly startedBy: string | null;
  readonly startedAt: Date;
  readonly finishedAt: Date | null;
  readonly borrowersTotal: number;
  readonly borrowersDone: number;
  readonly borrowersFailed: number;
  readonly crossSectionId: number | null;
  readonly failure: string | null;
}

const COLUMNS = `r.id, r.business_date as businessDate, r.kind, r.attempt, r.state, r.phase, r.known_at as knownAt,
  r.started_by as startedById, p.name as startedBy, r.started_at as startedAt, r.finished_at as finishedAt,
  r.borrowers_total as borrowersTotal, r.borrowers_done as borrowersDone, r.borrowers_failed as borrowersFailed,
  r.cross_section_id as crossSectionId, r.failure`;
const TABLES = 'runs r left join people p on p.id = r.started_by';

export interface RunKey {
  readonly businessDate: PlainDate;
  readonly kind: string;
}

export async function findRunOf(tx: Transaction, key: RunKey): Promise<RunRecord | null> {
  return selectOne<RunRecord>(
    tx,
    `select ${COLUMNS} from ${TABLES} where r.business_date = :businessDate and r.kind = :kind for update`,
    { ...key },
  );
}

export async function findRun(tx: Transaction, id: number): Promise<RunRecord | null> {
  return selectOne<RunRecord>(tx, `select ${COLUMNS} from ${TABLES} where r.id = :id`, { id });
}

export async function listRuns(
  tx: Transaction,
  page: { readonly page: number; readonly perPage: number },
): Promise<{ readonly rows: RunRecord[]; readonly total: number }> {
  const rows = await select<RunRecord>(
    tx,
    `select ${COLUMNS} from ${TABLES} order by r.business_date desc, r.id desc
     limit ${Math.trunc(page.perPage)} offset ${Math.trunc((page.page - 1) * page.perPage)}`,
  );
  const count = await selectOne<{ total: number }>(tx, 'select count(*) as total from runs');
  return { rows, total: count?.total ?? 0 };
}

/** The oldest run that waits, or that somebody left without ending it. */
export async function findRunToDo(tx: Transaction): Promise<RunRecord | null> {
  return selectOne<RunRecord>(
    tx,
    `select ${COLUMNS} from ${TABLES} where r.state in ('queued', 'running') order by r.started_at, r.id limit 1`,
  );
}

/** The unique key refuses a second row for the date: the caller sees a duplicate-key error. */
export async function insertRun(
  tx: Transaction,
  run: RunKey & { readonly state: string; readonly startedBy: number | null; readonly now: Date },
): Promise<number> {
  const { insertId } = await execute(
    tx,
    `insert into runs (business_date, kind, state, phase, known_at, started_by, started_at)
     values (:businessDate, :kind, :state, 'tests', :now, :startedBy, :now)`,
    { ...run },
  );
  return insertId;
}

/** The date once more, from its first phase; what the last attempt stored stays. */
export async function queueAnotherAttempt(
  tx: Transaction,
  run: { readonly id: number; readonly startedBy: number | null; readonly now: Date },
): Promise<void> {
  await execute(
    tx,
    `update runs set state = 'queued', attempt = attempt + 1, phase = 'tests', started_by = :startedBy,
       started_at = :now, finished_at = null, cross_section_id = null, failure = null, borrowers_done = 0,
       borrowers_failed = 0, version = version + 1
     where id = :id`,
    run,
  );
}

/** The attempt begins: from here on its cut-off and its borrowers are fixed. */
export async function beginAttempt(
  tx: Transaction,
  run: { readonly id: number; readonly knownAt: Date; readonly borrowersTotal: number },
): Promise<void> {
  await execute(
    tx,
    `update runs set state = 'running', known_at = :knownAt, started_at = :knownAt, borrowers_total = :borrowersTotal,
       borrowers_done = 0, borrowers_failed = 0, cross_section_id = null, phase = 'tests', version = version + 1
     where id = :id`,
    run,
  );
}

export async function resumeAttempt(tx: Transaction, id: number): Promise<void> {
  await execute(
    tx,
    `update runs set state = 'running', failure = null, finished_at = null, version = version + 1 where id = :id`,
    { id },
  );
}

export async function setPhase(tx: Transaction, id: number, phase: string): Promise<void> {
  await execute(tx, 'update runs set phase = :phase, version = version + 1 where id = :id', { id, phase });
}

export async function setCrossSection(tx: Transaction, id: number, crossSectionId: number): Promise<void> {
  await execute(tx, 'update runs set cross_section_id = :crossSectionId where id = :id', {
    id,
    crossSectionId,
  });
}

/** Counts from the tasks: a borrower that failed in two phases is one. */
export async function countProgress(tx: Transaction, id: number): Promise<void> {
  await execute(
    tx,
    `update runs set
       borrowers_done = (select count(*) from run_tasks t where t.run_id = :id and t.phase = 'scores' and t.state = 'done'),
       borrowers_failed = (select count(distinct t.borrower_id) from run_tasks t where t.run_id = :id and t.state = 'failed')
     where id = :id`,
    { id },
  );
}

/** A fault that is not one borrower's: somebody has to look before the run goes on. */
export async function interruptRun(tx: Transaction, id: number, failure: string): Promise<void> {
  await execute(
    tx,
    `update runs set state = 'interrupted', failure = :failure, finished_at = utc_timestamp(3), version = version + 1
     where id = :id`,
    { id, failure: failure.slice(0, 1_000) },
  );
}

/** `mailedThrough`: changes up to this instant have gone into somebody's digest; null leaves the mark as it is. */
export async function finishRun(
  tx: Transaction,
  run: { readonly id: number; readonly mailedThrough: Date | null },
): Promise<void> {
  await execute(
    tx,
    `update runs set state = 'done', finished_at = utc_timestamp(3), version = version + 1,
       mailed_through = coalesce(:mailedThrough, mailed_through)
     where id = :id`,
    run,
  );
}

/** Up to when changes were mailed; null before the first digest. */
export async function lastMailedThrough(tx: Transaction, kind: string): Promise<Date | null> {
  const row = await selectOne<{ latest: Date | null }>(
    tx,
    'select max(mailed_through) as latest from runs where kind = :kind',
    { kind },
  );
  return row?.latest ?? null;
}

/** The business date whose digest came before this one's; null for the first. */
export async function previousDigestDate(tx: Transaction, key: RunKey): Promise<PlainDate | null> {
  const row = await selectOne<{ latest: PlainDate | null }>(
    tx,
    `select max(business_date) as latest from runs
     where kind = :kind and business_date < :businessDate and mailed_through is not null`,
    { ...key },
  );
  return row?.latest ?? null;
}

/** True where a later date was computed already: then this date is a look back. */
export async function isLaterDateDone(tx: Transaction, key: RunKey): Promise<boolean> {
  const row = await selectOne(
    tx,
    `select id from runs where kind = :kind and business_date > :businessDate and state = 'done' limit 1`,
    { ...key },
  );
  return row !== null;
}
