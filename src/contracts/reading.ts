/** What a borrower's workbook was read as, on the wire. The reader itself is below contracts, so the shape is core's. */
export {
  type CellRef,
  type GridCell,
  type Question,
  type QuestionKind,
  type ReadCheck,
  type ReadColumn,
  type ReadFact,
  type Reading,
  type ReadingContext,
  type ReadNote,
  type ReadRefusal,
  type ReadSheet,
  type RefusalCode,
  type RowPlacement,
} from '../core/statements/workbookReading.ts';
