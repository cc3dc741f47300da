/**
 * Where originals are kept, by their content: the key of a file is the SHA-256 of its bytes, so the same file is
 * kept once and cannot be exchanged unseen. One interface; the local folder is the first driver.
 */
export interface FileStore {
  /** Keeps the bytes and answers their SHA-256 in lower-case hex. Safe to repeat. */
  readonly put: (bytes: Uint8Array, mediaType: string) => Promise<string>;
  /** The bytes, or null where nothing is kept under the key. Throws DamagedFileError where they have changed. */
  readonly get: (sha256: string) => Promise<Uint8Array | null>;
}

/** The bytes under a key no longer have the key's hash: the disk or somebody changed them. */
export class DamagedFileError extends Error {
  readonly sha256: string;
  constructor(sha256: string) {
    super(`the stored file ${sha256} does not match its hash`);
    this.name = 'DamagedFileError';
    this.sha256 = sha256;
  }
}
