/** Text files as one sheet called CSV: encoding and separator by content, quoting as in RFC 4180. */
import type { ReadNote } from '#core/statements/workbookReading.ts';
import { decimalMarkOf } from './amountText.ts';
import type { SheetCell, WorkbookGrid } from './cells.ts';
import { refusal, Refused } from './refusals.ts';
import { textCell } from './workbookGrid.ts';

const MAX_RECORDS = 50_000;
const MAX_FIELDS = 500;
const SEPARATORS = ['\t', ';', '|', ','];
const NO_STYLE = { numberFormat: 'General', bold: false, red: false, indent: 0 } as const;

export function textGrid(bytes: Buffer): {
  readonly grid: WorkbookGrid;
  readonly notes: readonly ReadNote[];
} {
  const { text, damaged } = decode(bytes);
  const stated = /^sep=(.)\r?\n/i.exec(text);
  const content = stated ? text.slice(stated[0].length) : text;
  const records = parseRecords(content, stated?.[1] ?? separatorOf(content));
  const mark = decimalMarkOf(records.flat());
  const rows = new Map<number, Map<number, SheetCell>>();
  records.forEach((fields, index) => {
    const cells = new Map<number, SheetCell>();
    fields.slice(0, MAX_FIELDS).forEach((field, at) => {
      if (field.trim() === '') return;
      const place = { sheet: 'CSV', row: index + 1, column: at + 1 };
      cells.set(at + 1, textCell(place, NO_STYLE, field, mark));
    });
    if (cells.size > 0) rows.set(index + 1, cells);
  });
  const sheet = {
    name: 'CSV',
    hidden: false,
    rows,
    hiddenRows: new Set<number>(),
    hiddenColumns: new Set<number>(),
    merges: [],
    pictures: [],
  };
  return { grid: { kind: 'csv', sheets: [sheet] }, notes: damaged ? [damagedText()] : [] };
}

const damagedText = (): ReadNote => ({
  code: 'damaged-text',
  text: 'Some letters look damaged: the file was saved in one encoding and labelled as another. Amounts are not touched by it.',
  where: null,
});

function decode(bytes: Buffer): { readonly text: string; readonly damaged: boolean } {
  const text = new TextDecoder(encodingOf(bytes)).decode(bytes);
  return { text, damaged: /Ã[¤¶¼Ÿ©¨]/.test(text) };
}

function encodingOf(bytes: Buffer): string {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return 'utf-16le';
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return 'utf-16be';
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(bytes);
    return 'utf-8';
  } catch (error) {
    if (error instanceof TypeError) return 'windows-1252';
    throw error;
  }
}

/** The separator that stands most evenly in the lines; a comma last, because amounts hold commas. */
function separatorOf(text: string): string {
  const lines = text
    .split(/\r?\n/)
    .filter((line) => line.trim() !== '')
    .slice(0, 50);
  const linesWith = (mark: string) => lines.filter((line) => line.includes(mark)).length;
  return SEPARATORS.find((mark) => linesWith(mark) * 2 >= lines.length) ?? ',';
}

/** A doubled quote inside quotes is a quote; a line break inside quotes belongs to the field. */
function parseRecords(text: string, separator: string): string[][] {
  const records: string[][] = [];
  let record: string[] = [];
  let field = '';
  let quoted = false;
  const endField = () => {
    record.push(field);
    field = '';
  };
  const endRecord = () => {
    endField();
    records.push(record);
    record = [];
    if (records.length > MAX_RECORDS) {
      throw new Refused(refusal('too-large', null, `it has more than ${MAX_RECORDS} lines`));
    }
  };
  for (let at = 0; at < text.length; at += 1) {
    const mark = text[at] ?? '';
    if (quoted) {
      if (mark === '"' && text[at + 1] === '"') {
        field += '"';
        at += 1;
      } else if (mark === '"') quoted = false;
      else field += mark;
    } else if (mark === '"' && field.trim() === '') {
      field = '';
      quoted = true;
    } else if (mark === separator) endField();
    else if (mark === '\n' || (mark === '\r' && text[at + 1] !== '\n')) endRecord();
    else if (mark !== '\r') field += mark;
  }
  if (field !== '' || record.length > 0) endRecord();
  return records;
}
