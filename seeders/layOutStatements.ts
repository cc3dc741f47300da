import type { Transaction } from 'sequelize';
import { addDays } from '../src/core/calendar/plainDate.ts';
import { statementsFromReading } from '../src/core/statements/statementsFromReading.ts';
import { raiseInputVersion } from '../src/server/db/repositories/borrowers.ts';
import { insertFile } from '../src/server/db/repositories/files.ts';
import { insertAnswer, rememberAnswer } from '../src/server/db/repositories/importAnswers.ts';
import { insertImport, markAccepted } from '../src/server/db/repositories/imports.ts';
import {
  insertStatementVersions,
  type DeliveredStatement,
} from '../src/server/db/repositories/statements.ts';
import { toStaged } from '../src/server/services/readStoredFile.ts';
import type { DemoBorrower } from './demo/demoBorrower.ts';
import { MEMORANDUM_PLACEMENTS } from './demo/workbookLayout.ts';
import { instantOn } from './layOutBorrower.ts';
import { WORKBOOK_TYPE, type PreparedDelivery } from './prepareDeliveries.ts';

/**
 * Accepts the borrower's deliveries in turn, each as an import of a kept workbook. The services would do the same
 * with an assessment after each; here one night assesses everybody.
 */
export async function layOutStatements(
  tx: Transaction,
  borrower: DemoBorrower,
  {
    borrowerId,
    analystId,
    prepared,
  }: { borrowerId: number; analystId: number; prepared: readonly PreparedDelivery[] },
): Promise<void> {
  const seen = new Set<string>();
  for (const { delivery, sha256, sizeBytes, reading } of prepared) {
    const receivedAt = instantOn(delivery.receivedOn, '09:10');
    const acceptedAt = instantOn(delivery.receivedOn, '09:40');
    await insertFile(tx, { sha256, sizeBytes, mediaType: WORKBOOK_TYPE, now: receivedAt });
    const importId = await insertImport(tx, {
      borrowerId,
      sha256,
      fileName: delivery.fileName,
      uploadedBy: analystId,
      now: receivedAt,
      ...toStaged(reading),
    });
    await rememberPlacements(tx, {
      borrowerId,
      importId,
      layoutKey: reading.layoutKey,
      personId: analystId,
      now: acceptedAt,
    });
    const taken = { basis: 'management', scope: 'group' } as const;
    const isAccepted = await markAccepted(tx, {
      id: importId,
      version: 1,
      ...taken,
      acceptedBy: analystId,
      now: acceptedAt,
    });
    if (!isAccepted) throw new Error(`import ${importId} was not accepted`);
    // A first version arrived in its own time; one that replaces another came with this delivery.
    const statements = statementsFromReading(reading).map((staged): DeliveredStatement => ({
      ...staged,
      receivedOn: seen.has(staged.periodEnd)
        ? delivery.receivedOn
        : addDays(staged.periodEnd, borrower.usualDelayDays),
    }));
    await insertStatementVersions(
      tx,
      { borrowerId, importId, ...taken, framework: borrower.framework, knownFrom: acceptedAt },
      statements,
    );
    for (const { periodEnd } of statements) seen.add(periodEnd);
    await raiseInputVersion(tx, borrowerId);
  }
}

/** The analyst's answers, on the import and for later files of its layout. */
async function rememberPlacements(
  tx: Transaction,
  place: { borrowerId: number; importId: number; layoutKey: string; personId: number; now: Date },
): Promise<void> {
  for (const [questionKey, answer] of Object.entries(MEMORANDUM_PLACEMENTS)) {
    await insertAnswer(tx, { ...place, questionKey, answer, holdsFor: 'layout' });
    await rememberAnswer(tx, { ...place, questionKey, answer });
  }
}
