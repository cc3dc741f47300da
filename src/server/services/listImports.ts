import type { ImportQuery, ImportRow, ImportState, ImportView } from '../../contracts/imports.ts';
import type { Page } from '../../contracts/paging.ts';
import type { Reading } from '../../contracts/reading.ts';
import { err, ok } from '../../core/result.ts';
import { deskScope, may } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { listAnswers, listRemembered } from '../db/repositories/importAnswers.ts';
import { findImport, listImports as listRecords, type ImportRecord } from '../db/repositories/imports.ts';
import type { PersonActor } from './actor.ts';
import type { Outcome } from './write.ts';

export function listImports(actor: PersonActor, query: ImportQuery): Promise<Outcome<Page<ImportRow>>> {
  return inTransaction(async (tx) => {
    const filter = { state: query.state ?? null, borrowerId: query.borrowerId ?? null };
    const { rows, total } = await listRecords(tx, deskScope(actor.person, 'read borrower'), filter, query);
    return ok({ rows: rows.map(toRow), page: query.page, perPage: query.perPage, total });
  });
}

/** One import: the sheets as they were sent, where each row goes, questions, checks and answers. */
export function showImport(actor: PersonActor, id: number): Promise<Outcome<ImportView>> {
  return inTransaction(async (tx) => {
    const record = await findImport(tx, id, deskScope(actor.person, 'read borrower'));
    if (!record) return err({ kind: 'not-found', what: 'import' });
    const reading = JSON.parse(record.reading) as Reading;
    const given = await listAnswers(tx, id);
    const remembered =
      record.layoutKey === null ? [] : await listRemembered(tx, record.borrowerId, record.layoutKey);
    const asked = new Set(reading.questions.map((question) => question.key));
    return ok({
      ...toRow(record),
      reading,
      sha256: record.sha256,
      answers: [
        ...given.map((answer) => ({ ...answer, at: answer.at.toISOString() })),
        ...remembered
          .filter(
            (answer) =>
              asked.has(answer.questionKey) && !given.some((one) => one.questionKey === answer.questionKey),
          )
          .map((answer) => ({ ...answer, by: `remembered from ${answer.by}`, at: answer.at.toISOString() })),
      ],
      basis: record.basis,
      scope: record.scope,
      mayEdit: may(actor.person, 'import figures', record.deskId),
    });
  });
}

const toRow = (record: Omit<ImportRecord, 'reading'>): ImportRow => ({
  id: record.id,
  version: record.version,
  borrowerId: record.borrowerId,
  borrowerName: record.borrowerName,
  fileName: record.fileName,
  state: record.state as ImportState,
  openQuestions: record.openQuestions,
  periods: record.periods,
  uploadedBy: record.uploadedBy,
  uploadedAt: record.uploadedAt.toISOString(),
  acceptedBy: record.acceptedBy,
  acceptedAt: record.acceptedAt?.toISOString() ?? null,
});
