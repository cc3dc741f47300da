import type { Transaction } from 'sequelize';
import { addDays } from '../src/core/calendar/plainDate.ts';
import { statementsFromReading } from '../src/core/statements/statementsFromReading.ts';
import { raiseInputVersion } from '../src/server/db/repositories/borrowers.ts';
import { insertFile } from '../src/server/db/repositories/files.ts';
import { insertImport, markAccepted } from '../src/server/db/repositories/imports.ts';
import {
  insertStatementVersions,
  type DeliveredStatement,
} from '../src/server/db/repositories/statements.ts';
import type { DemoBorrower } from './demo/demoBorrower.ts';
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
    const periods = new Set(reading.facts.map(({ periodEnd, months }) => `${periodEnd} ${months}`));
    const importId = await insertImport(tx, {
      borrowerId,
      sha256,
      fileName: delivery.fileName,
      uploadedBy: analystId,
      now: receivedAt,
      reading: JSON.stringify(reading),
      layoutKey: reading.layoutKey,
      openQuestions: 0,
      periods: periods.size,
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
