import { join } from 'node:path';
import { env } from '../config/env.ts';
import type { FileStore } from './fileStore.ts';
import { localFiles } from './localFiles.ts';

let store: FileStore | null = null;

/** The installation's store: a folder `files` under DATA_DIR. */
export function storedFiles(): FileStore {
  store ??= localFiles(join(env().DATA_DIR, 'files'));
  return store;
}
