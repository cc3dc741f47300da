/** Which rows become facts: none counted twice, totals by arithmetic, unknown labels by likeness or by question. */
import { decimal, type Decimal } from '#core/money/decimal.ts';
import { lineItem, LINE_ITEMS, type LineItemCode } from '#core/statements/lineItems.ts';
import type { Question } from '#core/statements/workbookReading.ts';
import type { Asking } from './asking.ts';
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

export function placeRows(table: StatementTable, run: Run, asking: Asking): PlacedRow[] {
  const dropped = droppedRows(run);
  const reference = referenceOf(run);
  return run.rows.map((read, index) => {
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

/** Rows that would count twice, with the reason. */
function droppedRows(run: Run): Map<number, string> {
  const dropped = new Map<number, string>();
  const { sums, contradicted } = run.signed.sums;
  run.rows.forEach((read, index) => {
    if (read.ofWhich) dropped.set(index, 'already in the row above');
    if (contradicted.has(index))
      dropped.set(index, 'does not agree with its parts, which the wider total proves');
  });
  for (const [index, parts] of [...sums, ...totalsAbove(run)]) dropForSum(run, index, parts, dropped);
  dropRepeatedTotals(run, dropped);
  return dropped;
}

function dropForSum(run: Run, index: number, parts: readonly number[], dropped: Map<number, string>): void {
  const line = isOverheads(run, index) ? 'sga' : (run.rows[index]?.line ?? null);
  if (!isStandardLine(line) || isSubtotal(line)) return;
  const others = parts.filter(
    (part) => isStandardLine(run.rows[part]?.line ?? null) && run.rows[part]?.line !== line,
  );
  if (others.length > 0) dropped.set(index, 'a total of the rows that are placed one by one');
  else for (const part of parts) dropped.set(part, `in the total '${run.rows[index]?.row.label ?? ''}'`);
}

/** A total that stands above its parts, which are set in below it. */
function totalsAbove(run: Run): Map<number, number[]> {
  const found = new Map<number, number[]>();
  run.rows.forEach((read, index) => {
    if (!read.hasAmounts || isSubtotal(read.line)) return;
    const parts: number[] = [];
    for (let at = index + 1; at < run.rows.length; at += 1) {
      const below = run.rows[at];
      if (!below?.hasAmounts || below.row.indent <= read.row.indent) break;
      parts.push(at);
    }
    if (parts.length >= 2 && addUp(run, index, parts)) found.set(index, parts);
  });
  return found;
}

function addUp(run: Run, index: number, parts: readonly number[]): boolean {
  const tolerance = run.step.times(parts.length + 1).div(2);
  const wanted = run.amounts[index] ?? [];
  if (wanted.every((amount) => amount === null || amount.isZero())) return false;
  return wanted.every((amount, column) => {
    if (amount === null) return true;
    const sum = parts.reduce((total, part) => total.plus(run.amounts[part]?.[column] ?? 0), decimal(0));
    return sum.minus(amount).abs().lte(tolerance);
  });
}

/** The same total twice: the first, or the wider one where the second holds the first. */
function dropRepeatedTotals(run: Run, dropped: Map<number, string>): void {
  const first = new Map<Line, number>();
  run.rows.forEach((read, index) => {
    if (!read.line || !isSubtotal(read.line) || !read.hasAmounts || dropped.has(index)) return;
    const before = first.get(read.line);
    if (before === undefined) {
      first.set(read.line, index);
      return;
    }
    const holdsFirst = run.signed.sums.sums.get(index)?.includes(before) === true;
    dropped.set(holdsFirst ? before : index, 'the same total stands twice');
    if (holdsFirst) first.set(read.line, index);
  });
}
