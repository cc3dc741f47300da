/** A sheet as the reader sees it: every filled cell with its address, its value and how it is printed. */
import type { PlainDate } from '#core/calendar/plainDate.ts';
import type { Decimal } from '#core/money/decimal.ts';

/**
 * `amount` is a number that may be an amount; `text` anything else. A percentage, a date and a truth value are no
 * amounts. `uncalculated` is a formula whose value neither is stored nor can be worked out.
 */
export type CellKind = 'amount' | 'text' | 'date' | 'percent' | 'error' | 'uncalculated';

export interface SheetCell {
  readonly sheet: string;
  readonly row: number;
  readonly column: number;
  /** As the sheet prints it. */
  readonly text: string;
  readonly kind: CellKind;
  /** As printed: a format that shows thousands of the stored value is applied. */
  readonly amount: Decimal | null;
  readonly date: PlainDate | null;
  readonly fromFormula: boolean;
  /** The value was worked out here because the file holds none. */
  readonly workedOut: boolean;
  /** A number that the file holds as text. */
  readonly fromText: boolean;
  /** Stored value divided by printed amount: 1000 for a format that hides three digits. */
  readonly formatScale: number;
  readonly numberFormat: string;
  readonly bold: boolean;
  readonly red: boolean;
  readonly indent: number;
  /** Printed decimals, to tell cents. */
  readonly decimals: number;
  /** '1,234' as text in a file that does not show which mark it uses. */
  readonly ambiguous: boolean;
  /** What a simple formula gives, where the value that the file holds for it is another. */
  readonly recomputed: Decimal | null;
}

export interface SheetGrid {
  readonly name: string;
  readonly hidden: boolean;
  /** Rows by number, from 1; only rows with a filled cell. */
  readonly rows: ReadonlyMap<number, ReadonlyMap<number, SheetCell>>;
  readonly hiddenRows: ReadonlySet<number>;
  readonly hiddenColumns: ReadonlySet<number>;
  /** Merged areas, to spread a heading over its span. */
  readonly merges: readonly MergedArea[];
  /** Upper left cells of pictures. */
  readonly pictures: readonly string[];
  /** Comments beside cells, which hold no figures. */
  readonly comments: readonly CellComment[];
}

export interface CellComment {
  readonly cell: string;
  readonly text: string;
}

export interface MergedArea {
  readonly top: number;
  readonly left: number;
  readonly bottom: number;
  readonly right: number;
}

export interface WorkbookGrid {
  readonly kind: 'xlsx' | 'csv';
  readonly sheets: readonly SheetGrid[];
}

/** 'A' is 1, 'AA' is 27. */
export function columnNumber(letters: string): number {
  let number = 0;
  for (const letter of letters.toUpperCase()) number = number * 26 + (letter.charCodeAt(0) - 64);
  return number;
}

export function columnLetters(column: number): string {
  let letters = '';
  for (let rest = column; rest > 0; rest = Math.floor((rest - 1) / 26)) {
    letters = String.fromCharCode(65 + ((rest - 1) % 26)) + letters;
  }
  return letters;
}

export const cellName = (cell: { readonly row: number; readonly column: number }): string =>
  `${columnLetters(cell.column)}${cell.row}`;

export const cellAt = (grid: SheetGrid, row: number, column: number): SheetCell | null =>
  grid.rows.get(row)?.get(column) ?? null;
