/** What a test worked out again is made of. */
import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { LineItemCode } from '../statements/lineItems.ts';

export interface SourceCell {
  readonly statementId: number;
  readonly line: LineItemCode;
  readonly fileName: string | null;
  readonly sha256: string | null;
  readonly sheet: string;
  readonly cell: string;
  readonly rawText: string;
}

/** A cell of a borrower's file, with the number that stands in it. */
export interface WorkedCell extends SourceCell {
  readonly key: string;
  /** Null where the text is no number. */
  readonly number: Decimal | null;
}

/** One line of one statement: its cells added up, times what one of the sheet's units is worth. */
export interface WorkedLine {
  readonly key: string;
  readonly label: string;
  readonly periodEnd: PlainDate;
  readonly months: number;
  readonly cells: readonly WorkedCell[];
  /** 1,000 for a sheet in thousands, −1 for one with its signs turned; null where the amount does not follow from its cells. */
  readonly factor: Decimal | null;
  readonly amount: Decimal;
}

/**
 * One row of the computation. `{key}` in a formula stands for another row's value; without a formula the row is as
 * recorded or, where `isOpen`, as computed and not worked out here.
 */
export interface WorkedRow {
  readonly key: string;
  readonly label: string;
  readonly unit: 'money' | 'times' | 'share' | 'words';
  /** Null where it has no value. */
  readonly value: Decimal | string | null;
  readonly formula: string | null;
  readonly isOpen: boolean;
  readonly note: string;
}

export interface WorkedTest {
  readonly lines: readonly WorkedLine[];
  readonly bridge: readonly WorkedRow[];
  readonly result: readonly WorkedRow[];
}
