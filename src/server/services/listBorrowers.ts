import type { BorrowerQuery, BorrowerRow } from '../../contracts/borrowers.ts';
import type { Page } from '../../contracts/paging.ts';
import type { QualityBand } from '../../core/quality/score.ts';
import { ok } from '../../core/result.ts';
import { deskScope } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { listBorrowers as listRecords, type BorrowerListRecord } from '../db/repositories/borrowerLists.ts';
import type { PersonActor } from './actor.ts';
import { loadStrips, type Strip } from './strips.ts';
import type { Outcome } from './write.ts';

export function listBorrowers(actor: PersonActor, query: BorrowerQuery): Promise<Outcome<Page<BorrowerRow>>> {
  return inTransaction(async (tx) => {
    const filter = {
      search: query.search ? query.search : null,
      sector: query.sector ?? null,
      deskId: query.deskId ?? null,
    };
    const { rows, total } = await listRecords(tx, deskScope(actor.person, 'read borrower'), filter, query);
    const stripOf = await loadStrips(
      tx,
      rows.map((row) => ({ assessmentId: row.assessmentId, covenantId: row.smallestCovenantId })),
    );
    return ok({
      rows: rows.map((row) =>
        toRow(row, stripOf({ assessmentId: row.assessmentId, covenantId: row.smallestCovenantId })),
      ),
      page: query.page,
      perPage: query.perPage,
      total,
    });
  });
}

const toRow = (record: BorrowerListRecord, strip: Strip): BorrowerRow => ({
  id: record.id,
  name: record.name,
  deskName: record.deskName,
  sectorLabel: record.sectorLabel,
  currency: record.currency,
  limit: record.limitTotal,
  drawn: record.drawnTotal,
  managerName: record.managerName,
  ...strip,
  mayFallAhead:
    record.aheadMayFall !== null && record.aheadFrom !== null
      ? { mayFall: record.aheadMayFall, from: record.aheadFrom }
      : null,
  qualityHeadline: record.qualityHeadline === null ? null : Math.round(Number(record.qualityHeadline)),
  qualityBand: record.qualityBand as QualityBand | null,
  openAlerts: record.openAlerts,
  urgentAlerts: record.urgentAlerts,
  watchGrade: record.watchGrade,
  latestFigures: record.latestFigures,
});
