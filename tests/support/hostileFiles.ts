/** Files that must not be read, with what the person who sends them is told. */
import { incomeRows, rawArchive, text, workbookParts } from './rawArchive.ts';

export interface HostileFile {
  readonly name: string;
  readonly bytes: Buffer;
  readonly reason: string;
}

const compound = (stream: string): Buffer =>
  Buffer.concat([Buffer.from('d0cf11e0a1b11ae1', 'hex'), Buffer.alloc(504), Buffer.from(stream, 'utf16le')]);

export const hostileFiles = (): readonly HostileFile[] => [
  {
    name: 'Web page.xlsx',
    bytes: Buffer.from('<html><body><table><tr><td>Revenue</td><td>1</td></tr></table></body></html>'),
    reason: 'The file is not a workbook: it is a web page.',
  },
  { name: 'Old.xls', bytes: compound('Workbook'), reason: 'The file is an old .xls workbook' },
  {
    name: 'Locked.xlsx',
    bytes: compound('EncryptedPackage'),
    reason: 'The file is protected by a password',
  },
  { name: 'Empty.xlsx', bytes: Buffer.alloc(0), reason: 'it is empty, 0 bytes long' },
  {
    name: 'Cut.xlsx',
    bytes: rawArchive(workbookParts({ rows: incomeRows() })).subarray(0, 900),
    reason: 'The file cannot be read completely',
  },
  {
    name: 'Bomb.xlsx',
    bytes: rawArchive(workbookParts({ rows: `<row r="1">${text('A1', ' '.repeat(80_000_000))}</row>` })),
    reason: 'The file was not opened',
  },
];
