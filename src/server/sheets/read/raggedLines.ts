/** Lines of a text file that hold another number of fields than its other lines. */
import type { ReadNote } from '#core/statements/workbookReading.ts';
import { refusal, Refused } from './refusals.ts';

type Records = readonly (readonly string[])[];

const MOST_LISTED = 10;
const GROUP = /^\s*\d{3}\)?\s*$/;
const HEAD_OF_AMOUNT = /^\s*[-(]?\d{1,3}\s*$/;

/** Fields up to the last that is filled. */
const widthOf = (record: readonly string[]): number =>
  record.findLastIndex((field) => field.trim() !== '') + 1;

/** The widest of the lines that hold headings: before the first line of a label and whole numbers. */
function headingWidth(records: Records): { width: number; from: number } {
  const from = records.findIndex((record) => {
    const filled = record.slice(1).filter((field) => field.trim() !== '');
    const numbers = filled.filter(
      (field) => /^\s*[-(]?\d+([.,]\d+)?\)?\s*$/.test(field) && !/^\s*(19|20)\d{2}\s*$/.test(field),
    );
    return (record[0] ?? '').trim() !== '' && numbers.length > 0 && numbers.length * 2 > filled.length;
  });
  const before = from < 0 ? [] : records.slice(0, from);
  return { width: Math.max(0, ...before.map(widthOf)), from };
}

/**
 * 'Revenue,1,200,1,100': thousands marks that part fields as well, without quotes, put every figure into a wrong
 * column. Such a file is refused as a whole: the lines that happen to have the right width are no more certain.
 */
export function refuseSplitAmounts(records: Records, separator: string): void {
  if (separator !== ',') return;
  const { width, from } = headingWidth(records);
  if (from < 0 || width < 2) return;
  const body = records.slice(from);
  const split = body.findIndex((record) => widthOf(record) > width && isSplit(record));
  if (split < 0) return;
  throw new Refused(
    refusal(
      'damaged',
      { sheet: 'CSV', cell: `A${from + split + 1}` },
      'lines have more fields than the line of headings, because the thousands marks inside amounts part fields as well. Amounts need quotes, or another separator',
    ),
  );
}

/** Groups of exactly three digits, each behind the beginning of an amount. */
function isSplit(record: readonly string[]): boolean {
  const fields = record.slice(1).filter((field) => field.trim() !== '');
  const groups = fields.filter((field, at) => GROUP.test(field) && HEAD_OF_AMOUNT.test(fields[at - 1] ?? ''));
  return groups.length > 0 && fields.every((field) => GROUP.test(field) || HEAD_OF_AMOUNT.test(field));
}

/** Only lines that are wider than the most common width say something: titles and blank ends are narrower. */
export function raggedNotes(records: Records): ReadNote[] {
  const counts = new Map<number, number>();
  const widths = records.map(widthOf);
  for (const width of widths) if (width > 1) counts.set(width, (counts.get(width) ?? 0) + 1);
  const [usual] = [...counts].sort((one, other) => other[1] - one[1])[0] ?? [];
  if (usual === undefined) return [];
  const wider = widths.flatMap((width, at) => (width > usual ? [at + 1] : []));
  if (wider.length === 0 || wider.length * 3 > records.length) return [];
  const listed = wider.slice(0, MOST_LISTED).join(', ');
  const more = wider.length > MOST_LISTED ? ` and ${wider.length - MOST_LISTED} more` : '';
  return [
    {
      code: 'ragged-rows',
      text: `${wider.length === 1 ? 'Line' : 'Lines'} ${listed}${more} hold more fields than the other lines, which have ${usual}.`,
      where: { sheet: 'CSV', cell: `A${wider[0] ?? 1}` },
    },
  ];
}
