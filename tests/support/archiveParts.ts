/** Takes an archive apart into its parts, unpacked, so that they can be changed and put together again. */
import yauzl from 'yauzl';
import type { RawPart } from './rawArchive.ts';

export function partsOfArchive(bytes: Buffer): Promise<{ name: string; content: Buffer }[]> {
  return new Promise((resolve, reject) => {
    yauzl.fromBuffer(bytes, { lazyEntries: true }, (error, zip) => {
      if (!zip) return reject(error ?? new Error('the archive cannot be opened'));
      const parts: (RawPart & { content: Buffer })[] = [];
      zip.on('entry', (entry: yauzl.Entry) => {
        zip.openReadStream(entry, (fault, stream) => {
          if (!stream) return reject(fault ?? new Error(`${entry.fileName} cannot be unpacked`));
          const chunks: Buffer[] = [];
          stream.on('data', (chunk: Buffer) => chunks.push(chunk));
          stream.once('error', reject);
          stream.once('end', () => {
            parts.push({ name: entry.fileName, content: Buffer.concat(chunks) });
            zip.readEntry();
          });
        });
      });
      zip.once('end', () => resolve(parts));
      zip.once('error', reject);
      zip.readEntry();
    });
  });
}
