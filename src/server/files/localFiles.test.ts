import { mkdtemp, readdir, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { DamagedFileError } from './fileStore.ts';
import { localFiles } from './localFiles.ts';

/** SHA-256 of "abc": FIPS 180-4 example. */
const ABC = 'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad';
const bytes = new TextEncoder().encode('abc');

let folder: string;
beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'files-'));
});
afterEach(() => rm(folder, { recursive: true }));

test('a file is kept under the hash of its bytes and comes back as it was', async () => {
  const files = localFiles(folder);
  expect(await files.put(bytes, 'text/plain')).toBe(ABC);
  expect(new Uint8Array((await files.get(ABC)) ?? [])).toEqual(bytes);
});

test('the same file twice is kept once and leaves nothing unfinished', async () => {
  const files = localFiles(folder);
  await Promise.all([files.put(bytes, 'text/plain'), files.put(bytes, 'text/plain')]);
  await files.put(bytes, 'text/plain');
  expect(await readdir(join(folder, 'ba'))).toEqual([ABC]);
});

test('a key under which nothing is kept gives null', async () => {
  expect(await localFiles(folder).get(ABC)).toBeNull();
});

test('bytes that were changed on the disk are refused, not returned', async () => {
  const files = localFiles(folder);
  await files.put(bytes, 'text/plain');
  await writeFile(join(folder, 'ba', ABC), 'abd');
  await expect(files.get(ABC)).rejects.toThrow(DamagedFileError);
});

test('a key that is no hash cannot name a path', async () => {
  await expect(localFiles(folder).get('../../../etc/passwd')).rejects.toThrow(RangeError);
});
