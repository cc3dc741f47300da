/**
 * The committee's review sheet as plain data: twenty sections out of blocks and cells. The page and the workbook are
 * both made from it and decide nothing, so that a stored sheet prints again as it was signed.
 *
 * Decimals are text; every cell carries the words that are printed for it.
 */
import type { Outcome } from './covenants/covenantTest.ts';

/** In the order in which a committee reads them. */
export const REVIEW_SECTIONS = [
  'Header',
  'What is asked',
  'What changed since the last sheet',
  'Exposure',
  'Grades',
  'Covenant table',
  'Break-even and projection',
  'Financial summary',
  'Bridge from reported to covenant EBITDA',
  'Cash flow',
  'Reporting quality',
  'Just-passing pattern',
  'Management, auditor, customers, litigation, sponsor',
  'Sector and peers',
  'Collateral, guarantors, insurance',
  'Signals open and closed',
  'Exceptions and missing information',
  'Waivers, amendments, cures used',
  'Recommendation and action plan',
  'Sign-off and annex',
] as const;

export const NOT_RECORDED = 'not recorded';

/** 'share' is a fraction of one, printed in per cent. */
export type FigureUnit = 'times' | 'share' | 'money' | 'points' | 'count';

export interface FigureCell {
  readonly kind: 'figure';
  readonly unit: FigureUnit;
  /** Every digit there is. */
  readonly value: string;
  /** Decimals that it takes to show the side of its limit, in the printed unit. */
  readonly places: number;
  /** Words before the figure: 'at most'. */
  readonly before: string;
  readonly text: string;
}

/** One test of a row of tests; shares and levels as decimal text. */
export interface SheetTest {
  readonly testDate: string;
  readonly outcome: Outcome;
  readonly mayFall: string | null;
  readonly justPassing: boolean;
  readonly level: string | null;
  /** Width of the just-passing band of the policy it was judged by, a share of the level; left out: version 1's. */
  readonly band?: string;
}

/** Where one amount stands in a file. */
export interface CellReference {
  readonly statementId: number;
  readonly line: string;
  readonly fileName: string;
  /** 'Income!D14', or 'D14' after a cell of the same sheet. */
  readonly reference: string;
  /** -1: taken away, as the prior year to date in twelve months. */
  readonly sign: 1 | -1;
}

export type SheetCell =
  | { readonly kind: 'text'; readonly text: string }
  /** No figure here, and the words that say so. */
  | { readonly kind: 'absent'; readonly text: string }
  | FigureCell
  | { readonly kind: 'day'; readonly day: string; readonly text: string }
  | {
      readonly kind: 'outcome';
      readonly outcome: Outcome;
      readonly justPassing: boolean;
      readonly remarks: readonly string[];
      readonly text: string;
    }
  | {
      readonly kind: 'tests';
      readonly label: string;
      readonly tests: readonly SheetTest[];
      readonly text: string;
    }
  | { readonly kind: 'references'; readonly references: readonly CellReference[]; readonly text: string };

export interface SheetColumn {
  readonly key: string;
  readonly label: string;
  /** Width in columns of the workbook's grid, of GRID_COLUMNS; nought stands there as a line under its row. */
  readonly span: number;
  readonly numeric?: true;
  /** On the page this stands as a line under that column; in the workbook it is a column of its own. */
  readonly under?: string;
}

export const GRID_COLUMNS = 20;

export interface SheetTable {
  readonly kind: 'table';
  readonly caption: string;
  readonly columns: readonly SheetColumn[];
  /** One cell a column, in the order of the columns. */
  readonly rows: readonly (readonly SheetCell[])[];
}

export type SheetBlock =
  | SheetTable
  | {
      readonly kind: 'facts';
      readonly facts: readonly { readonly label: string; readonly value: SheetCell }[];
    }
  | { readonly kind: 'list'; readonly lines: readonly string[] }
  | { readonly kind: 'paragraph'; readonly text: string }
  | { readonly kind: 'caution'; readonly text: string };

export interface SheetSection {
  readonly number: number;
  readonly title: string;
  /** False: the section stands with its heading and "not recorded". */
  readonly isRecorded: boolean;
  readonly blocks: readonly SheetBlock[];
}

/** One figure behind the sheet, with the cells that it was read from. */
export interface SheetSource {
  /** Covenants that rest on it. */
  readonly usedIn: string;
  readonly line: string;
  readonly period: string;
  readonly periodEnd: string;
  readonly amount: string;
  readonly currency: string;
  /** Version and basis of the statement; a recorded add-back has neither. */
  readonly standing: string;
  readonly receivedOn: string | null;
  /** Null where the figure came with no file. */
  readonly fileName: string | null;
  readonly sha256: string | null;
  readonly sheet: string;
  readonly cells: string;
  readonly rawText: string;
}

export interface ReviewSheet {
  readonly state: 'draft';
  readonly borrowerId: number;
  readonly borrowerName: string;
  /** ISO instant. */
  readonly madeAt: string;
  /** What the figures rest on, in one line; stands on every printed page. */
  readonly basisLine: string;
  /** The mark of listed borrowers; null where there is none. */
  readonly privateSide: string | null;
  readonly sections: readonly SheetSection[];
  readonly sources: readonly SheetSource[];
}
