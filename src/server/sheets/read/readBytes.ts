/** The part of reading that runs in a worker: bytes that passed the gate → grids → reading. */
import type { Reading, ReadingContext, ReadNote } from '#core/statements/workbookReading.ts';
import { interpret } from './interpret.ts';
import { nothingRead } from './readings.ts';
import { Refused } from './refusals.ts';
import { textGrid } from './textGrid.ts';
import { workbookGrid } from './workbookGrid.ts';

export interface GatedFile {
  readonly kind: 'xlsx' | 'csv';
  readonly bytes: Uint8Array;
  readonly notes: readonly ReadNote[];
  readonly context: ReadingContext;
}

export async function readBytes({ kind, bytes, notes, context }: GatedFile): Promise<Reading> {
  try {
    const content = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength);
    if (kind === 'xlsx') return interpret(await workbookGrid(content), notes, context);
    const { grid, notes: own } = textGrid(content);
    return interpret(grid, [...notes, ...own], context);
  } catch (error) {
    if (error instanceof Refused) return nothingRead(error.refusal);
    throw error;
  }
}
