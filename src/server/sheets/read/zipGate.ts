/**
 * Reads a workbook's archive before any workbook library does: the directory, then every XML part, counting what
 * really comes out, because declared sizes can lie. Nothing larger than the limits is ever inflated.
 */
import yauzl from 'yauzl';
import { err, ok, type Result } from '#core/result.ts';
import type { ReadNote, ReadRefusal } from '#core/statements/workbookReading.ts';
import { namesOfLinks, quoted, textBoxNote, textsOfDrawing } from './drawnText.ts';
import { refusal, Refused } from './refusals.ts';
import { checkXmlPart } from './xmlGate.ts';

const MAX_PARTS = 200;
const MAX_UNPACKED_BYTES = 64 * 1024 * 1024;
const MAX_RATIO = 200;
/** Small parts of blanks and repeats compress further than the ratio and harm nobody. */
const RATIO_APPLIES_FROM_BYTES = 1024 * 1024;

interface Part {
  readonly entry: yauzl.Entry;
  readonly name: string;
}

export async function checkArchive(bytes: Buffer): Promise<Result<readonly ReadNote[], ReadRefusal>> {
  let zip: yauzl.ZipFile;
  try {
    zip = await openZip(bytes);
  } catch (error) {
    return err(refusal('damaged', null, reason(error)));
  }
  try {
    if (zip.entryCount > MAX_PARTS) {
      return err(refusal('hostile', null, `it holds ${zip.entryCount} parts, and the limit is ${MAX_PARTS}`));
    }
    const parts = await listParts(zip);
    const fault = faultOfNames(parts);
    if (fault) return err(fault);
    const found = await checkContents(zip, parts);
    return ok([...notesOf(parts, found.links), ...textBoxNote(found.drawn)]);
  } catch (error) {
    if (error instanceof Refused) return err(error.refusal);
    if (isArchiveFault(error)) return err(refusal('damaged', null, reason(error)));
    throw error;
  } finally {
    zip.close();
  }
}

function faultOfNames(parts: readonly Part[]): ReadRefusal | null {
  const seen = new Set<string>();
  for (const { entry, name } of parts) {
    const key = name.toLowerCase();
    if (entry.isEncrypted()) return refusal('password');
    if (/(^|\/)\.\.(\/|$)|^\/|\\|\0|^[a-z]:/i.test(name)) {
      return refusal('hostile', null, 'a part is named so that it would be written outside the workbook');
    }
    if (seen.has(key)) return refusal('hostile', null, 'a part is there twice');
    seen.add(key);
  }
  if (seen.has('xl/workbook.bin')) {
    return refusal('not-a-workbook', null, 'it is a binary .xlsb workbook');
  }
  if (!seen.has('xl/workbook.xml') || !seen.has('[content_types].xml')) {
    return refusal('not-a-workbook', null, otherArchive(seen));
  }
  return null;
}

function otherArchive(names: ReadonlySet<string>): string {
  if (names.has('content.xml') && names.has('mimetype')) return 'it is an OpenDocument file (.ods)';
  return 'it is an archive or a document of another program';
}

interface Found {
  readonly drawn: readonly string[];
  /** Names of the files that it refers to. */
  readonly links: readonly string[];
}

async function checkContents(zip: yauzl.ZipFile, parts: readonly Part[]): Promise<Found> {
  let total = 0;
  const [drawn, links]: [string[], string[]] = [[], []];
  for (const { entry, name } of parts) {
    if (!/\.(xml|rels|vml)$/i.test(name)) continue;
    const content = await inflate(zip, entry, MAX_UNPACKED_BYTES - total);
    total += content.length;
    checkXmlPart(name, content);
    drawn.push(...textsOfDrawing(name, content));
    links.push(...namesOfLinks(name, content));
  }
  return { drawn, links };
}

/** Other parts (pictures, macros, embedded files) are never inflated here: the workbook library keeps them as they are. */
async function inflate(zip: yauzl.ZipFile, entry: yauzl.Entry, allowed: number): Promise<Buffer> {
  const stream = await new Promise<NodeJS.ReadableStream>((resolve, reject) => {
    zip.openReadStream(entry, (error, opened) => (opened ? resolve(opened) : reject(archiveFault(error))));
  });
  const chunks: Buffer[] = [];
  let size = 0;
  try {
    for await (const chunk of stream) {
      const piece = chunk as Buffer;
      size += piece.length;
      if (size > allowed) throw new Refused(tooMuch());
      if (size > RATIO_APPLIES_FROM_BYTES && size > entry.compressedSize * MAX_RATIO) {
        throw new Refused(
          refusal('hostile', null, `a part unpacks to more than ${MAX_RATIO} times its size`),
        );
      }
      chunks.push(piece);
    }
  } catch (error) {
    if (error instanceof Refused) throw error;
    throw archiveFault(error);
  }
  return Buffer.concat(chunks);
}

const tooMuch = (): ReadRefusal =>
  refusal('too-large', null, `unpacked it passes ${MAX_UNPACKED_BYTES / 1024 / 1024} MB`);

function notesOf(parts: readonly Part[], links: readonly string[]): ReadNote[] {
  const holds = (pattern: RegExp) => parts.some(({ name }) => pattern.test(name));
  const notes: ReadNote[] = [];
  const add = (code: string, text: string) => notes.push({ code, text, where: null });
  if (holds(/vbaProject|macrosheets|activeX|customUI/i)) {
    add('macros-ignored', 'The file has macros. They were not run; the stored values were read.');
  }
  if (holds(/^xl\/externalLinks\//i)) {
    add(
      'external-links',
      `The file refers to other files${links.length > 0 ? `: ${quoted([...new Set(links)])}` : ''}. They were not opened; the stored values were read.`,
    );
  }
  if (holds(/^xl\/(connections\.xml|queryTables\/)/i)) {
    add(
      'data-connections',
      'The file has data connections. They were not used; the stored values were read.',
    );
  }
  if (holds(/^xl\/embeddings\//i))
    add('embedded-files', 'The file holds embedded files. They were not read.');
  return notes;
}

function openZip(bytes: Buffer): Promise<yauzl.ZipFile> {
  return new Promise((resolve, reject) => {
    yauzl.fromBuffer(
      bytes,
      { lazyEntries: true, decodeStrings: false, validateEntrySizes: true },
      (error, zip) => (zip ? resolve(zip) : reject(archiveFault(error))),
    );
  });
}

/** Names are decoded here and not by yauzl, so that each fault gets its own refusal. */
function listParts(zip: yauzl.ZipFile): Promise<Part[]> {
  return new Promise((resolve, reject) => {
    const parts: Part[] = [];
    zip.on('entry', (entry: yauzl.Entry) => {
      const name = Buffer.from(entry.fileName as unknown as Uint8Array).toString('utf8');
      if (!name.endsWith('/')) parts.push({ entry, name });
      zip.readEntry();
    });
    zip.once('end', () => resolve(parts));
    zip.once('error', (error) => reject(archiveFault(error)));
    zip.readEntry();
  });
}

/** What yauzl and zlib report of an archive is the file's fault, not the program's. */
class ArchiveFault extends Error {}
const archiveFault = (error: unknown): ArchiveFault => new ArchiveFault(reason(error));
const isArchiveFault = (error: unknown): boolean => error instanceof ArchiveFault;
const reason = (error: unknown): string => {
  const text = error instanceof Error ? error.message : String(error);
  return /central directory|end of/i.test(text) ? 'its end is missing' : `its archive is faulty (${text})`;
};
