/** What the bytes are, whatever the file is called, and whether they may be opened. Runs on the main thread. */
import { err, ok, type Result } from '#core/result.ts';
import type { ReadNote, ReadRefusal } from '#core/statements/workbookReading.ts';
import { refusal } from './refusals.ts';
import { blindUtf16 } from './textEncoding.ts';
import { checkArchive } from './zipGate.ts';

const MAX_FILE_BYTES = 10 * 1024 * 1024;

export interface Container {
  readonly kind: 'xlsx' | 'csv';
  readonly notes: readonly ReadNote[];
}

const COMPOUND_FILE = Buffer.from('d0cf11e0a1b11ae1', 'hex');
const ZIP_ENTRY = Buffer.from('504b0304', 'hex');
export async function openContainer(bytes: Buffer): Promise<Result<Container, ReadRefusal>> {
  if (bytes.length === 0) return err(refusal('damaged', null, 'it is empty, 0 bytes long'));
  if (bytes.length > MAX_FILE_BYTES) {
    return err(
      refusal('too-large', null, `${megabytes(bytes.length)}, and the limit is ${megabytes(MAX_FILE_BYTES)}`),
    );
  }
  if (bytes.subarray(0, 8).equals(COMPOUND_FILE)) return err(compoundFile(bytes));
  if (isOldestFormat(bytes)) return err(refusal('legacy-xls'));
  if (bytes.subarray(0, 4).equals(ZIP_ENTRY)) {
    const archive = await checkArchive(bytes);
    return archive.ok ? ok({ kind: 'xlsx', notes: archive.value }) : archive;
  }
  return plainContent(bytes);
}

/** Before 1997 a workbook had no outer container: it begins with a record of kind 9, of at most 16 bytes. */
const isOldestFormat = (bytes: Buffer): boolean =>
  bytes[0] === 9 && [0, 2, 4, 8].includes(bytes[1] ?? -1) && (bytes[2] ?? 99) <= 16 && bytes[3] === 0;

/** The container of encrypted workbooks and of .xls; its directory names the streams in UTF-16. */
function compoundFile(bytes: Buffer): ReadRefusal {
  const names = (name: string) => bytes.includes(Buffer.from(name, 'utf16le'));
  if (names('EncryptedPackage') || names('EncryptionInfo')) return refusal('password');
  if (names('Workbook') || names('Book')) return refusal('legacy-xls');
  return refusal('not-a-workbook', null, 'it is a document of another program');
}

function plainContent(bytes: Buffer): Result<Container, ReadRefusal> {
  const other = otherContent(bytes);
  if (other) return err(refusal('not-a-workbook', null, other));
  return ok({ kind: 'csv', notes: [] });
}

function otherContent(bytes: Buffer): string | null {
  const start = bytes
    .subarray(0, 4096)
    .toString('latin1')
    .replace(/^[\s\u00ef\u00bb\u00bf]+/, '')
    .toLowerCase();
  if (start.startsWith('%pdf')) return 'it is a PDF document';
  if (/^<!doctype html|^<html|<table|<body/.test(start)) return 'it is a web page';
  if (start.startsWith('<')) return 'it is an XML document';
  if (start.startsWith('{\\rtf')) return 'it is a text document';
  if (/^(\x89png|gif8|\xff\xd8\xff|bm|ii\*)/.test(start)) return 'it is a picture';
  if (bytes.includes(ZIP_ENTRY) && holdsControlBytes(bytes))
    return 'a workbook is hidden behind other content';
  if (!looksLikeText(bytes)) return 'its content is of no kind that is known here';
  return null;
}

/** UTF-16 text has zero bytes in every other place; other text has none. */
function looksLikeText(bytes: Buffer): boolean {
  const sample = bytes.subarray(0, 65_536);
  if ((sample[0] === 0xff && sample[1] === 0xfe) || (sample[0] === 0xfe && sample[1] === 0xff)) return true;
  return blindUtf16(sample) !== null || !holdsControlBytes(sample);
}

function holdsControlBytes(bytes: Buffer): boolean {
  return bytes.some((byte) => byte < 9 || (byte > 13 && byte < 32 && byte !== 27));
}

const megabytes = (count: number): string => `${(count / 1024 / 1024).toFixed(1)} MB`;
