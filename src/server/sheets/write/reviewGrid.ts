/** Writes blocks down one worksheet whose columns are a grid: every table lays its columns over so many of them. */
import type ExcelJS from 'exceljs';
import { isNotMet } from '../../../core/covenants/covenantTest.ts';
import {
  GRID_COLUMNS,
  NOT_RECORDED,
  type SheetBlock,
  type SheetCell,
  type SheetSection,
  type SheetTable,
} from '../../../core/reviewSheet.ts';
import { BODY_POINTS, BORDERS, FONTS } from './cellStyle.ts';
import { put, writtenCell, writtenText } from './cellValue.ts';

/** Width of one grid column, in characters of the workbook's own font of 11 points. */
export const GRID_WIDTH = 8.9;

const CHARACTERS = GRID_WIDTH * (11 / BODY_POINTS);
const GAP_POINTS = 6;
export const LINE_POINTS = BODY_POINTS * 1.38;

/** Where the next row goes. */
export interface Cursor {
  readonly worksheet: ExcelJS.Worksheet;
  row: number;
}

/** Past the longest heading of a section that people write. */
const BESIDE_HEADING = 9;

interface Placed {
  readonly cell: SheetCell;
  readonly span: number;
  readonly style: Partial<ExcelJS.Style>;
}

/** "Not recorded" stands beside its heading, so that an empty section takes one line. */
export function writeSection(cursor: Cursor, { number, title, isRecorded, blocks }: SheetSection): void {
  const { worksheet } = cursor;
  worksheet.getRow(cursor.row).height = GAP_POINTS;
  cursor.row += 1;
  const { row } = cursor;
  for (let column = 1; column <= GRID_COLUMNS; column += 1)
    worksheet.getCell(row, column).border = BORDERS.section;
  const beside = { border: BORDERS.section, alignment: { vertical: 'middle' } } as const;
  put(worksheet.getCell(row, 1), writtenText(`${number}  ${title}`), { ...beside, font: FONTS.section });
  if (!isRecorded)
    put(worksheet.getCell(row, BESIDE_HEADING), writtenText(NOT_RECORDED), { ...beside, font: FONTS.second });
  worksheet.getRow(row).height = 18;
  cursor.row += 1;
  for (const block of blocks) writeBlock(cursor, block);
}

function writeBlock(cursor: Cursor, block: SheetBlock): void {
  switch (block.kind) {
    case 'facts':
      return writeFacts(cursor, block.facts);
    case 'table':
      return writeTable(cursor, block);
    case 'list':
      for (const line of block.lines) writeText(cursor, `–  ${line}`, { font: FONTS.body });
      return;
    case 'paragraph':
      return writeText(cursor, block.text, { font: FONTS.body });
    case 'caution':
      return writeText(cursor, block.text, { font: FONTS.caution, border: BORDERS.caution });
  }
}

function writeText(cursor: Cursor, text: string, style: Partial<ExcelJS.Style>): void {
  writeRow(cursor, [{ cell: { kind: 'text', text }, span: GRID_COLUMNS, style }]);
}

const LABEL_SPAN = 3;
const VALUE_SPAN = GRID_COLUMNS / 2 - LABEL_SPAN;

/** Two facts a row. */
function writeFacts(
  cursor: Cursor,
  facts: readonly { readonly label: string; readonly value: SheetCell }[],
): void {
  for (let place = 0; place < facts.length; place += 2)
    writeRow(
      cursor,
      facts.slice(place, place + 2).flatMap(({ label, value }) => [
        {
          cell: { kind: 'text', text: label },
          span: LABEL_SPAN,
          style: { font: FONTS.second, border: BORDERS.row },
        } satisfies Placed,
        {
          cell: value,
          span: VALUE_SPAN,
          style: {
            font: fontOf(value),
            border: BORDERS.row,
            alignment: { horizontal: 'left' },
          },
        } satisfies Placed,
      ]),
    );
}

function writeTable(cursor: Cursor, { caption, columns, rows }: SheetTable): void {
  writeText(cursor, caption, { font: FONTS.name });
  const beside = columns.map((column, place) => ({ ...column, place })).filter(({ span }) => span > 0);
  const below = columns.map((column, place) => ({ ...column, place })).filter(({ span }) => span === 0);
  const alignmentOf = (at: number): Partial<ExcelJS.Alignment> =>
    beside[at]?.numeric
      ? { horizontal: 'right' }
      : { horizontal: 'left', indent: beside[at - 1]?.numeric ? 1 : 0 };
  writeRow(
    cursor,
    beside.map(({ label, span }, at) => ({
      cell: { kind: 'text', text: label },
      span,
      style: {
        font: FONTS.second,
        border: BORDERS.head,
        alignment: { ...alignmentOf(at), vertical: 'bottom' },
      },
    })),
  );
  for (const row of rows) {
    const border = below.length > 0 ? {} : BORDERS.row;
    writeRow(
      cursor,
      beside.flatMap(({ span, place }, at) => {
        const cell = row[place];
        return cell
          ? [{ cell, span, style: { font: fontOf(cell), border, alignment: alignmentOf(at) } }]
          : [];
      }),
    );
    for (const { label, place } of below)
      writeText(cursor, `${label}: ${row[place]?.text ?? ''}`, {
        font: FONTS.second,
        border: place === below.at(-1)?.place ? BORDERS.row : {},
      });
  }
  cursor.worksheet.getRow(cursor.row).height = GAP_POINTS;
  cursor.row += 1;
}

function fontOf(cell: SheetCell): Partial<ExcelJS.Font> {
  if (cell.kind === 'absent' || cell.kind === 'references') return FONTS.second;
  if (cell.kind !== 'outcome') return cell.kind === 'figure' ? FONTS.name : FONTS.body;
  const isWarned = cell.justPassing || (isNotMet(cell.outcome) && cell.outcome !== 'not met, waived');
  return isWarned ? FONTS.warned : FONTS.body;
}

/** One row of cells from the left edge; the row is as high as its longest text, which no spreadsheet finds by itself in joined cells. */
function writeRow(cursor: Cursor, placed: readonly Placed[]): void {
  const { worksheet, row } = cursor;
  let column = 1;
  for (const { cell, span, style } of placed) {
    const first = worksheet.getCell(row, column);
    if (span > 1) worksheet.mergeCells(row, column, row, column + span - 1);
    put(first, writtenCell(cell), {
      ...style,
      alignment: { vertical: 'top', wrapText: true, ...style.alignment },
    });
    column += span;
  }
  const lines = Math.max(1, ...placed.map(({ cell, span }) => linesIn(cell, span * CHARACTERS)));
  worksheet.getRow(row).height = lines * LINE_POINTS + 3;
  cursor.row += 1;
}

/** Numbers and days never break. */
const linesIn = (cell: SheetCell, width: number): number =>
  cell.kind === 'figure' || cell.kind === 'day' ? 1 : linesOf(cell.text, width);

export const linesOf = (text: string, width: number): number =>
  text.split('\n').reduce((lines, part) => lines + Math.max(1, Math.ceil(part.length / width)), 0);
