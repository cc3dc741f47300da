/** The example files, taken apart once. */
import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { partsOfArchive } from '../../tests/support/archiveParts.ts';
import type { Example } from './mutations.ts';

const ARCHIVE = Buffer.from('504b0304', 'hex');

export async function examplesIn(folder: string): Promise<Example[]> {
  const names = readdirSync(folder).filter((name) => /\.(xlsx|xlsm|csv)$/.test(name));
  return Promise.all(
    names.sort().map(async (name) => {
      const bytes = readFileSync(join(folder, name));
      const isArchive = bytes.subarray(0, 4).equals(ARCHIVE);
      return { name, bytes, parts: isArchive ? await partsOfArchive(bytes) : [] };
    }),
  );
}
