import ExcelJS from 'exceljs';
import { beforeAll, describe, expect, test } from 'vitest';
import { CAUTIONS } from '../../../core/cautions.ts';
import { REVIEW_SECTIONS, type ReviewSheet, type SheetCell } from '../../../core/reviewSheet.ts';
import { buildMaterial, buildSignal } from '../../services/reviewSheet/material.fixture.ts';
import { reviewSheet } from '../../services/reviewSheet/reviewSheet.ts';
import { figureFormat } from './cellValue.ts';
import { writeReviewSheet } from './reviewSheet.ts';

async function readBack(
  sheet: ReviewSheet,
): Promise<{ review: ExcelJS.Worksheet; sources: ExcelJS.Worksheet }> {
  const workbook = new ExcelJS.Workbook();
  const bytes = await writeReviewSheet(sheet);
  await workbook.xlsx.load(new Uint8Array(bytes).buffer);
  const [review, sources] = ['Review', 'Sources'].map((name) => workbook.getWorksheet(name));
  if (!review || !sources) throw new Error('a sheet of the workbook is missing');
  return { review, sources };
}

/** Every cell that holds something, joined ones once. */
function cellsOf(worksheet: ExcelJS.Worksheet): ExcelJS.Cell[] {
  const cells: ExcelJS.Cell[] = [];
  worksheet.eachRow((row) =>
    row.eachCell((cell) => {
      if (cell.value !== null && (!cell.isMerged || cell.master === cell)) cells.push(cell);
    }),
  );
  return cells;
}

const textsOf = (worksheet: ExcelJS.Worksheet): string[] =>
  cellsOf(worksheet).flatMap(({ value }) => (typeof value === 'string' ? [value] : []));

const sheet = reviewSheet(
  buildMaterial({ view: { isListed: true, name: 'Bell & Fathom 3M' }, signals: [buildSignal()] }),
);
let review: ExcelJS.Worksheet;
let sources: ExcelJS.Worksheet;

beforeAll(async () => {
  ({ review, sources } = await readBack(sheet));
});

test('every section heading stands in order, "not recorded" beside those that nobody has written', () => {
  const headings = cellsOf(review).filter(({ value }) => typeof value === 'string' && /^\d+ {2}/.test(value));
  expect(headings.map(({ value }) => value)).toEqual(
    REVIEW_SECTIONS.map((title, place) => `${place + 1}  ${title}`),
  );
  const beside = headings.map(({ row }) =>
    cellsOf(review)
      .filter((cell) => cell.row === row)
      .map(({ value }) => value),
  );
  expect(beside.map((values) => values.includes('not recorded'))).toEqual(
    sheet.sections.map(({ isRecorded }) => !isRecorded),
  );
});

test.each(CAUTIONS)('the caution stands on it: %s', (caution) => {
  expect(textsOf(review)).toContain(caution);
});

test('DRAFT, the data cut-off and the private-side mark stand on the sheet and on every printed page', () => {
  expect(textsOf(review)).toContain('DRAFT');
  for (const worksheet of [review, sources]) {
    expect(worksheet.headerFooter.oddFooter).toBe(
      '&L&8DRAFT, data cut-off 16 Mar 2026, 01:30 UTC, method 1.0, policy 1, input version 3&C&8Bell && Fathom 3M (private side)&R&8Page &P of &N',
    );
  }
  expect(textsOf(review).some((text) => text.includes('Private side'))).toBe(true);
});

test('it prints across A4, as wide as the paper, with its head on every page and frozen on the screen', () => {
  for (const [worksheet, rows] of [
    [review, 2],
    [sources, 3],
  ] as const) {
    expect(worksheet.pageSetup).toMatchObject({
      paperSize: 9,
      orientation: 'landscape',
      fitToPage: true,
      fitToWidth: 1,
      fitToHeight: 0,
      printTitlesRow: `1:${rows}`,
    });
    expect(worksheet.views[0]).toMatchObject({ state: 'frozen', ySplit: rows });
  }
});

test('every figure of the sheet is a number in a cell, to the last digit that a double holds', () => {
  const figures = sheet.sections.flatMap(({ blocks }) =>
    blocks.flatMap((block): readonly SheetCell[] => {
      if (block.kind === 'facts') return block.facts.map(({ value }) => value);
      return block.kind === 'table' ? block.rows.flat() : [];
    }),
  );
  const wanted = figures.flatMap((cell) =>
    cell.kind === 'figure' ? [[Number(cell.value), figureFormat(cell)] as const] : [],
  );
  const found = cellsOf(review).flatMap(({ value, numFmt }) =>
    typeof value === 'number' ? [[value, numFmt] as const] : [],
  );
  expect(wanted.length).toBeGreaterThan(30);
  expect(found).toEqual(wanted);
  const leverage = found.find(([value]) => value > 3.5 && value < 3.501);
  // 36.754 / 10.5 worked by hand: the period 380952 repeats.
  expect(leverage).toEqual([Number('3.500380952380952380952380952380952'), '0.0000"x"']);
});

test('days are dates', () => {
  const days = cellsOf(review).filter(({ value }) => value instanceof Date);
  expect(days.map(({ value }) => (value as Date).toISOString())).toContain('2025-12-31T00:00:00.000Z');
  expect(new Set(days.map(({ numFmt }) => numFmt))).toEqual(new Set(['yyyy-mm-dd']));
});

test('the sheet of sources names line, period end, amount, file, hash, sheet and cell', () => {
  const head = sources.getRow(3).values as unknown[];
  const row = cellsOf(sources).find(({ value }) => value === 'Current assets')?.row;
  const record = Object.fromEntries(
    head.slice(1).map((label, place) => [String(label), sources.getCell(Number(row), place + 1).value]),
  );
  expect(record).toMatchObject({
    'Used in': 'Current ratio',
    'Period end': new Date('2025-12-31T00:00:00Z'),
    Amount: 30,
    File: 'Figures 2025.xlsx',
    'SHA-256 of the file': 'a'.repeat(64),
    Sheet: "P&L '25",
    Cell: 'E4',
  });
  expect(sources.autoFilter).toBeTruthy();
});

describe('text that looks like a formula', () => {
  test.each(['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', '=HYPERLINK("http://x.example")'])(
    'stays the text that it is: %j',
    async (name) => {
      const hostile = reviewSheet(
        buildMaterial({
          view: { name, managerName: name, sectorLabel: name },
          fileName: name,
          signals: [buildSignal({ isOpen: 0, closedAt: new Date(0), closedBy: name, closingText: name })],
        }),
      );
      const written = await readBack(hostile);
      const all = [...cellsOf(written.review), ...cellsOf(written.sources)];
      expect(all.filter(({ value }) => value === name).length).toBeGreaterThan(4);
      for (const cell of all) {
        expect(cell.formula, cell.address).toBeUndefined();
        expect(cell.hyperlink, cell.address).toBeUndefined();
        if (typeof cell.value === 'string') expect(cell.numFmt, cell.address).toBe('@');
      }
    },
  );

  test('a control character is left out and does not spoil the file', async () => {
    const written = await readBack(
      reviewSheet(buildMaterial({ view: { name: 'Bell\u0000\u0007 Works\uFFFF' } })),
    );
    expect(textsOf(written.review)).toContain('Review sheet: Bell Works');
  });
});

test('formats say as many digits as the page and keep the words before the figure', () => {
  expect(figureFormat({ unit: 'times', places: 2, before: 'at most' })).toBe('"at most "0.00"x"');
  expect(figureFormat({ unit: 'share', places: 1, before: '' })).toBe('0.0 %');
  expect(figureFormat({ unit: 'money', places: 0, before: '' })).toBe('#,##0');
  expect(figureFormat({ unit: 'points', places: 0, before: 'a"b' })).toBe('"ab "0');
});
