/** How the workbook looks: ink on white, ruled like the product's own sheets, one warning colour. */
import type ExcelJS from 'exceljs';

const INK = 'FF12283C';
const INK_SECOND = 'FF4C5D6C';
const HAIR = 'FFCFC6AD';
const MAGENTA = 'FFA2145F';
const LAND = 'FFEBDDB4';

const FAMILY = 'Arial';
export const BODY_POINTS = 9;

const font = (size: number, more: Partial<ExcelJS.Font> = {}): Partial<ExcelJS.Font> => ({
  name: FAMILY,
  family: 2,
  size,
  color: { argb: INK },
  ...more,
});

const second = { color: { argb: INK_SECOND } };

export const FONTS = {
  title: font(15, { bold: true }),
  draft: font(15, { bold: true, color: { argb: MAGENTA } }),
  section: font(11, { bold: true }),
  body: font(BODY_POINTS),
  name: font(BODY_POINTS, { bold: true }),
  second: font(BODY_POINTS, second),
  warned: font(BODY_POINTS, { bold: true, color: { argb: MAGENTA } }),
  caution: font(BODY_POINTS, { italic: true, ...second }),
} as const;

const line = (argb: string, style: ExcelJS.BorderStyle): Partial<ExcelJS.Border> => ({
  style,
  color: { argb },
});

export const BORDERS = {
  section: { top: line(INK, 'thin') },
  head: { bottom: line(INK, 'thin') },
  row: { bottom: line(HAIR, 'hair') },
  caution: { left: line(LAND, 'thick') },
} as const satisfies Record<string, Partial<ExcelJS.Borders>>;
