/** Ways in which borrowers' files are messy, and what is done with each. */
import { afterAll, describe, expect, test } from 'vitest';
import type { Typed } from '../../../../tests/support/gridWorkbook.ts';
import { balance, figures, income, kinds, read, type Change } from './messyFiles.fixture.ts';
import { readingPool } from './readWorkbook.ts';

afterAll(() => readingPool().close());

describe('layout', () => {
  test('three statements below one another are told apart by their headings', async () => {
    const reading = await read({
      Accounts: [
        ['in thousands of US dollars'],
        ['Income statement', 'Nine months ended September 30, 2026'],
        ['Net sales', 70200],
        ['Cost of goods sold', 44500],
        ['Gross profit', 25700],
        [],
        ['Balance sheet', 'September 30, 2026'],
        ['Cash and cash equivalents', 5100],
        ['Accounts receivable, net', 12900],
        ['Total current assets', 18000],
        ['Other assets', 2000],
        ['Total assets', 20000],
        ['Current portion of long-term debt', 2000],
        ['Total current liabilities', 2000],
        ['Deferred income taxes', 1000],
        ['Total liabilities', 3000],
        ["Total shareholders' equity", 17000],
        [],
        ['Cash flow statement', 'Nine months ended September 30, 2026'],
        ['Net cash provided by operating activities', 7800],
        ['Capital expenditures', -2600],
      ],
    });
    expect(reading.outcome).toBe('ready');
    expect(figures(reading)).toMatchObject({
      'revenue 2026-09-30 9': '70200000',
      'cash 2026-09-30 0': '5100000',
      'other_non_current_assets 2026-09-30 0': '2000000',
      'short_term_debt 2026-09-30 0': '2000000',
      'deferred_tax_liability 2026-09-30 0': '1000000',
      'capex 2026-09-30 9': '-2600000',
    });
  });

  test('assets and liabilities side by side are two tables of one balance sheet', async () => {
    const reading = await read({
      Bilanz: [
        ['Bilanz zum 31.12.2025 in TEUR'],
        ['Aktiva', '31.12.2025', null, 'Passiva', '31.12.2025'],
        ['Sachanlagen', 4200, null, 'Gezeichnetes Kapital', 500],
        ['Vorräte', 1500, null, 'Gewinnvortrag', 2700],
        ['Forderungen aus Lieferungen und Leistungen', 1800, null, 'Summe Eigenkapital', 3200],
        ['Kassenbestand', 400, null, 'Verbindlichkeiten aus Lieferungen und Leistungen', 4700],
        ['Summe Aktiva', 7900, null, 'Summe Passiva', 7900],
      ],
    });
    expect(figures(reading)).toMatchObject({
      'total_assets 2025-12-31 0': '7900000',
      'equity 2025-12-31 0': '3200000',
      'payables 2025-12-31 0': '4700000',
    });
    expect(reading.checks).toContainEqual(expect.objectContaining({ code: 'balance', outcome: 'ties' }));
  });

  test('entities beside one another are asked about and never added', async () => {
    const sheets = {
      'P&L': [
        ['EUR thousand'],
        [null, 'Holding AG', null, 'Group', null],
        [null, 'Q3 2026', 'Q3 2025', 'Q3 2026', 'Q3 2025'],
        ['Revenue', 100, 90, 1000, 940],
        ['Cost of sales', 60, 55, 600, 560],
        ['Gross profit', 40, 35, 400, 380],
      ],
    };
    const asked = await read(sheets);
    expect([kinds(asked), asked.facts]).toEqual([['entity'], []]);
    const answered = await read(sheets, { answers: { entity: 'Group' } });
    expect(figures(answered)).toMatchObject({
      'revenue 2026-09-30 3': '1000000',
      'revenue 2025-09-30 3': '940000',
    });
  });

  test('a total of split revenue is taken and its parts are not added to it', async () => {
    const rows: Typed[][] = [
      ['EUR thousand'],
      [null, 'Q3 2026', 'Q3 2025'],
      ['Revenue - home', 600, 580],
      ['Revenue - export', 400, 360],
      ['Total revenue', 1000, 940],
      ['Materials', 400, 380],
      ['Wages and salaries', 200, 190],
      ['Social security costs', 50, 48],
      ['Total operating expenses', 650, 618],
      ['Operating profit', 350, 322],
    ];
    const reading = await read({ 'P&L': rows });
    expect(figures(reading)).toMatchObject({
      'revenue 2026-09-30 3': '1000000',
      'staff_costs 2026-09-30 3': '200000+50000',
    });
    expect(reading.outcome).toBe('ready');
  });

  test('a total that stands above its parts is taken once', async () => {
    const reading = await read({
      BS: [
        ['EUR thousand'],
        [null, '31 Dec 2025'],
        ['Inventories', 500],
        ['  Raw materials', 200],
        ['  Finished goods', 300],
        ['Trade receivables', 400],
        ['of which overdue', 50],
        ['Total assets', 900],
      ],
    });
    expect(figures(reading)).toMatchObject({
      'inventory 2025-12-31 0': '500000',
      'receivables 2025-12-31 0': '400000',
    });
  });

  test('note numbers and shares of sales between the periods are left out', async () => {
    const reading = await read({
      'P&L': [
        ['Quarterly income statement, EUR thousand'],
        [null, 'Note', new Date('2026-09-30'), '% of sales', new Date('2025-09-30'), '% of sales'],
        ['Revenue', 3, 1000, 1, 940, 1],
        ['Cost of sales', 4, 600, 0.6, 560, 0.6],
        ['Gross profit', null, 400, 0.4, 380, 0.4],
      ],
    });
    expect(figures(reading)).toEqual({
      'revenue 2026-09-30 3': '1000000',
      'revenue 2025-09-30 3': '940000',
      'cogs 2026-09-30 3': '600000',
      'cogs 2025-09-30 3': '560000',
      'gross_profit 2026-09-30 3': '400000',
      'gross_profit 2025-09-30 3': '380000',
    });
  });

  test('hidden rows that carry amounts are asked about', async () => {
    const hide: Change = (workbook) => {
      const row = workbook.getWorksheet('BS')?.getRow(3);
      if (row) row.hidden = true;
    };
    const asked = await read({ BS: balance(['30 Sep 2026'], [100]) }, {}, hide);
    expect(kinds(asked)).toEqual(['hidden-rows']);
    const left = await read(
      { BS: balance(['30 Sep 2026'], [100]) },
      { answers: { 'hidden-rows': 'leave' } },
      hide,
    );
    expect(Object.keys(figures(left))).not.toContain('cash 2026-09-30 0');
  });

  test('two sheets with different figures for one period are asked about', async () => {
    const sheets = { 'P&L': income(['Q3 2026'], [2000]), 'P&L old': income(['Q3 2026'], [1800]) };
    const asked = await read(sheets);
    expect([kinds(asked), asked.facts]).toEqual([['which-sheets'], []]);
    const key = asked.questions[0]?.key ?? '';
    expect(figures(await read(sheets, { answers: { [key]: 'P&L' } }))['revenue 2026-09-30 3']).toBe(
      '2000000',
    );
  });

  test('a summary that repeats the figures changes nothing', async () => {
    const summary: Typed[][] = [
      ['EUR thousand'],
      [null, 'Q3 2026'],
      ['Revenue', 2000],
      ['Operating profit', 400],
    ];
    const reading = await read({ Summary: summary, 'P&L': income(['Q3 2026'], [2000]) });
    expect([reading.outcome, figures(reading)['revenue 2026-09-30 3']]).toEqual(['ready', '2000000']);
  });
});
