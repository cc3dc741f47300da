/** Archives written byte by byte, so that they can be as wrong as hostile files are. */
import { crc32, deflateRawSync } from 'node:zlib';

export interface RawPart {
  readonly name: string;
  readonly content: string | Buffer;
  /** What the archive says the part unpacks to, where that is a lie. */
  readonly declaredBytes?: number;
  readonly encrypted?: boolean;
}

const LOCAL = 0x04034b50;
const CENTRAL = 0x02014b50;
const END = 0x06054b50;

export function rawArchive(parts: readonly RawPart[]): Buffer {
  const bodies: Buffer[] = [];
  const directory: Buffer[] = [];
  let offset = 0;
  for (const part of parts) {
    const content = Buffer.isBuffer(part.content) ? part.content : Buffer.from(part.content);
    const packed = deflateRawSync(content, { level: 9 });
    const name = Buffer.from(part.name);
    const fields = Buffer.alloc(26);
    fields.writeUInt16LE(20, 0);
    fields.writeUInt16LE(part.encrypted ? 1 : 0, 2);
    fields.writeUInt16LE(8, 4);
    fields.writeUInt32LE(crc32(content) >>> 0, 10);
    fields.writeUInt32LE(packed.length, 14);
    fields.writeUInt32LE(part.declaredBytes ?? content.length, 18);
    fields.writeUInt16LE(name.length, 22);
    const body = Buffer.concat([word(LOCAL), fields, name, packed]);
    const places = Buffer.alloc(14);
    places.writeUInt32LE(offset, 10);
    directory.push(Buffer.concat([word(CENTRAL), Buffer.from([20, 0]), fields, places, name]));
    bodies.push(body);
    offset += body.length;
  }
  const central = Buffer.concat(directory);
  const end = Buffer.alloc(18);
  end.writeUInt16LE(parts.length, 4);
  end.writeUInt16LE(parts.length, 6);
  end.writeUInt32LE(central.length, 8);
  end.writeUInt32LE(offset, 12);
  return Buffer.concat([...bodies, central, word(END), end]);
}

function word(value: number): Buffer {
  const bytes = Buffer.alloc(4);
  bytes.writeUInt32LE(value);
  return bytes;
}

const HEAD = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>';
const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const DOCUMENT = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const PACKAGE = 'http://schemas.openxmlformats.org/package/2006/relationships';

/** The parts of a workbook of one sheet, to be changed, doubled and added to. */
export function workbookParts(sheet: {
  readonly rows?: string;
  readonly before?: string;
  readonly after?: string;
  readonly name?: string;
  readonly doctype?: string;
  readonly sharedStrings?: string;
}): RawPart[] {
  const types = `${HEAD}<Types xmlns="http://schemas.openxmlformats.org/package/2006/content-types"><Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/><Default Extension="xml" ContentType="application/xml"/><Override PartName="/xl/workbook.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.sheet.main+xml"/><Override PartName="/xl/worksheets/sheet1.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.worksheet+xml"/></Types>`;
  const strings = sheet.sharedStrings;
  const stringsLink =
    strings === undefined
      ? ''
      : `<Relationship Id="rId2" Type="${DOCUMENT}/sharedStrings" Target="sharedStrings.xml"/>`;
  return [
    { name: '[Content_Types].xml', content: types },
    {
      name: '_rels/.rels',
      content: `${HEAD}<Relationships xmlns="${PACKAGE}"><Relationship Id="rId1" Type="${DOCUMENT}/officeDocument" Target="xl/workbook.xml"/></Relationships>`,
    },
    {
      name: 'xl/workbook.xml',
      content: `${HEAD}<workbook xmlns="${MAIN}" xmlns:r="${DOCUMENT}"><sheets><sheet name="${sheet.name ?? 'P&amp;L'}" sheetId="1" r:id="rId1"/></sheets></workbook>`,
    },
    {
      name: 'xl/_rels/workbook.xml.rels',
      content: `${HEAD}<Relationships xmlns="${PACKAGE}"><Relationship Id="rId1" Type="${DOCUMENT}/worksheet" Target="worksheets/sheet1.xml"/>${stringsLink}</Relationships>`,
    },
    {
      name: 'xl/worksheets/sheet1.xml',
      content: `${HEAD}${sheet.doctype ?? ''}<worksheet xmlns="${MAIN}">${sheet.before ?? ''}<sheetData>${sheet.rows ?? ''}</sheetData>${sheet.after ?? ''}</worksheet>`,
    },
    ...(strings === undefined
      ? []
      : [{ name: 'xl/sharedStrings.xml', content: `${HEAD}<sst xmlns="${MAIN}">${strings}</sst>` }]),
  ];
}

/** Rows of an income statement that reads without a question: one column of one quarter. */
export function incomeRows(extra = ''): string {
  const lines: readonly (readonly [string, string])[] = [
    ['EUR thousand', 'Q3 2026'],
    ['Revenue', '12400'],
    ['Cost of sales', '8100'],
    ['Gross profit', '4300'],
    ['Administrative expenses', '2600'],
    ['Operating profit', '1700'],
    ['Interest expense', '150'],
    ['Profit before tax', '1550'],
    ['Income tax', '390'],
    ['Profit for the period', '1160'],
  ];
  return (
    lines
      .map(
        ([label, value], at) =>
          `<row r="${at + 1}">${text(`A${at + 1}`, label)}${at === 0 ? text('B1', value) : `<c r="B${at + 1}"><v>${value}</v></c>`}</row>`,
      )
      .join('') + extra
  );
}

export const text = (cell: string, words: string): string =>
  `<c r="${cell}" t="inlineStr"><is><t>${words}</t></is></c>`;
