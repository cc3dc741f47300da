/**
 * What stands in a cell: figures as numbers with a format, days as dates, everything else as text that no
 * spreadsheet takes for a formula.
 */
import type ExcelJS from 'exceljs';
import type { FigureCell, SheetCell } from '../../../core/reviewSheet.ts';

interface Written {
  readonly value: string | number | Date | null;
  readonly numFmt: string;
}

/** The format of text: what is typed over it later stays text as well. */
const TEXT = '@';
const DAY = 'yyyy-mm-dd';

export function writtenCell(cell: SheetCell): Written {
  switch (cell.kind) {
    case 'figure':
      return { value: Number(cell.value), numFmt: figureFormat(cell) };
    case 'day':
      return { value: new Date(`${cell.day}T00:00:00Z`), numFmt: DAY };
    case 'text':
    case 'absent':
    case 'outcome':
    case 'tests':
    case 'references':
      return writtenText(cell.text);
  }
}

export const writtenText = (text: string): Written => ({
  value: text === '' ? null : withoutControls(text),
  numFmt: TEXT,
});

export const writtenAmount = (amount: string): Written => ({
  value: Number(amount),
  numFmt: figureFormat({ unit: 'money', places: decimalsOf(amount), before: '' }),
});

export const writtenDay = (day: string | null): Written =>
  day === null ? writtenText('') : writtenCell({ kind: 'day', day, text: '' });

/** '0.00"x"', '0.0 %', '#,##0', each with the words before it in quotes. */
export function figureFormat({
  unit,
  places,
  before,
}: Pick<FigureCell, 'unit' | 'places' | 'before'>): string {
  const decimals = places === 0 ? '' : `.${'0'.repeat(places)}`;
  const words = before === '' ? '' : `"${before.replaceAll('"', '')} "`;
  switch (unit) {
    case 'times':
      return `${words}0${decimals}"x"`;
    case 'share':
      return `${words}0${decimals} %`;
    case 'money':
      return `${words}#,##0${decimals}`;
    case 'points':
    case 'count':
      return `${words}0${decimals}`;
  }
}

const decimalsOf = (amount: string): number => amount.split('.')[1]?.length ?? 0;

/** Line breaks and tabs stay; other controls are not allowed in the file's XML. */
const withoutControls = (text: string): string =>
  text
    .replaceAll(/[^\P{C}\n\t]/gu, '')
    .replaceAll('\uFFFE', '')
    .replaceAll('\uFFFF', '');

export function put(cell: ExcelJS.Cell, { value, numFmt }: Written, style: Partial<ExcelJS.Style>): void {
  cell.value = value;
  cell.style = { ...style, numFmt };
}
