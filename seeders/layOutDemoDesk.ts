import type { PlainDate } from '../src/core/calendar/plainDate.ts';
import { err, ok } from '../src/core/result.ts';
import { hashPassword } from '../src/server/auth/passwords.ts';
import { insertCurrencyRates } from '../src/server/db/repositories/currencyRates.ts';
import { anybodyExists } from '../src/server/db/repositories/people.ts';
import { insertSector } from '../src/server/db/repositories/sectors.ts';
import { systemActor } from '../src/server/services/actor.ts';
import { audit, write, type Outcome } from '../src/server/services/write.ts';
import { demoBook } from './demo/demoBook.ts';
import { latestReportedQuarterEnd } from './demo/demoDays.ts';
import { demoRates } from './demo/demoRates.ts';
import { DEMO_PASSWORD, DEMO_PEOPLE, LENDER_NAME } from './demo/people.ts';
import { SECTOR_PROFILES, SECTOR_SCHEME } from './demo/sectorProfiles.ts';
import { quartersUpTo } from './demo/tradingPlan.ts';
import { instantOn, layOutBorrower, placeOf } from './layOutBorrower.ts';
import { layOutPeople } from './layOutPeople.ts';
import { layOutStatements } from './layOutStatements.ts';
import { prepareDeliveries, type PreparedDelivery } from './prepareDeliveries.ts';

/** Everything in one transaction: a start that is cut leaves an empty database, not half a book. */
export async function layOutDemoDesk({
  seedDay,
  now,
}: {
  seedDay: PlainDate;
  now: Date;
}): Promise<Outcome<null>> {
  const book = demoBook(seedDay);
  const prepared: PreparedDelivery[][] = [];
  for (const borrower of book) prepared.push(await prepareDeliveries(borrower));
  const hashes = await Promise.all(DEMO_PEOPLE.map(() => hashPassword(DEMO_PASSWORD)));
  const actor = systemActor('demo-desk', now);
  return write(actor, 'lay-out-demo-desk', { seedDay }, async (tx) => {
    if (await anybodyExists(tx))
      return err({
        kind: 'conflict',
        detail:
          'There are people in this database already. The demo desk was not laid out; nothing was changed.',
      });
    const people = await layOutPeople(tx, { seededOn: seedDay, hashes, now });
    for (const { code, label } of Object.values(SECTOR_PROFILES))
      await insertSector(tx, { code, label, scheme: SECTOR_SCHEME });
    for (const { end } of quartersUpTo(latestReportedQuarterEnd(seedDay)))
      await insertCurrencyRates(tx, demoRates(end), instantOn(end, '18:00'));
    for (const [index, borrower] of book.entries()) {
      const { analystId, deskId } = placeOf(borrower, people);
      const borrowerId = await layOutBorrower(tx, borrower, people);
      const deliveries = prepared[index] ?? [];
      await layOutStatements(tx, borrower, { borrowerId, analystId, prepared: deliveries });
      await audit(tx, actor, {
        action: 'lay-out-borrower',
        subjectKind: 'borrower',
        subjectId: String(borrowerId),
        borrowerId,
        deskId,
        summary: `Laid out ${borrower.name} with ${borrower.covenants.length + borrower.furtherCovenants.length} covenants and ${borrower.quarters.length} quarters`,
        before: null,
        after: { files: deliveries.map(({ sha256 }) => sha256) },
      });
    }
    await audit(tx, actor, {
      action: 'lay-out-demo-desk',
      subjectKind: 'lender',
      subjectId: '1',
      borrowerId: null,
      deskId: null,
      summary: `Laid out the demo desk of ${LENDER_NAME} as of ${seedDay}: ${book.length} borrowers`,
      before: null,
      after: { seedDay, borrowers: book.length },
    });
    return ok(null);
  });
}
