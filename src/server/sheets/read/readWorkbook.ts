/** A borrower's file in, a reading out: the gate on this thread, everything after it in a worker. */
import type { Reading, ReadingContext } from '#core/statements/workbookReading.ts';
import { READING_LIMIT_MILLISECONDS, ReadingPool } from '../workers/pool.ts';
import { openContainer } from './container.ts';
import { nothingRead } from './readings.ts';
import { refusal } from './refusals.ts';

/** One pool for the program, also where a bundler has put this module into two chunks. */
const POOL = Symbol.for('underkeel.readingPool');
const shared = globalThis as typeof globalThis & { [POOL]?: ReadingPool };

export function readingPool(): ReadingPool {
  shared[POOL] ??= new ReadingPool();
  return shared[POOL];
}

/**
 * Reads a file as it was sent. Whatever is wrong with the file is a refusal in the reading; what throws is a fault of
 * the program. `fileName` says nothing of the content and is not trusted: the content decides.
 */
export async function readWorkbook(
  bytes: Buffer,
  fileName: string,
  context: ReadingContext,
): Promise<Reading> {
  const container = await openContainer(bytes);
  if (!container.ok) return nothingRead(container.error);
  const { kind, notes } = container.value;
  const named = kind === 'csv' && /\.xls[xm]?$/i.test(fileName) ? [...notes, plainTextNote] : notes;
  const result = await readingPool().read({ kind, bytes, notes: named, context });
  if (result === 'took-too-long') {
    return nothingRead(
      refusal('took-too-long', null, `more than ${READING_LIMIT_MILLISECONDS / 1000} seconds`),
    );
  }
  if (result === 'out-of-memory') {
    return nothingRead(refusal('too-large', null, 'it needs more memory than a reading may take'));
  }
  return result;
}

const plainTextNote = {
  code: 'plain-text',
  text: 'The file is named like a workbook but is plain text. It was read as text.',
  where: null,
};
