import type { AlertQuery, AlertRow, StripTest } from '../../contracts/alerts.ts';
import type { Page } from '../../contracts/paging.ts';
import type { AlertKind, AlertState, Severity } from '../../core/alerts/alert.ts';
import { addDays, plainDate } from '../../core/calendar/plainDate.ts';
import type { Outcome as TestOutcome } from '../../core/covenants/covenantTest.ts';
import { decimal } from '../../core/money/decimal.ts';
import type { QualityBand } from '../../core/quality/score.ts';
import { ok } from '../../core/result.ts';
import type { Transaction } from 'sequelize';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import {
  listAlerts as listRecords,
  listStrips,
  type AlertFilter,
  type AlertListRecord,
  type StripRecord,
} from '../db/repositories/alertLists.ts';
import type { PersonActor } from './actor.ts';
import type { Outcome } from './write.ts';

const STRIP_LENGTH = 12;

export function listAlerts(actor: PersonActor, query: AlertQuery): Promise<Outcome<Page<AlertRow>>> {
  return inTransaction(async (tx) => {
    const { rows, total } = await listRecords(
      tx,
      deskScope(actor.person, 'read borrower'),
      filterOf(actor, query),
      query,
    );
    return ok({
      rows: await withStrips(tx, rows, actor.now),
      page: query.page,
      perPage: query.perPage,
      total,
    });
  });
}

function filterOf(actor: PersonActor, query: AlertQuery): AlertFilter {
  const today = plainDate(actor.now.toISOString().slice(0, 10));
  return {
    ownerId: query.view === 'mine' ? actor.person.id : null,
    notTaken: query.view === 'not-taken',
    kind: query.kind ?? null,
    severity: query.severity ?? null,
    sector: query.sector ?? null,
    mayFallBelow: query.mayFallBelow === undefined ? null : decimal(query.mayFallBelow).div(100).toString(),
    dueBy: query.dueWithinDays === undefined ? null : addDays(today, query.dueWithinDays),
    state: query.state,
    borrowerId: query.borrowerId ?? null,
  };
}

/** Rows as the table shows them, with the sounding strips of all of them read at once. */
export async function withStrips(
  tx: Transaction,
  records: readonly AlertListRecord[],
  now: Date,
): Promise<AlertRow[]> {
  const wanted = records.flatMap((record) =>
    record.assessmentId !== null && record.stripCovenantId !== null
      ? [{ assessmentId: record.assessmentId, covenantId: record.stripCovenantId }]
      : [],
  );
  const strips = new Map<string, StripRecord[]>();
  for (const test of await listStrips(tx, wanted)) {
    const key = `${test.assessmentId}:${test.covenantId}`;
    const tests = strips.get(key);
    if (tests) tests.push(test);
    else strips.set(key, [test]);
  }
  return records.map((record) =>
    toRow(record, strips.get(`${record.assessmentId}:${record.stripCovenantId}`) ?? [], now),
  );
}

function toRow(record: AlertListRecord, tests: readonly StripRecord[], now: Date): AlertRow {
  const latest = tests.at(-1);
  return {
    id: record.id,
    version: record.version,
    borrowerId: record.borrowerId,
    borrowerName: record.borrowerName,
    deskName: record.deskName,
    sectorLabel: record.sectorLabel,
    kind: record.kind as AlertKind,
    severity: record.severity as Severity,
    state: record.state as AlertState,
    sentence: record.sentence,
    covenantName: latest?.covenantName ?? null,
    strip: tests.slice(-STRIP_LENGTH).map(toStripTest),
    mayFall: tests.findLast((test) => test.mayFall !== null)?.mayFall ?? null,
    latestOutcome: (latest?.outcome as TestOutcome | undefined) ?? null,
    qualityHeadline: record.qualityHeadline === null ? null : Math.round(Number(record.qualityHeadline)),
    qualityBand: record.qualityBand as QualityBand | null,
    ownerId: record.ownerId,
    ownerName: record.ownerName,
    takenBy: record.takenBy,
    dueOn: record.dueOn,
    counter: record.counter,
    raisedAt: record.raisedAt.toISOString(),
    newSinceYesterday: now.getTime() - record.raisedAt.getTime() < 86_400_000,
    conditionGone: record.conditionGoneAt !== null,
    putOffUntil: record.putOffUntil,
  };
}

export const toStripTest = (test: StripRecord): StripTest => ({
  testDate: test.testDate,
  outcome: test.outcome as TestOutcome,
  mayFall: test.mayFall,
  justPassing: test.justPassing === 1,
  level: test.level,
});
