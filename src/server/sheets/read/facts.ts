/** One fact for each placed cell of each actual period, in whole currency units where the unit is known. */
import type { CellRef, ReadFact } from '#core/statements/workbookReading.ts';
import type { Asking } from './asking.ts';
import { cellName, type SheetCell } from './cells.ts';
import type { EntityColumns } from './entities.ts';
import { periodStart } from './periods.ts';
import type { PlacedRow } from './placing.ts';
import { rowPlace, type Run, type SettledColumn, type StatementTable } from './statements.ts';
import type { SettledScale } from './units.ts';

/** A fact with what later stages need to know of its origin. */
export interface TableFact extends ReadFact {
  readonly table: StatementTable;
  readonly column: SettledColumn;
  readonly run: Run;
  readonly rowIndex: number;
}

export function factsOfRun(
  table: StatementTable,
  run: Run,
  placed: readonly PlacedRow[],
  scale: SettledScale,
  entities: EntityColumns,
  asking: Asking,
): TableFact[] {
  const columns = (entities.columns.get(table) ?? []).filter(
    ({ scenario, months, currency }) =>
      scenario === 'actual' &&
      (run.part === 'balance' || months !== null) &&
      (currency === null || scale.currency === null || currency === scale.currency),
  );
  if (scale.leftOut) return [];
  return placed.flatMap((row) => {
    if (row.code === null) return [];
    const rowWaits = [
      ...row.waitsFor,
      ...signQuestions(table, run, row, asking),
      ...hiddenQuestions(table, run, row, asking),
    ];
    if (isLeftOut(row, asking)) return [];
    return columns.flatMap((column) => {
      const cell = row.read.row.cells[column.index];
      const fact = cell && factOf(cell, row, column, table, run, scale, rowWaits, entities, asking);
      return fact ? [fact] : [];
    });
  });
}

function factOf(
  cell: SheetCell,
  row: PlacedRow,
  column: SettledColumn,
  table: StatementTable,
  run: Run,
  scale: SettledScale,
  waits: readonly string[],
  entities: EntityColumns,
  asking: Asking,
): TableFact | null {
  if (cell.kind !== 'amount' || cell.amount === null || row.code === null) return null;
  const months = run.part === 'balance' ? 0 : column.months;
  if (months === null) return null;
  const sign =
    run.signed.factorOf(row.index, row.code) *
    signOfColour(cell, table, row, asking) *
    (isTurned(table, run, row, asking) ? -1 : 1);
  const printed = run.amounts[row.index]?.[column.index] ?? cell.amount;
  const amount = printed.times(sign).times(scale.unit ?? 1);
  return {
    code: row.code,
    periodEnd: column.end,
    months,
    periodStart: periodStart(column.end, months),
    amount: amount.isZero() ? '0' : amount.toFixed(),
    sheet: cell.sheet,
    cell: cellName(cell),
    rawText: cell.text,
    label: row.read.row.label,
    fromFormula: cell.fromFormula,
    waitsFor: [...scale.waitsFor, ...waits].filter(
      (key, at, all) => asking.isOpen(key) && all.indexOf(key) === at,
    ),
    borrower: entities.borrowerOf(table, column),
    table,
    column,
    run,
    rowIndex: row.index,
  };
}

const OF_PAYMENT = {
  words:
    'is a payment by its name, but stands without a minus, and no total shows which is meant. Was money paid out?',
  options: [
    { value: 'negative', label: 'Paid out' },
    { value: 'positive', label: 'Received' },
  ],
} as const;
/** 'negative' turns what is printed, as it does for payments. */
const OF_RESULT = {
  words: 'has a sign that no total proves. Does it raise the result or lower it?',
  options: [
    { value: 'negative', label: 'It lowers the result' },
    { value: 'positive', label: 'It raises the result' },
  ],
} as const;

const HIDDEN_KEY = 'hidden-rows';
const colourKey = (table: StatementTable, row: PlacedRow): string =>
  `sign:${table.table.sheet.name}:${row.read.row.label}`;

/** Payments of one cash flow, and losses of one statement, are written in one way: they are asked about once. */
function signKey(table: StatementTable, run: Run, row: PlacedRow): string {
  const sheet = table.table.sheet.name;
  if (run.part === 'cash-flow') return `sign:${sheet}:payments`;
  return run.signed.losses.has(row.index) ? `sign:${sheet}:losses` : `${colourKey(table, row)}:printed`;
}

const isTurned = (table: StatementTable, run: Run, row: PlacedRow, asking: Asking): boolean =>
  run.signed.unsettled.has(row.index) &&
  asking.questions.find(({ key }) => key === signKey(table, run, row))?.answer === 'negative';

/** Lines that may be losses and are printed without a sign, some in red and some not. */
function colourTellsSign(run: Run, row: PlacedRow): boolean {
  const cells = row.read.row.cells.filter(
    (cell): cell is SheetCell => cell?.kind === 'amount' && cell.amount?.isZero() === false,
  );
  const red = cells.filter((cell) => cell.red);
  if (red.length === 0 || red.length === cells.length) return false;
  return red.every(({ amount }) => amount?.isPositive()) && !run.signed.sums.signs.has(row.index);
}

function signQuestions(table: StatementTable, run: Run, row: PlacedRow, asking: Asking): string[] {
  if (colourTellsSign(run, row)) {
    const red = row.read.row.cells.filter((cell): cell is SheetCell => cell?.red === true);
    const key = colourKey(table, row);
    asking.ask({
      key,
      kind: 'sign',
      holdsFor: 'layout',
      text: `'${row.read.row.label}' on '${table.table.sheet.name}' has no minus signs, but ${red.length} of its amounts are red, such as ${red[0]?.text ?? ''}. Are the red ones negative?`,
      where: red.map((cell) => ({ sheet: cell.sheet, cell: cellName(cell) })),
      options: [
        { value: 'negative', label: 'Red amounts are negative' },
        { value: 'positive', label: 'The colour means nothing: all are positive' },
      ],
    });
    return [key];
  }
  if (!run.signed.unsettled.has(row.index)) return [];
  const key = signKey(table, run, row);
  const { words, options } = run.part === 'cash-flow' ? OF_PAYMENT : OF_RESULT;
  asking.ask({
    key,
    kind: 'sign',
    holdsFor: 'layout',
    text: `'${row.read.row.label}' on '${table.table.sheet.name}' ${words}`,
    where: [rowPlace(table.table, row.read.row)],
    options,
  });
  return [key];
}

function signOfColour(cell: SheetCell, table: StatementTable, row: PlacedRow, asking: Asking): 1 | -1 {
  const answer = asking.questions.find(({ key }) => key === colourKey(table, row))?.answer;
  if (answer !== 'negative') return 1;
  const isColour = row.read.row.cells.some((other) => other?.red === true);
  return !isColour || cell.red ? -1 : 1;
}

/** Hidden rows with amounts are asked about once for the whole file. */
function hiddenQuestions(table: StatementTable, run: Run, row: PlacedRow, asking: Asking): string[] {
  if (!row.read.row.hidden) return [];
  const where: CellRef = rowPlace(table.table, row.read.row);
  asking.ask({
    key: HIDDEN_KEY,
    kind: 'hidden-rows',
    holdsFor: 'layout',
    text: hiddenText(table, run, row),
    where: [where],
    options: [
      { value: 'include', label: 'Include the hidden rows' },
      { value: 'leave', label: 'Leave them out' },
    ],
  });
  return [HIDDEN_KEY];
}

/** '14 hidden rows on 'BS': 2 carry amounts, first 'Stock', which the totals include.' */
function hiddenText({ table }: StatementTable, run: Run, row: PlacedRow): string {
  const hidden = table.sheet.hiddenRows.size;
  const filled = table.rows.filter(
    (other) => other.hidden && other.cells.some((cell) => cell?.kind === 'amount'),
  ).length;
  const inTotals = run.signed.sums.signs.has(row.index) ? ', which the totals include' : '';
  return `${hidden} hidden ${hidden === 1 ? 'row' : 'rows'} on '${table.sheet.name}': ${filled} ${filled === 1 ? 'carries' : 'carry'} amounts, first '${row.read.row.label}'${inTotals}. Do they belong in?`;
}

const isLeftOut = (row: PlacedRow, asking: Asking): boolean =>
  row.read.row.hidden && asking.questions.some(({ key, answer }) => key === HIDDEN_KEY && answer === 'leave');
