/** Ways in which borrowers' files are messy, and what is done with each. */
import { afterAll, describe, expect, test } from 'vitest';
import { balance, codes, figures, income, kinds, read } from './messyFiles.fixture.ts';
import { readingPool } from './readWorkbook.ts';

afterAll(() => readingPool().close());

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
