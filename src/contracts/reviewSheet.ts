/** The review sheet on the wire. Its workbook is written below contracts, so the shape is core's. */
export {
  NOT_RECORDED,
  REVIEW_SECTIONS,
  type CellReference,
  type FigureCell,
  type ReviewSheet,
  type SheetBlock,
  type SheetCell,
  type SheetColumn,
  type SheetSection,
  type SheetSource,
  type SheetTable,
  type SheetTest,
} from '../core/reviewSheet.ts';
