/** Text files as one sheet called CSV: encoding and separator by content, quoting as in RFC 4180. */
import type { ReadNote } from '#core/statements/workbookReading.ts';
import { decimalMarkOf } from './amountText.ts';
import type { SheetCell, WorkbookGrid } from './cells.ts';
import { raggedNotes, refuseSplitAmounts } from './raggedLines.ts';
import { refusal, Refused } from './refusals.ts';
import { decodeText, type DecodedText } from './textEncoding.ts';
import { textCell } from './workbookGrid.ts';

const MAX_RECORDS = 50_000;
const MAX_FIELDS = 500;
const SEPARATORS = ['\t', ';', '|', ','];
const NO_STYLE = { numberFormat: 'General', bold: false, red: false, indent: 0 } as const;

export function textGrid(bytes: Buffer): {
  readonly grid: WorkbookGrid;
  readonly notes: readonly ReadNote[];
} {
  const decoded = decodeText(bytes);
  const text = decoded.text.replace(/^\ufeff/, '');
  const stated = /^sep=(.)\r?\n/i.exec(text);
  const content = stated ? text.slice(stated[0].length) : text;
  const separator = stated?.[1] ?? separatorOf(content);
  const records = parseRecords(content, separator);
  refuseSplitAmounts(records, separator);
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
    comments: [],
  };
  return { grid: { kind: 'csv', sheets: [sheet] }, notes: [...notesOf(decoded), ...raggedNotes(records)] };
}

function notesOf({ repaired, damaged }: DecodedText): ReadNote[] {
  const note = (text: string): ReadNote => ({ code: 'damaged-text', text, where: null });
  if (repaired) {
    return [
      note(
        'The letters were damaged: the file was saved in one encoding and labelled as another. They were put right. Amounts are not touched by it.',
      ),
    ];
  }
  if (!damaged) return [];
  return [
    note(
      'Some letters are damaged and cannot be put right: labels with them may not be recognised. Amounts are not touched by it. Save the file as UTF-8 and send that for whole labels.',
    ),
  ];
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
