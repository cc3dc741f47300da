/** Workbooks with parts that no workbook library writes. */
import type ExcelJS from 'exceljs';
import { gridWorkbook, type TypedSheets } from '../../../../../tests/support/gridWorkbook.ts';
import { rawArchive, type RawPart } from '../../../../../tests/support/rawArchive.ts';
import { partsOfArchive } from '../../../../../tests/support/archiveParts.ts';

export const compound = (stream: string): Buffer =>
  Buffer.concat([Buffer.from('d0cf11e0a1b11ae1', 'hex'), Buffer.alloc(504), Buffer.from(stream, 'utf16le')]);

/** The workbook with further parts in its archive. */
export async function withParts(sheets: TypedSheets, more: readonly RawPart[]): Promise<Buffer> {
  const parts = await partsOfArchive(await gridWorkbook(sheets));
  return rawArchive([...parts, ...more]);
}

const PIXEL =
  'iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg==';

export const pictureOn = (sheets: TypedSheets, name: string, column: number, row: number): Promise<Buffer> =>
  gridWorkbook(sheets, (workbook: ExcelJS.Workbook) => {
    const image = workbook.addImage({ base64: PIXEL, extension: 'png' });
    workbook
      .getWorksheet(name)
      ?.addImage(image, { tl: { col: column, row }, ext: { width: 400, height: 300 } });
  });

const DOCUMENT = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const DRAWN = 'http://schemas.openxmlformats.org/drawingml/2006';

/** A shape with words over the first sheet, bound to it as a spreadsheet program does. */
export async function textBoxOn(sheets: TypedSheets, words: string): Promise<Buffer> {
  const parts = await partsOfArchive(await gridWorkbook(sheets));
  const bound = parts.map(({ name, content }) =>
    name === 'xl/worksheets/sheet1.xml'
      ? { name, content: content.toString().replace('</worksheet>', '<drawing r:id="rIdBox"/></worksheet>') }
      : { name, content },
  );
  return rawArchive([
    ...bound,
    {
      name: 'xl/worksheets/_rels/sheet1.xml.rels',
      content: `<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships"><Relationship Id="rIdBox" Type="${DOCUMENT}/drawing" Target="../drawings/drawing1.xml"/></Relationships>`,
    },
    {
      name: 'xl/drawings/drawing1.xml',
      content: `<xdr:wsDr xmlns:xdr="${DRAWN}/spreadsheetDrawing" xmlns:a="${DRAWN}/main"><xdr:twoCellAnchor><xdr:from><xdr:col>1</xdr:col><xdr:colOff>0</xdr:colOff><xdr:row>1</xdr:row><xdr:rowOff>0</xdr:rowOff></xdr:from><xdr:to><xdr:col>3</xdr:col><xdr:colOff>0</xdr:colOff><xdr:row>4</xdr:row><xdr:rowOff>0</xdr:rowOff></xdr:to><xdr:sp><xdr:nvSpPr><xdr:cNvPr id="2" name="Box 1"/></xdr:nvSpPr><xdr:txBody><a:p><a:r><a:t>${words}</a:t></a:r></a:p></xdr:txBody></xdr:sp><xdr:clientData/></xdr:twoCellAnchor></xdr:wsDr>`,
    },
  ]);
}
