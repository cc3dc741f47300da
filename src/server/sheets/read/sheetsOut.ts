/** The grid of every sheet as the borrower sent it, for the page, and what each of its columns was read as. */
import type { GridCell, ReadColumn, ReadSheet } from '#core/statements/workbookReading.ts';
import { cellAt, type SheetGrid } from './cells.ts';
import { periodStart } from './periods.ts';
import type { SettledColumns, StatementTable } from './statements.ts';

const SHOWN_ROWS = 2_000;
const SHOWN_COLUMNS = 60;
const BLANK: GridCell = { text: '', numeric: false, bold: false, error: false };

export function sheetsOut(
  sheets: readonly SheetGrid[],
  tables: readonly StatementTable[],
  settled: SettledColumns,
): ReadSheet[] {
  return sheets.map((sheet) => {
    const own = tables.filter(({ table }) => table.sheet === sheet);
    const parts = new Set(
      own.flatMap(({ runs }) =>
        runs.flatMap(({ part, rows }) => (part && rows.some(({ line }) => line) ? [part] : [])),
      ),
    );
    const [part] = parts;
    return {
      name: sheet.name,
      hidden: sheet.hidden,
      part: parts.size > 1 ? 'mixed' : (part ?? null),
      grid: gridOf(sheet),
      columns: own.flatMap((table) => columnsOf(table, settled)),
    };
  });
}

function gridOf(sheet: SheetGrid): GridCell[][] {
  const lastRow = Math.min(SHOWN_ROWS, Math.max(0, ...sheet.rows.keys()));
  return Array.from({ length: lastRow }, (_, at) => {
    const row = sheet.rows.get(at + 1);
    const lastColumn = row ? Math.min(SHOWN_COLUMNS, Math.max(0, ...row.keys())) : 0;
    return Array.from({ length: lastColumn }, (_cell, index) => shown(sheet, at + 1, index + 1));
  });
}

function shown(sheet: SheetGrid, row: number, column: number): GridCell {
  const cell = cellAt(sheet, row, column);
  if (!cell) return BLANK;
  const numeric = cell.kind === 'amount' || cell.kind === 'percent';
  return {
    text: cell.text.slice(0, 500),
    numeric,
    bold: cell.bold,
    error: cell.kind === 'error' || cell.kind === 'uncalculated',
  };
}

function columnsOf(table: StatementTable, settled: SettledColumns): ReadColumn[] {
  const isBalance = table.runs.every(({ part }) => part === 'balance' || part === null);
  return table.columns.map((words) => {
    const known = settled.get(table)?.find(({ key }) => key === words.key);
    const months = isBalance && known ? 0 : (known?.months ?? null);
    return {
      column: words.key,
      periodStart: known && months !== null ? periodStart(known.end, months) : null,
      periodEnd: known?.end ?? null,
      months,
      scenario: words.role === 'period' ? words.scenario : 'derived',
      heading: words.heading,
    };
  });
}
