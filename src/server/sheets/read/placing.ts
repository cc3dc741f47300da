/** Which rows become facts: none counted twice, totals by arithmetic, unknown labels by likeness or by question. */
import { decimal, type Decimal } from '#core/money/decimal.ts';
import { lineItem, LINE_ITEMS, type LineItemCode } from '#core/statements/lineItems.ts';
import type { Question } from '#core/statements/workbookReading.ts';
import type { Asking } from './asking.ts';
import { droppedRows } from './droppedRows.ts';
import { nearLines, type Part } from './labels.ts';
import { isOverheads, provenLine } from './provenTotals.ts';
import type { ReadRow } from './rows.ts';
import { COST_LINES, isStandardLine, isSubtotal } from './lineNature.ts';
import { LEAVE_OUT, placementKey, rowPlace, type Run, type StatementTable } from './statements.ts';
import type { Line } from './wordings/lines.ts';

export interface PlacedRow {
  readonly read: ReadRow;
  /** Its place in the run. */
  readonly index: number;
  readonly code: LineItemCode | null;
  readonly reason: string;
  /** Open questions about the row itself. */
  readonly waitsFor: readonly string[];
}

/** Rows below this share of revenue or total assets are left out without a question. */
const MATERIAL_SHARE = decimal('0.01');
/** The same for a cash flow, of its largest total. */
const MATERIAL_SHARE_OF_CASH = decimal('0.1');
/** Likeness from which a wording is taken for a misspelt or longer known one, if sums bear it out. */
const LIKE_ENOUGH = 0.85;
/** Likeness from which an open label may belong to a line that has rows already. */
const NEAR = 0.6;

export function placeRows(table: StatementTable, run: Run, asking: Asking): PlacedRow[] {
  const dropped = droppedRows(run);
  const reference = referenceOf(run);
  const placed = run.rows.map((read, index) => {
    const done = (
      code: LineItemCode | null,
      reason: string,
      waitsFor: readonly string[] = [],
    ): PlacedRow => ({
      read,
      index,
      code,
      reason,
      waitsFor,
    });
    if (!read.hasAmounts) return done(null, 'a heading');
    if (answered(table, read, asking)) askPlacement(table, run, read, index, reference, asking);
    const why = dropped.get(index);
    if (why) return done(null, why);
    if (isStandardLine(read.line)) return done(read.line, reasonOf(table, run, read, index, asking));
    if (read.line === 'memo')
      return done(null, answered(table, read, asking) ? 'left out by answer' : 'no amount of the statements');
    if (isOverheads(run, index)) return done('sga', 'overheads, in one total of the rows above');
    if (read.line !== null) return done(null, 'goes into totals, no standard line of its own');
    return placeUnknown(table, run, read, index, reference, asking, done);
  });
  return withOpenNeighbours(placed);
}

/** 'Revenue from South' may be more of 'Revenue': until it is placed, that line is not known whole. */
function withOpenNeighbours(placed: readonly PlacedRow[]): PlacedRow[] {
  const open = placed.flatMap(({ read, code, waitsFor }) => {
    const [key] = waitsFor;
    if (code !== null || key === undefined || read.part === null) return [];
    const near = nearLines(read.row.label, read.part, read.section).filter(
      ({ likeness }) => likeness >= NEAR,
    );
    return near.map(({ line }) => ({ key, line }));
  });
  return placed.map((row) => {
    const keys = open.filter(({ line }) => line === row.code).map(({ key }) => key);
    return keys.length > 0 ? { ...row, waitsFor: [...row.waitsFor, ...keys] } : row;
  });
}

type Done = (code: LineItemCode | null, reason: string, waitsFor?: readonly string[]) => PlacedRow;

const answered = (table: StatementTable, read: ReadRow, asking: Asking): boolean =>
  asking.answerTo(placementKey(table.table.sheet.name, read.row.label)) !== null;

function reasonOf(table: StatementTable, run: Run, read: ReadRow, index: number, asking: Asking): string {
  if (answered(table, read, asking)) return 'as answered';
  const parts = run.signed.sums.sums.get(index);
  if (parts && parts.length > 1) return `known wording; adds up from ${parts.length} rows`;
  if (run.signed.sums.signs.has(index)) return 'known wording; goes into a total that adds up';
  return 'known wording';
}

function placeUnknown(
  table: StatementTable,
  run: Run,
  read: ReadRow,
  index: number,
  reference: Decimal | null,
  asking: Asking,
  done: Done,
): PlacedRow {
  const { sums, signs } = run.signed.sums;
  if (sums.has(index)) {
    const proven = provenLine(run, index);
    return done(proven, proven ? 'adds up as that total does' : 'a total of the rows above');
  }
  if (read.row.label === '') return done(null, 'no label');
  if (read.part === null) return done(null, 'part of no statement');
  const near = nearLines(read.row.label, read.part, read.section).filter(({ line }) => !isSubtotal(line));
  const [best, second] = near;
  const clear =
    best !== undefined &&
    best.likeness >= LIKE_ENOUGH &&
    (second === undefined || best.likeness - second.likeness > 0.05);
  if (clear && signs.has(index) && bearsOut(run, index, best.line)) {
    return done(
      isStandardLine(best.line) ? best.line : null,
      'like a known wording, and the total adds up with it',
    );
  }
  if (!matters(run, read, index, reference)) return done(null, 'unknown wording, too small to matter');
  const key = askPlacement(table, run, read, index, reference, asking);
  return done(null, 'unknown wording', asking.isOpen(key) ? [key] : []);
}

/** An answered question is asked as well, with its answer, so that the answer can be taken back. */
function askPlacement(
  table: StatementTable,
  run: Run,
  read: ReadRow,
  index: number,
  reference: Decimal | null,
  asking: Asking,
): string {
  const key = placementKey(table.table.sheet.name, read.row.label);
  const part = read.part ?? 'income';
  const near = nearLines(read.row.label, part, read.section).filter(({ line }) => !isSubtotal(line));
  asking.ask({
    key,
    kind: 'placement',
    holdsFor: 'layout',
    text: `'${read.row.label}' on '${table.table.sheet.name}' is no wording known here${shareText(run, index, reference)}. Which line does it belong to?`,
    where: [rowPlace(table.table, read.row)],
    options: optionsFor(
      part,
      near.map(({ line }) => line),
    ),
    accepts: (given) => given === LEAVE_OUT || LINE_ITEMS.some(({ code }) => code === given),
  });
  return key;
}

/** A cost goes into its total the way costs do. */
function bearsOut(run: Run, index: number, line: Line): boolean {
  if (run.part !== 'income') return true;
  const contribution = run.signed.sums.signs.get(index) ?? 1;
  const lowers = (run.amounts[index] ?? []).some(
    (amount) => amount !== null && amount.times(contribution).isNegative(),
  );
  return COST_LINES.has(line) === lowers;
}

const REFERENCES: Readonly<Record<Part, readonly Line[]>> = {
  income: ['revenue'],
  balance: ['total_assets', 'total_equity_and_liabilities'],
  'cash-flow': ['cfo', 'cfi', 'cff'],
};

/** The largest revenue, total of assets or cash flow of an activity in the run. */
function referenceOf(run: Run): Decimal | null {
  const lines = REFERENCES[run.part ?? 'balance'];
  const amounts = run.rows.flatMap((read, at) =>
    read.line && lines.includes(read.line) ? (run.amounts[at] ?? []) : [],
  );
  return amounts.reduce<Decimal | null>(
    (most, amount) => (amount && (!most || amount.abs().gt(most)) ? amount.abs() : most),
    null,
  );
}

/** Entries of the operating cash flow are many, and no line of their own needs them. */
function matters(run: Run, read: ReadRow, index: number, reference: Decimal | null): boolean {
  const isCashFlow = read.part === 'cash-flow';
  if (isCashFlow && read.section !== 'investing' && read.section !== 'financing') return false;
  const amounts = (run.amounts[index] ?? []).flatMap((amount) => amount ?? []);
  if (amounts.every((amount) => amount.isZero())) return false;
  return (
    reference === null ||
    amounts.some((amount) =>
      amount.abs().gte(reference.times(isCashFlow ? MATERIAL_SHARE_OF_CASH : MATERIAL_SHARE)),
    )
  );
}

function shareText(run: Run, index: number, reference: Decimal | null): string {
  const [amount] = (run.amounts[index] ?? []).flatMap((found) => found ?? []);
  if (!amount || !reference || reference.isZero()) return '';
  const share = amount.abs().div(reference).times(100).toFixed(1);
  return ` (${share} % of ${run.part === 'income' ? 'revenue' : run.part === 'cash-flow' ? 'the largest cash flow' : 'total assets'})`;
}

/** The likeliest lines first, then every line of the part that is no total. */
function optionsFor(part: Part, near: readonly Line[]): Question['options'] {
  const all = LINE_ITEMS.filter((item) => item.part === part && !('subtotal' in item)).map(
    ({ code }) => code,
  );
  const likely = near.filter(isStandardLine).slice(0, 5);
  const codes = [...new Set<LineItemCode>([...likely, ...all])];
  return [
    ...codes.map((code) => ({ value: code, label: lineItem(code).label })),
    { value: LEAVE_OUT, label: 'No line: leave it out' },
  ];
}
