/** Ways in which borrowers' files are messy, and what is done with each. */
import { afterAll, describe, expect, test } from 'vitest';
import type { Typed } from '../../../../tests/support/gridWorkbook.ts';
import { NOTHING_KNOWN, balance, codes, figures, income, kinds, read } from './messyFiles.fixture.ts';
import { readingPool, readWorkbook } from './readWorkbook.ts';

afterAll(() => readingPool().close());

describe('numbers', () => {
  test('a column out of scale with its neighbours is asked about before it is taken', async () => {
    const sheets = { 'P&L': income(['Q1 2026', 'Q2 2026', 'Q3 2026'], [2000, 2100, 2_150_000]) };
    const asked = await read(sheets);
    expect(kinds(asked)).toEqual(['scale-jump']);
    const waiting = asked.facts.filter(({ waitsFor }) => waitsFor.length > 0);
    expect(new Set(waiting.map(({ periodEnd }) => periodEnd))).toEqual(new Set(['2026-09-30']));
    const answered = await read(sheets, { answers: { 'scale-jump:P&L:D': '0.001' } });
    expect(figures(answered)['revenue 2026-09-30 3']).toBe('2150000');
  });

  test('a file a hundred times off the figures on file is asked about', async () => {
    const sheets = { 'P&L': income(['Q3 2026'], [2000]) };
    expect(kinds(await read(sheets, { lastQuarterRevenue: '1990000' }))).toEqual([]);
    expect(kinds(await read(sheets, { lastQuarterRevenue: '1990000000' }))).toEqual(['scale-jump']);
  });

  test('sheets in different units are each read in their own', async () => {
    const reading = await read({
      'P&L': income(['Q3 2026'], [2000]),
      BS: balance(['30 Sep 2026'], [900_000], 'in EUR'),
    });
    expect(figures(reading)).toMatchObject({
      'revenue 2026-09-30 3': '2000000',
      'cash 2026-09-30 0': '900000',
    });
    expect(codes(reading)).toContain('mixed-scale');
  });

  test('a format that shows thousands of what the cell stores is not applied twice', async () => {
    const reading = await read({ 'P&L': income(['Q3 2026'], [2_000_000]) }, {}, (workbook) => {
      workbook.worksheets[0]?.eachRow((row) =>
        row.eachCell((cell) => Object.assign(cell, { numFmt: '#,##0,' })),
      );
    });
    expect(figures(reading)['revenue 2026-09-30 3']).toBe('2000000');
  });

  test('liabilities as negative figures are turned as a block', async () => {
    const reading = await read({
      BS: [
        ['EUR thousand'],
        [null, '30 Sep 2026'],
        ['Tangible assets', 500],
        ['Stock', 200],
        ['Cash', 100],
        ['Total assets', 800],
        ['Trade payables', -200],
        ['Bank overdraft', -50],
        ['Total liabilities', -250],
        ['Retained earnings', -550],
        ['Total equity', -550],
        ['Total equity and liabilities', -800],
      ],
    });
    expect(figures(reading)).toMatchObject({
      'payables 2026-09-30 0': '200000',
      'equity 2026-09-30 0': '550000',
    });
    expect(reading.checks).toContainEqual(expect.objectContaining({ code: 'balance', outcome: 'ties' }));
  });

  test('a text file in German notation is read by its own evidence', async () => {
    const text =
      'Gewinn- und Verlustrechnung;;\nTEUR;9M 2026;9M 2025\nUmsatzerlöse;1.234,5;1.100,0\nMaterialaufwand;-700,5;-650,0\nRohergebnis;534,0;450,0\n';
    const reading = await readWorkbook(Buffer.from(text, 'latin1'), 'export.csv', NOTHING_KNOWN);
    expect(figures(reading)).toMatchObject({
      'revenue 2026-09-30 9': '1234500',
      'cogs 2026-09-30 9': '700500',
    });
  });

  test('a blank is missing, a dash is zero', async () => {
    const reading = await read({
      'P&L': [
        ['EUR thousand'],
        [null, 'Q3 2026', 'Q3 2025'],
        ['Revenue', 100, 90],
        ['Other operating income', '-', null],
        ['Administrative expenses', 60, 'n/a'],
      ],
    });
    const found = figures(reading);
    expect(found['other_operating_income 2026-09-30 3']).toBe('0');
    expect(Object.keys(found)).not.toContain('other_operating_income 2025-09-30 3');
    expect(Object.keys(found)).not.toContain('sga 2025-09-30 3');
  });

  test('an error in a ratio that is not needed is a note', async () => {
    const rows: Typed[][] = [...income(['Q3 2026'], [2000]), ['EBITDA margin', { error: '#DIV/0!' }]];
    const reading = await read({ 'P&L': rows });
    expect([reading.outcome, codes(reading)]).toEqual(['ready', expect.arrayContaining(['errors-ignored'])]);
  });

  test('a misspelt label is taken only with the sign that its total proves', async () => {
    const rows = income(['Q3 2026', 'Q3 2025'], [2000, 1900]).map(([label = null, ...amounts]): Typed[] => [
      label === 'Administrative expenses' ? 'Administrtive expenses' : label,
      ...amounts,
    ]);
    expect(figures(await read({ 'P&L': rows }))['sga 2026-09-30 3']).toBe('400000');
  });
});
