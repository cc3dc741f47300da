/** Errors and uncalculated formulas: in a figure that is needed they end the reading, elsewhere they are remarked on. */
import type { SettledColumns } from './statements.ts';
import type { ReadRefusal } from '#core/statements/workbookReading.ts';
import type { Asking } from './asking.ts';
import { cellName, type SheetCell, type WorkbookGrid } from './cells.ts';
import { refusal } from './refusals.ts';
import { isStandardLine } from './lineNature.ts';

export function refuseForGaps(
  grid: WorkbookGrid,
  settled: SettledColumns,
  asking: Asking,
): ReadRefusal | null {
  const needed = neededCells(settled);
  const order = new Map(grid.sheets.map(({ name }, at) => [name, at]));
  const inOrder = [...needed].sort(
    (one, other) =>
      (order.get(one.sheet) ?? 0) - (order.get(other.sheet) ?? 0) ||
      one.row - other.row ||
      one.column - other.column,
  );
  const [first] = inOrder.filter(({ kind }) => kind === 'error' || kind === 'uncalculated');
  if (first) {
    const where = { sheet: first.sheet, cell: cellName(first) };
    if (first.kind === 'error') return refusal('error-in-needed-cell', where, first.text);
    return refusal('formulas-not-calculated', where);
  }
  noteOthers(grid, needed, asking);
  return null;
}

/** Cells of standard lines in actual periods. */
function neededCells(settled: SettledColumns): Set<SheetCell> {
  const needed = new Set<SheetCell>();
  for (const [table, columns] of settled) {
    for (const run of table.runs) {
      for (const read of run.rows) {
        if (!isStandardLine(read.line) || read.ofWhich) continue;
        for (const { index, scenario } of columns) {
          const cell = read.row.cells[index];
          if (cell && scenario === 'actual') needed.add(cell);
        }
      }
    }
  }
  return needed;
}

function noteOthers(grid: WorkbookGrid, needed: ReadonlySet<SheetCell>, asking: Asking): void {
  const cells = grid.sheets.flatMap(({ rows }) => [...rows.values()].flatMap((row) => [...row.values()]));
  const errors = cells.filter((cell) => cell.kind === 'error' && !needed.has(cell));
  const [first] = errors;
  if (first) {
    asking.note(
      'errors-ignored',
      `${errors.length === 1 ? 'One cell holds an error' : `${errors.length} cells hold errors`}, first ${first.text}. They are not needed.`,
      { sheet: first.sheet, cell: cellName(first) },
    );
  }
  const workedOut = [...needed].filter((cell) => cell.workedOut);
  const [example] = workedOut;
  if (example) {
    asking.note(
      'values-from-formulas',
      `${workedOut.length} formulas have no stored value. They were worked out from the cells they name.`,
      { sheet: example.sheet, cell: cellName(example) },
    );
  }
}
