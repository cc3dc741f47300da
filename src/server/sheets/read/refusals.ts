/** The sentences of refusals: what, where, why it matters, what to do, what was not changed. */
import type { CellRef, ReadRefusal, RefusalCode } from '#core/statements/workbookReading.ts';

const UNCHANGED = 'Nothing was imported.';

const SENTENCES: Readonly<Record<RefusalCode, (where: string, detail: string) => string>> = {
  password: () =>
    'The file is protected by a password, so its figures cannot be read. Save a copy without the password and send that. Passwords are not stored.',
  'legacy-xls': () =>
    'The file is an old .xls workbook, a format whose figures cannot be read safely. Open it and save it as .xlsx.',
  'not-a-workbook': (_where, detail) =>
    `The file is not a workbook: ${detail}. Its figures cannot be told from its layout. Save it as an .xlsx workbook and send that.`,
  'no-amounts': (_where, detail) =>
    `No amounts were found: ${detail || 'the file holds headings and labels, but no figures for any period'}. Totals of empty cells are not figures. Send the completed file.`,
  'picture-only': (where) =>
    `The figures are a picture${where}. A picture cannot be checked cell by cell. Send the workbook with numbers, or type them in.`,
  'error-in-needed-cell': (where, detail) =>
    `Cell${where} holds ${detail}, a required figure. Measures and covenant tests would rest on a gap. Correct the cell and send the file again, or enter the figure with a note.`,
  'formulas-not-calculated': (where) =>
    `The formula${where} has no calculated value, and cannot be worked out from this file. Figures would be missing. Open the file, recalculate it, save it and send it again.`,
  'too-large': (_where, detail) =>
    `The file is too large to read: ${detail}. Remove the sheets that hold no statements and send it again.`,
  damaged: (where, detail) =>
    `The file cannot be read completely${where && `, first at${where}`}: ${detail}. Figures could be missing without notice. Open it, save it anew and send that.`,
  hostile: (_where, detail) =>
    `The file was not opened: ${detail}. A workbook saved by a spreadsheet program has no such content. Save it anew and send that, or ask the sender how it was made.`,
  'took-too-long': (_where, detail) =>
    `The file took too long to read: ${detail}. Remove the sheets that hold no statements and send it again.`,
};

/** `detail` completes the sentence of its code; it never holds text of the file longer than a cell. */
export function refusal(code: RefusalCode, where: CellRef | null = null, detail = ''): ReadRefusal {
  const place = where ? ` ${where.sheet}!${where.cell}` : '';
  return { code, where, message: `${SENTENCES[code](place, detail)} ${UNCHANGED}` };
}

/** Stops a reading from anywhere inside it; readGrids and interpret turn it into a refused reading. */
export class Refused extends Error {
  readonly refusal: ReadRefusal;

  constructor(reason: ReadRefusal) {
    super(reason.message);
    this.name = 'Refused';
    this.refusal = reason;
  }
}
