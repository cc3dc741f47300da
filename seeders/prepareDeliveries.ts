import { keepFile } from '../src/server/services/keepFile.ts';
import type { DemoBorrower, DemoDelivery } from './demo/demoBorrower.ts';
import { demoReading } from './demo/demoReading.ts';
import { demoWorkbook } from './demo/demoWorkbook.ts';

export const WORKBOOK_TYPE = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';

/** A delivery whose workbook is kept already, with what it reads as. */
export interface PreparedDelivery {
  readonly delivery: DemoDelivery;
  readonly sha256: string;
  readonly sizeBytes: number;
  readonly reading: ReturnType<typeof demoReading>;
}

/** Makes and keeps the workbooks before the transaction that names them. */
export async function prepareDeliveries(borrower: DemoBorrower): Promise<PreparedDelivery[]> {
  return Promise.all(
    borrower.deliveries.map(async (delivery) => {
      const content = {
        borrowerName: borrower.name,
        unit: `${borrower.currency} thousands`,
        quarters: delivery.quarters,
        madeOn: delivery.receivedOn,
      };
      const bytes = await demoWorkbook(content);
      return {
        delivery,
        sha256: await keepFile(bytes, WORKBOOK_TYPE),
        sizeBytes: bytes.length,
        reading: demoReading({ ...content, currency: borrower.currency }),
      };
    }),
  );
}
