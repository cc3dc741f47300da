import type { Reading } from '../src/core/statements/workbookReading.ts';
import { keepFile } from '../src/server/services/keepFile.ts';
import { readBytes } from '../src/server/sheets/read/readBytes.ts';
import type { DemoBorrower, DemoDelivery } from './demo/demoBorrower.ts';
import { demoWorkbook } from './demo/demoWorkbook.ts';
import { MEMORANDUM_PLACEMENTS } from './demo/workbookLayout.ts';

export const WORKBOOK_TYPE = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';

/** A delivery whose workbook is kept already, with what it reads as. */
export interface PreparedDelivery {
  readonly delivery: DemoDelivery;
  readonly sha256: string;
  readonly sizeBytes: number;
  readonly reading: Reading;
}

/**
 * Makes, keeps and reads the workbooks before the transaction that names them. The reader is the product's own, in
 * this process: these files are ours, so that the gate and the workers in front of it have nothing to keep out.
 */
export async function prepareDeliveries(borrower: DemoBorrower): Promise<PreparedDelivery[]> {
  const prepared: PreparedDelivery[] = [];
  for (const delivery of borrower.deliveries) {
    const bytes = await demoWorkbook({
      borrowerName: borrower.name,
      unit: `${borrower.currency} thousands`,
      quarters: delivery.quarters,
      madeOn: delivery.receivedOn,
    });
    const sha256 = await keepFile(bytes, WORKBOOK_TYPE);
    prepared.push({ delivery, sha256, sizeBytes: bytes.length, reading: await read(borrower, bytes) });
  }
  return prepared;
}

async function read(borrower: DemoBorrower, bytes: Uint8Array): Promise<Reading> {
  const reading = await readBytes({
    kind: 'xlsx',
    bytes,
    notes: [],
    context: {
      fiscalYearEndMonth: borrower.fiscalYearEndMonth,
      reportingCurrency: borrower.currency,
      answers: MEMORANDUM_PLACEMENTS,
      lastQuarterRevenue: null,
      borrowerName: borrower.name,
    },
  });
  const open = reading.questions.filter(({ answer }) => answer === null).map(({ text }) => text);
  if (reading.outcome !== 'ready')
    throw new Error(
      `the workbook of ${borrower.name} reads as ${reading.outcome}: ${reading.refusal?.message ?? open.join('; ')}`,
    );
  return reading;
}
