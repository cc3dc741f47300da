import { createHash, randomUUID } from 'node:crypto';
import { access, mkdir, open, readFile, rename, unlink } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { DamagedFileError, type FileStore } from './fileStore.ts';

const SHA256 = /^[0-9a-f]{64}$/;

const hashOf = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex');

/** Files under a folder as `ab/abcdef…`. A file is there whole or not at all, also after a power cut. */
export function localFiles(folder: string): FileStore {
  const pathOf = (sha256: string): string => {
    if (!SHA256.test(sha256)) throw new RangeError('a stored file is named by 64 lower-case hex digits');
    return join(folder, sha256.slice(0, 2), sha256);
  };
  return {
    put: async (bytes) => {
      const sha256 = hashOf(bytes);
      const path = pathOf(sha256);
      if (!(await isThere(path))) await writeWhole(path, bytes);
      return sha256;
    },
    get: async (sha256) => {
      const path = pathOf(sha256);
      const bytes = await readFile(path).catch(nullWhereAbsent);
      if (bytes !== null && hashOf(bytes) !== sha256) throw new DamagedFileError(sha256);
      return bytes;
    },
  };
}

/** Written beside its place, flushed, then renamed into it; the folder is flushed so that the name lasts too. */
async function writeWhole(path: string, bytes: Uint8Array): Promise<void> {
  const folder = dirname(path);
  await mkdir(folder, { recursive: true, mode: 0o700 });
  const unfinished = `${path}.${randomUUID()}`;
  try {
    const file = await open(unfinished, 'wx', 0o600);
    try {
      await file.writeFile(bytes);
      await file.sync();
    } finally {
      await file.close();
    }
    await rename(unfinished, path);
  } catch (error) {
    await unlink(unfinished).catch(nullWhereAbsent);
    throw error;
  }
  const directory = await open(folder, 'r');
  try {
    await directory.sync();
  } finally {
    await directory.close();
  }
}

const isThere = async (path: string): Promise<boolean> =>
  (await access(path).then(() => true, nullWhereAbsent)) === true;

function nullWhereAbsent(error: unknown): null {
  if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return null;
  throw error;
}
