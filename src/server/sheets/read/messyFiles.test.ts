/** Ways in which borrowers' files are messy, and what is done with each. Common practice, no source. */
import { afterAll, describe, expect, test } from 'vitest';
import type { Reading, ReadingContext } from '#core/statements/workbookReading.ts';
import { gridWorkbook, type Typed, type TypedSheets } from '../../../../tests/support/gridWorkbook.ts';
import { readingPool, readWorkbook } from './readWorkbook.ts';

const NOTHING_KNOWN: ReadingContext = {
  fiscalYearEndMonth: null,
  reportingCurrency: null,
  answers: {},
  lastQuarterRevenue: null,
};
type Change = Parameters<typeof gridWorkbook>[1];

const read = async (
  sheets: TypedSheets,
  context: Partial<ReadingContext> = {},
  change?: Change,
): Promise<Reading> =>
  readWorkbook(await gridWorkbook(sheets, change), 'sent.xlsx', { ...NOTHING_KNOWN, ...context });

/** 'revenue 2026-09-30 3' → amount; parts of one line are added with a plus. */
const figures = (reading: Reading): Record<string, string> => {
  const found: Record<string, string> = {};
  for (const { code, periodEnd, months, amount } of reading.facts) {
    const key = `${code} ${periodEnd} ${months}`;
    found[key] = found[key] === undefined ? amount : `${found[key]}+${amount}`;
  }
  return found;
};
const kinds = ({ questions }: Reading) =>
  questions.filter(({ answer }) => answer === null).map(({ kind }) => kind);
const codes = ({ notes }: Reading) => notes.map(({ code }) => code);

/** Revenue, 60 % cost of sales, 20 % administration. */
const income = (
  headings: readonly Typed[],
  revenue: readonly number[],
  unit: Typed = 'EUR thousand',
): Typed[][] => [
  [unit],
  [null, ...headings],
  ['Revenue', ...revenue],
  ['Cost of sales', ...revenue.map((amount) => amount * 0.6)],
  ['Gross profit', ...revenue.map((amount) => amount * 0.4)],
  ['Administrative expenses', ...revenue.map((amount) => amount * 0.2)],
  ['Operating profit', ...revenue.map((amount) => amount * 0.2)],
];
const balance = (
  headings: readonly Typed[],
  cash: readonly number[],
  unit: Typed = 'EUR thousand',
): Typed[][] => [
  [unit],
  [null, ...headings],
  ['Cash', ...cash],
  ['Trade receivables', ...cash.map((amount) => amount * 2)],
  ['Total current assets', ...cash.map((amount) => amount * 3)],
  ['Property, plant and equipment', ...cash.map((amount) => amount * 5)],
  ['Total assets', ...cash.map((amount) => amount * 8)],
  ['Trade payables', ...cash.map((amount) => amount * 3)],
  ['Total liabilities', ...cash.map((amount) => amount * 3)],
  ['Total equity', ...cash.map((amount) => amount * 5)],
  ['Total equity and liabilities', ...cash.map((amount) => amount * 8)],
];

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
    const reading = await readWorkbook(Buffer.from(text, 'latin1'), 'export.csv', { ...NOTHING_KNOWN });
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

describe('periods and meaning', () => {
  test('a financial year is asked for, unless the balance sheet dates prove it', async () => {
    const asked = await read({ 'P&L': income(['FY26', 'FY25'], [2000, 1900]) });
    expect([kinds(asked), asked.facts]).toEqual([['year-end'], []]);
    const named = await read({ 'P&L': income(['FY26'], [2000]) }, { answers: { 'year-end': '03-31' } });
    expect(figures(named)).toHaveProperty(['revenue 2026-03-31 12']);
    const begun = await read(
      { 'P&L': income(['FY26'], [2000]) },
      { answers: { 'year-end': '03-31:starts' } },
    );
    expect(figures(begun)).toHaveProperty(['revenue 2027-03-31 12']);
    const proven = await read({
      'P&L': income(['FY26', 'FY25'], [2000, 1900]),
      BS: balance(['31 March 2026', '31 March 2025'], [100, 90]),
    });
    expect(figures(proven)).toHaveProperty(['revenue 2026-03-31 12']);
  });

  test("'Q3 2026' of a borrower whose year ends in March is asked about", async () => {
    const asked = await read({ 'P&L': income(['Q3 2026'], [2000]) }, { fiscalYearEndMonth: 3 });
    expect([kinds(asked), asked.facts]).toEqual([['year-end'], []]);
    const answers = { 'year-end': '03-31:calendar' };
    const calendar = await read({ 'P&L': income(['Q3 2026'], [2000]) }, { fiscalYearEndMonth: 3, answers });
    expect(figures(calendar)).toHaveProperty(['revenue 2026-09-30 3']);
    const proven = await read(
      { 'P&L': income(['Q3 2026'], [2000]), BS: balance(['30 Sep 2026'], [100]) },
      { fiscalYearEndMonth: 3 },
    );
    expect(figures(proven)).toHaveProperty(['revenue 2026-09-30 3']);
  });

  test('months and a year to date are asked about apart, and never taken for one another', async () => {
    const reading = await read({
      'P&L': income(['Jul-26', 'Aug-26', 'Sep-26', 'YTD Sep-26'], [100, 110, 120, 990]),
    });
    expect([kinds(reading), reading.facts]).toEqual([['period-length', 'period-length'], []]);
  });

  test('thirteen weeks are a quarter that ends on its own last day', async () => {
    const reading = await read({ 'P&L': income(['13 weeks ended 27 Sep 2026'], [2000]) });
    expect(reading.facts[0]).toMatchObject({ periodStart: '2026-06-29', periodEnd: '2026-09-27', months: 3 });
    expect(codes(reading)).toContain('week-year');
  });

  test('two versions of one year are asked about', async () => {
    const sheets = {
      'P&L': income(['Year ended 31 December 2025', 'FY24 restated', 'FY24'], [2000, 1900, 1950]),
    };
    const asked = await read(sheets);
    expect(kinds(asked)).toEqual(['restated']);
    expect(Object.keys(figures(asked))).not.toContain('revenue 2024-12-31 12');
    const key = asked.questions[0]?.key ?? '';
    expect(figures(await read(sheets, { answers: { [key]: 'new' } }))['revenue 2024-12-31 12']).toBe(
      '1900000',
    );
  });

  test('a sheet called budget is no actual', async () => {
    const reading = await read({
      'P&L': income(['Q3 2026'], [2000]),
      'P&L Budget': income(['Q3 2026'], [2500]),
    });
    expect([reading.outcome, figures(reading)['revenue 2026-09-30 3']]).toEqual(['ready', '2000000']);
    expect(codes(reading)).toContain('scenario-columns');
  });

  test('a date that can be read as two days is asked about', async () => {
    const asked = await read({ BS: balance(['03/04/2026'], [100]) });
    expect([kinds(asked), asked.facts]).toEqual([['date-order'], []]);
    const american = await read({ BS: balance(['03/04/2026'], [100]) }, { answers: { 'date-order': 'mdy' } });
    expect(figures(american)).toHaveProperty(['cash 2026-03-04 0']);
    expect(figures(await read({ BS: balance(['03/04/2026', '30/09/2025'], [100, 90]) }))).toHaveProperty([
      'cash 2026-04-03 0',
    ]);
  });

  test('a sheet with personal data is neither read nor shown', async () => {
    const reading = await read({
      'P&L': income(['Q3 2026'], [2000]),
      'Payroll Sept': [
        ['Name', 'IBAN', 'Salary'],
        ['A. Example', 'DE89370400440532013000', 3000],
      ],
    });
    expect(codes(reading)).toContain('personal-data-not-read');
    expect(reading.sheets.map(({ name }) => name)).toEqual(['P&L']);
    expect(JSON.stringify(reading)).not.toContain('DE89370400440532013000');
  });

  test('a file of many borrowers keeps them apart, and gives one where one is asked for', async () => {
    const sheets = {
      Data: [
        [
          'Borrower',
          'Period end',
          'Months',
          'Currency',
          'Unit',
          'Revenue',
          'Net income',
          'Cash',
          'Total assets',
        ],
        ['Alder Works Ltd', new Date('2026-09-30'), 3, 'EUR', 'thousand', 100, 10, 5, 80],
        ['Birch Mills BV', new Date('2026-09-30'), 3, 'EUR', 'thousand', 200, 20, 15, 180],
      ],
    };
    const all = await read(sheets);
    expect(all.facts.map(({ borrower, code, amount }) => [borrower, code, amount])).toContainEqual([
      'Birch Mills BV',
      'revenue',
      '200000',
    ]);
    const one = await read(sheets, { borrowerName: 'Alder Works Ltd' });
    expect(new Set(one.facts.map(({ borrower }) => borrower))).toEqual(new Set(['Alder Works Ltd']));
    const none = await read(sheets, { borrowerName: 'Cedar Ltd' });
    expect([kinds(none), none.facts]).toEqual([['entity'], []]);
  });
});
