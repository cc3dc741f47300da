import type { AlertQuery, AlertRow } from '../../contracts/alerts.ts';
import type { Page } from '../../contracts/paging.ts';
import type { AlertKind, AlertState, Severity } from '../../core/alerts/alert.ts';
import { addDays } from '../../core/calendar/plainDate.ts';
import { decimal } from '../../core/money/decimal.ts';
import type { QualityBand } from '../../core/quality/score.ts';
import { ok } from '../../core/result.ts';
import type { Transaction } from 'sequelize';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import {
  listAlerts as listRecords,
  type AlertFilter,
  type AlertListRecord,
} from '../db/repositories/alertLists.ts';
import { actsFor } from '../db/repositories/borrowerDesks.ts';
import type { PersonActor } from './actor.ts';
import { lenderDay } from './lenderDay.ts';
import { loadStrips, type Strip } from './strips.ts';
import type { Outcome } from './write.ts';

export function listAlerts(actor: PersonActor, query: AlertQuery): Promise<Outcome<Page<AlertRow>>> {
  return inTransaction(async (tx) => {
    const { rows, total } = await listRecords(
      tx,
      deskScope(actor.person, 'read borrower'),
      await alertFilter(tx, actor, query),
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

/** "Mine" are those of an absent person too, where I am the deputy. */
export async function alertFilter(
  tx: Transaction,
  actor: PersonActor,
  query: AlertQuery,
): Promise<AlertFilter> {
  const today = await lenderDay(tx, actor.now);
  return {
    ownerIds: query.view === 'mine' ? await actsFor(tx, actor.person.id, today) : null,
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
  const key = (record: AlertListRecord) => ({
    assessmentId: record.assessmentId,
    covenantId: record.stripCovenantId,
  });
  const stripOf = await loadStrips(tx, records.map(key));
  return records.map((record) => toRow(record, stripOf(key(record)), now));
}

const toRow = (record: AlertListRecord, strip: Strip, now: Date): AlertRow => ({
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
  ...strip,
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
});
