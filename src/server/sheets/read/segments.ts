/** Which columns of a sheet hold labels and which hold amounts; tables side by side have a run of each. */
import type { SheetCell, SheetGrid } from './cells.ts';

export interface Segment {
  readonly labels: readonly number[];
  readonly values: readonly number[];
}

const YEAR_HEADING =
  /^\s*(?:fy|(?:financial |fiscal |business )?year|jahr|gesch[äa]ftsjahr|ann[ée]e|exercice|a[ñn]o|ejercicio|år|jaar|period|periode|périodo|período)\s*$/i;
const MIN_AMOUNTS_OF_COLUMN = 2;
/** A number that is probably a year or a day in a heading is no amount there. */
export function isAmount(cell: SheetCell): boolean {
  return cell.kind === 'amount' || cell.kind === 'error' || cell.kind === 'uncalculated';
}

export function couldBeYear(cell: SheetCell): boolean {
  const { amount } = cell;
  return amount !== null && amount.isInteger() && amount.gte(1990) && amount.lte(2100);
}

/** Runs of label columns, each followed by its run of value columns; a sheet of one record has one amount a column. */
export function segmentsOf(sheet: SheetGrid): Segment[] {
  const segments = segmentsWith(sheet, MIN_AMOUNTS_OF_COLUMN);
  return segments.length > 0 ? segments : segmentsWith(sheet, 1);
}

function segmentsWith(sheet: SheetGrid, least: number): Segment[] {
  const holdsValues = (tally: ColumnTally | undefined): boolean =>
    tally !== undefined && tally.values >= least && (tally.values * 2 >= tally.texts || tally.values >= 5);
  const kinds = new Map<number, ColumnTally>();
  for (const row of sheet.rows.values()) {
    const inBody = [...row.values()].some((cell) => isAmount(cell) && !couldBeYear(cell));
    for (const cell of row.values()) tallyCell(kinds, cell, inBody);
  }
  const columns = [...kinds.keys()].sort((one, other) => one - other);
  const firstWords = columns.find((column) => holdsWords(kinds.get(column)));
  const segments: { labels: number[]; values: number[] }[] = [];
  for (const column of columns) {
    const tally = kinds.get(column);
    const current = segments.at(-1);
    if (tally) tally.values += tally.saysYear ? 0 : tally.yearsInBody;
    const isLabel =
      (firstWords !== undefined && column <= firstWords) || (!holdsValues(tally) && holdsWords(tally));
    if (!current)
      segments.push(
        isLabel || !holdsValues(tally) ? { labels: [column], values: [] } : { labels: [], values: [column] },
      );
    else if (isLabel && current.values.length > 0) segments.push({ labels: [column], values: [] });
    else if (isLabel || (current.values.length === 0 && !holdsValues(tally))) current.labels.push(column);
    else current.values.push(column);
  }
  return withoutComments(segments, sheet);
}

interface ColumnTally {
  values: number;
  texts: number;
  /** 1990 to 2100 in rows of amounts: amounts of that size, unless the column is one of years. */
  yearsInBody: number;
  saysYear: boolean;
  readonly words: Set<string>;
}

/** Account numbers, dates and repeated codes such as EUR are texts, but no words. */
function tallyCell(kinds: Map<number, ColumnTally>, cell: SheetCell, inBody: boolean): void {
  const tally = kinds.get(cell.column) ?? {
    values: 0,
    texts: 0,
    yearsInBody: 0,
    saysYear: false,
    words: new Set<string>(),
  };
  kinds.set(cell.column, tally);
  if (cell.kind === 'text' && YEAR_HEADING.test(cell.text)) tally.saysYear = true;
  if (cell.kind === 'percent' || (isAmount(cell) && !couldBeYear(cell))) tally.values += 1;
  else if (inBody && isAmount(cell)) tally.yearsInBody += 1;
  else tally.texts += 1;
  if (cell.kind === 'text' && /\p{L}{3}/u.test(cell.text)) tally.words.add(cell.text);
}

const holdsWords = (tally: ColumnTally | undefined): boolean =>
  tally !== undefined && tally.words.size >= 3 && tally.words.size > tally.values;

/** A last run of texts without amounts beside it is a column of comments, not of labels. */
function withoutComments(segments: Segment[], sheet: SheetGrid): Segment[] {
  const [first, ...others] = segments;
  if (!first) return [];
  const own = others.filter(({ labels, values }) => {
    const rows = [...sheet.rows.values()];
    const together = rows.filter(
      (row) => labels.some((at) => row.has(at)) && values.some((at) => row.has(at)),
    );
    return together.length >= 3;
  });
  return [first, ...own].filter(({ values }) => values.length > 0);
}
