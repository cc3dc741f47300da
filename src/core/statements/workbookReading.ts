/**
 * What a borrower's workbook was read as: facts with their cells, what is unclear, what was checked. Plain JSON;
 * amounts are decimal text in whole currency units, days are ISO text. A reading is made anew, from the stored
 * file and all answers so far, whenever an answer is given: an answer never patches a reading.
 */
import type { LineItemCode, StatementPart } from './lineItems.ts';

/** Codes of refusals, questions, notes and checks; each is shown with its own sentence, never alone. */
export const REFUSAL_CODES = [
  'password',
  'legacy-xls',
  'not-a-workbook',
  'no-amounts',
  'picture-only',
  'error-in-needed-cell',
  'formulas-not-calculated',
  'too-large',
  'damaged',
  'hostile',
  'took-too-long',
] as const;
export type RefusalCode = (typeof REFUSAL_CODES)[number];

export const QUESTION_KINDS = [
  'unit',
  'currency',
  'period-length',
  'year-end',
  'date-order',
  'sign',
  'entity',
  'placement',
  'which-sheets',
  'hidden-rows',
  'restated',
  'scale-jump',
  'does-not-balance',
] as const;
export type QuestionKind = (typeof QUESTION_KINDS)[number];

export interface CellRef {
  readonly sheet: string;
  /** 'B12' */
  readonly cell: string;
}

/**
 * One cell's amount on one standard line. Several facts of one line and period are parts of it and are added. A
 * cell whose line, period or entity is not known yet is no fact: it becomes one when the question is answered.
 */
export interface ReadFact {
  readonly code: LineItemCode;
  readonly periodEnd: string;
  /** 0 is a balance at an instant. */
  readonly months: number;
  /** First day of the period; the balance date itself where months is 0. */
  readonly periodStart: string;
  /** In whole currency units; as printed while the question of the unit is open. */
  readonly amount: string;
  readonly sheet: string;
  readonly cell: string;
  /** The cell as the sheet prints it. */
  readonly rawText: string;
  readonly label: string;
  readonly fromFormula: boolean;
  /** Keys of open questions that this fact waits for; empty where it may be taken. */
  readonly waitsFor: readonly string[];
  /** The borrower named in the row of a file of many borrowers; null elsewhere. Never mixed: take one borrower's. */
  readonly borrower: string | null;
}

export interface Question {
  /** Stable within a layout: 'unit', 'period-length:P&L', 'placement:P&L:Factoring fees'. */
  readonly key: string;
  readonly kind: QuestionKind;
  /** 'layout': the answer holds for later files of this layout too; 'file': it is about these figures only. */
  readonly holdsFor: 'layout' | 'file';
  /** "No sheet says whether amounts are in thousands. Last quarter revenue was 48.2m; this file shows 49,310." */
  readonly text: string;
  readonly where: readonly CellRef[];
  /** The answers to click; none is preselected. */
  readonly options: readonly { readonly value: string; readonly label: string }[];
  readonly answer: string | null;
}

/** A remark that hinders nothing: what was left out, turned round or put aside, and where. */
export interface ReadNote {
  readonly code: string;
  readonly text: string;
  readonly where: CellRef | null;
}

export interface ReadRefusal {
  readonly code: RefusalCode;
  readonly where: CellRef | null;
  /** What, where, why it matters, what to do, what was not changed. */
  readonly message: string;
}

export interface ReadCheck {
  readonly code: string;
  readonly text: string;
  readonly outcome: 'ties' | 'warning' | 'does-not-tie';
  readonly difference: string;
  readonly tolerance: string;
  readonly periodEnd: string;
  readonly months: number;
}

/** An adjustment that a compliance certificate adds to EBITDA: as the borrower states it, one of a list. */
export interface ReadAddBack {
  readonly periodEnd: string;
  readonly months: number;
  /** In whole currency units; as printed while the question of the unit is open. */
  readonly amount: string;
  readonly sheet: string;
  readonly cell: string;
  readonly rawText: string;
  readonly label: string;
  /** Keys of open questions that it waits for. */
  readonly waitsFor: readonly string[];
}

export interface RowPlacement {
  readonly sheet: string;
  readonly row: number;
  readonly label: string;
  readonly code: LineItemCode | null;
  /** Why the row went there: 'as in the last file of this layout', 'known wording', 'answered', 'adds up to …'. */
  readonly reason: string;
}

export interface GridCell {
  readonly text: string;
  readonly numeric: boolean;
  readonly bold: boolean;
  readonly error: boolean;
}

export interface ReadSheet {
  readonly name: string;
  readonly hidden: boolean;
  readonly part: StatementPart | 'mixed' | null;
  /** Rows as the borrower sent them, first row first, columns from A; short rows are padded on display. */
  readonly grid: readonly (readonly GridCell[])[];
  readonly columns: readonly ReadColumn[];
}

export interface ReadColumn {
  /** 'B' */
  readonly column: string;
  readonly periodStart: string | null;
  readonly periodEnd: string | null;
  readonly months: number | null;
  readonly scenario: 'actual' | 'budget' | 'forecast' | 'derived';
  readonly heading: string;
}

export interface Reading {
  readonly outcome: 'ready' | 'questions' | 'refused';
  readonly refusal: ReadRefusal | null;
  readonly currency: string | null;
  /** '1', '1000', '1000000' */
  readonly unit: string | null;
  readonly sheets: readonly ReadSheet[];
  readonly placements: readonly RowPlacement[];
  readonly facts: readonly ReadFact[];
  /** Absent where the file holds no compliance certificate. */
  readonly addBacks?: readonly ReadAddBack[];
  readonly questions: readonly Question[];
  readonly notes: readonly ReadNote[];
  readonly checks: readonly ReadCheck[];
  /** SHA-256 over sheet names, headings and row labels, amounts aside: answers are remembered for it. */
  readonly layoutKey: string;
}

/** What the reader may know besides the file. */
export interface ReadingContext {
  readonly fiscalYearEndMonth: number | null;
  readonly reportingCurrency: string | null;
  /** Answers by question key, remembered and given. */
  readonly answers: Readonly<Record<string, string>>;
  /** The last accepted revenue of one quarter in whole units, to word the question of scale; never to answer it. */
  readonly lastQuarterRevenue: string | null;
  /** Whose figures are asked for, in a file of many borrowers; absent: all are read and told apart. */
  readonly borrowerName?: string | null;
}
