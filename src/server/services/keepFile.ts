import { storedFiles } from '../files/storedFiles.ts';

/** Keeps a file's bytes before the transaction that will name them; answers their SHA-256. Safe to repeat. */
export const keepFile = (bytes: Uint8Array, mediaType: string): Promise<string> =>
  storedFiles().put(bytes, mediaType);
