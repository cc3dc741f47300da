/** Looks through an inflated part for what makes a workbook library hang or run out of memory. */
import { refusal, Refused } from './refusals.ts';
import { columnNumber } from './cells.ts';

const MAX_ROWS = 50_000;
const MAX_MERGED_CELLS = 10_000;
const MAX_CELLS = 600_000;
const MAX_SHARED_STRINGS = 300_000;

export function checkXmlPart(name: string, content: Buffer): void {
  if (content.includes('<!DOCTYPE') || content.includes('<!ENTITY')) {
    throw new Refused(refusal('hostile', null, 'it declares entities, which a workbook never does'));
  }
  if (/^xl\/worksheets\/[^/]+\.xml$/i.test(name)) checkSheet(content);
  if (/^xl\/sharedStrings\.xml$/i.test(name)) {
    limit(count(content, '<si'), MAX_SHARED_STRINGS, 'different texts');
  }
}

function checkSheet(content: Buffer): void {
  limit(count(content, '<row'), MAX_ROWS, 'rows on one sheet');
  limit(count(content, '<c '), MAX_CELLS, 'cells on one sheet');
  for (const range of mergedRanges(content)) {
    if (cellsOf(range) > MAX_MERGED_CELLS) {
      throw new Refused(refusal('hostile', null, `it merges more than ${MAX_MERGED_CELLS} cells into one`));
    }
  }
}

function limit(found: number, most: number, what: string): void {
  if (found > most) {
    throw new Refused(refusal('too-large', null, `it has ${found} ${what}, and the limit is ${most}`));
  }
}

function count(content: Buffer, mark: string): number {
  let found = 0;
  for (let at = content.indexOf(mark); at >= 0; at = content.indexOf(mark, at + mark.length)) found += 1;
  return found;
}

function* mergedRanges(content: Buffer): Generator<string> {
  const mark = '<mergeCell ';
  for (let at = content.indexOf(mark); at >= 0; at = content.indexOf(mark, at + mark.length)) {
    const attributes = content.subarray(at, at + 200).toString('latin1');
    yield /ref\s*=\s*["']([^"']*)["']/.exec(attributes)?.[1] ?? '';
  }
}

/** Infinity where the range is not one, so that it is refused. */
function cellsOf(range: string): number {
  const match = /^\$?([A-Z]{1,3})\$?(\d+)(?::\$?([A-Z]{1,3})\$?(\d+))?$/i.exec(range);
  if (!match) return Infinity;
  const [, left, top, right = left, bottom = top] = match as unknown as [
    string,
    string,
    string,
    string?,
    string?,
  ];
  const columns = Math.abs(columnNumber(right) - columnNumber(left)) + 1;
  return columns * (Math.abs(Number(bottom) - Number(top)) + 1);
}
