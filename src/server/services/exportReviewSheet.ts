import type { Transaction } from 'sequelize';
import type { ReviewSheet } from '../../contracts/reviewSheet.ts';
import { ok } from '../../core/result.ts';
import { countTry, REVIEW_EXPORTS } from '../auth/limits.ts';
import { writeReviewSheet } from '../sheets/write/reviewSheet.ts';
import type { PersonActor } from './actor.ts';
import { draftSheet } from './makeReviewSheet.ts';
import { tooManyTries } from './tooManyTries.ts';
import { audit, write, type Outcome } from './write.ts';

export interface ExportedSheet {
  readonly fileName: string;
  readonly bytes: Uint8Array;
}

/**
 * The review sheet as a workbook; who took it is in the audit log, and nothing else is changed. A repeat is a new
 * export with a line of its own, so no Idempotency-Key holds here.
 */
export async function exportReviewSheet(actor: PersonActor, id: number): Promise<Outcome<ExportedSheet>> {
  const once = { ...actor, idempotencyKey: null };
  const logged = await write<ReviewSheet>(once, 'export-review-sheet', { id }, async (tx) => {
    const wait = await countTry(tx, REVIEW_EXPORTS, String(actor.person.id), actor.now);
    if (wait !== null) return tooManyTries('export review sheets', wait);
    const drafted = await draftSheet(tx, actor, id);
    if (!drafted.ok) return drafted;
    const { borrower, sheet } = drafted.value;
    await logExport(tx, actor, sheet, borrower.deskId);
    return ok(sheet);
  });
  if (!logged.ok) return logged;
  const sheet = logged.value;
  const day = sheet.madeAt.slice(0, 10);
  return ok({
    fileName: `Review sheet ${sheet.borrowerName} ${day} DRAFT.xlsx`,
    bytes: await writeReviewSheet(sheet),
  });
}

const logExport = (
  tx: Transaction,
  actor: PersonActor,
  sheet: ReviewSheet,
  deskId: number,
): Promise<number> =>
  audit(tx, actor, {
    action: 'export-review-sheet',
    subjectKind: 'borrower',
    subjectId: String(sheet.borrowerId),
    borrowerId: sheet.borrowerId,
    deskId,
    summary: `Exported the review sheet of ${sheet.borrowerName} as XLSX (DRAFT, ${sheet.basisLine})`.slice(
      0,
      500,
    ),
    before: null,
    after: {
      state: sheet.state,
      madeAt: sheet.madeAt,
      basis: sheet.basisLine,
      figures: sheet.sources.length,
    },
  });
