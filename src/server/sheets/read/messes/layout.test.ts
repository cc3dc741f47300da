import { describe, expect } from 'vitest';
import type { Typed } from '../../../../../tests/support/gridWorkbook.ts';
import {
  amount,
  balance,
  bothWays,
  codes,
  figures,
  income,
  kinds,
  mess,
  readSheets,
  readText,
  taken,
  type Change,
} from './messes.fixture.ts';

const merge =
  (sheet: string, ...ranges: string[]): Change =>
  (workbook) => {
    for (const range of ranges) workbook.getWorksheet(sheet)?.mergeCells(range);
  };

describe('layout', () => {
  mess(15, 'headings are found by content, below titles and blank rows', async () => {
    const rows: Typed[][] = [
      ['Quellmoor Fittings Ltd'],
      [],
      ['Prepared by finance on 14.10.2026'],
      ['Management accounts'],
      [],
      ['All amounts in EUR thousand'],
      [],
      [null, 'Q3 2026', 'Q3 2025'],
      [],
      ['Revenue', 2000, 1900],
      ['Cost of sales', 1200, 1140],
      ['Gross profit', 800, 760],
    ];
    await bothWays(rows, (reading) => {
      expect(reading.outcome).toBe('ready');
      expect(figures(reading)).toEqual({
        'revenue 2026-09-30 3': '2000000',
        'revenue 2025-09-30 3': '1900000',
        'cogs 2026-09-30 3': '1200000',
        'cogs 2025-09-30 3': '1140000',
        'gross_profit 2026-09-30 3': '800000',
        'gross_profit 2025-09-30 3': '760000',
      });
    });
  });

  mess(16, 'a merged heading holds for its span, over two and three levels', async () => {
    const reading = await readSheets(
      {
        PnL: [
          ['EUR thousand'],
          [null, 'Group', null, null, null],
          [null, 'Actual', null, 'Budget', null],
          [null, 'Q3 2026', 'Q3 2025', 'Q3 2026', 'Q3 2025'],
          ['Revenue', 2000, 1900, 2100, 1950],
          ['Cost of sales', 1200, 1140, 1250, 1170],
          ['Gross profit', 800, 760, 850, 780],
        ],
      },
      {},
      merge('PnL', 'B2:E2', 'B3:C3', 'D3:E3'),
    );
    expect(figures(reading)).toMatchObject({
      'revenue 2026-09-30 3': '2000000',
      'revenue 2025-09-30 3': '1900000',
    });
    expect(reading.facts).toHaveLength(6);
    expect(codes(reading)).toContain('scenario-columns');
    const years = await readSheets(
      {
        PnL: [
          ['EUR thousand'],
          [null, '2026', null, '2025', null],
          [null, 'Q2', 'Q3', 'Q2', 'Q3'],
          ['Revenue', 1990, 2000, 1890, 1900],
          ['Cost of sales', 1190, 1200, 1130, 1140],
          ['Gross profit', 800, 800, 760, 760],
        ],
      },
      {},
      merge('PnL', 'B2:C2', 'D2:E2'),
    );
    expect(figures(years)).toMatchObject({
      'revenue 2026-06-30 3': '1990000',
      'revenue 2026-09-30 3': '2000000',
      'revenue 2025-06-30 3': '1890000',
      'revenue 2025-09-30 3': '1900000',
    });
  });

  mess(17, 'periods down the rows are read like periods across', async () => {
    const rows: Typed[][] = [
      ['EUR thousand'],
      ['Period', 'Revenue', 'Cost of sales', 'Gross profit', 'Administrative expenses', 'Operating profit'],
      ['Q2 2026', 1990, 1190, 800, 400, 400],
      ['Q3 2026', 2000, 1200, 800, 410, 390],
      ['Q4 2026', 2010, 1210, 800, 420, 380],
    ];
    await bothWays(rows, (reading) => {
      expect(figures(reading)).toMatchObject({
        'revenue 2026-06-30 3': '1990000',
        'revenue 2026-12-31 3': '2010000',
        'sga 2026-09-30 3': '410000',
      });
      expect(reading.facts).toHaveLength(15);
    });
  });

  mess(18, 'columns go by their dates, in whatever order they stand', async () => {
    await bothWays(income(['Q1 2026', 'Q3 2026', 'Q4 2025', 'Q2 2026'], [100, 300, 400, 200]), (reading) => {
      expect(figures(reading)).toMatchObject({
        'revenue 2026-03-31 3': '100000',
        'revenue 2026-09-30 3': '300000',
        'revenue 2025-12-31 3': '400000',
        'revenue 2026-06-30 3': '200000',
      });
    });
  });

  mess(19, 'three statements on one sheet are parted by their headings', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', 'Q3 2026'],
      ['Income statement'],
      ['Revenue', 2000],
      ['Cost of sales', 1200],
      ['Gross profit', 800],
      ['Overheads', 500],
      ['Operating profit', 300],
      ['Interest payable', 40],
      ['Profit before tax', 260],
      ['Tax', 60],
      ['Profit after tax', 200],
      [],
      ['Balance sheet'],
      ['Cash', 350],
      ['Trade debtors', 900],
      ['Current assets', 1250],
      ['Fixed assets', 2000],
      ['Total assets', 3250],
      ['Trade creditors', 700],
      ['Creditors due within one year', 700],
      ['Term loan', 1200],
      ['Total liabilities', 1900],
      ["Shareholders' funds", 1350],
      [],
      ['Cash flow'],
      ['Operating cash flow', 260],
      ['Capital expenditure', -90],
      ['Loan repayments', -50],
      ['Net change in cash', 120],
      ['Opening cash', 230],
      ['Closing cash', 350],
    ];
    await bothWays(rows, (reading) => {
      expect(reading.outcome).toBe('ready');
      expect(figures(reading)).toMatchObject({
        'income_tax 2026-09-30 3': '60000',
        'net_income 2026-09-30 3': '200000',
        'cash 2026-09-30 0': '350000',
        'senior_debt 2026-09-30 0': '1200000',
        'equity 2026-09-30 0': '1350000',
        'cfo 2026-09-30 3': '260000',
        'capex 2026-09-30 3': '-90000',
        'debt_repaid 2026-09-30 3': '-50000',
      });
    });
  });

  mess(20, 'tables side by side are taken apart, with the notes column between', async () => {
    const rows: Typed[][] = [
      ['EUR thousand'],
      [
        'Assets',
        'Note',
        '30.09.2026',
        '31.12.2025',
        null,
        'Equity and liabilities',
        'Note',
        '30.09.2026',
        '31.12.2025',
      ],
      ['Fixed assets', 7, 2000, 2050, null, 'Equity', 11, 1300, 1200],
      ['Inventories', 8, 600, 580, null, 'Bank loans due after one year', 12, 1100, 1200],
      ['Trade receivables', 9, 900, 880, null, 'Trade payables', 13, 800, 810],
      ['Cash', 10, 350, 340, null, 'Accruals', 14, 650, 640],
      ['Total assets', null, 3850, 3850, null, 'Total equity and liabilities', null, 3850, 3850],
    ];
    await bothWays(rows, (reading) => {
      expect(figures(reading)).toMatchObject({
        'inventory 2026-09-30 0': '600000',
        'inventory 2025-12-31 0': '580000',
        'senior_debt 2026-09-30 0': '1100000',
        'accrued_liabilities 2025-12-31 0': '640000',
        'total_assets 2025-12-31 0': '3850000',
      });
      expect(reading.checks).toContainEqual(expect.objectContaining({ code: 'balance', outcome: 'ties' }));
    });
  });

  mess(21, 'of two entities on one sheet one is chosen, and none is added', async () => {
    const beside: Typed[][] = [
      ['EUR thousand'],
      [null, 'Parent', 'Parent', 'Consolidated', 'Consolidated'],
      [null, 'Q3 2026', 'Q3 2025', 'Q3 2026', 'Q3 2025'],
      ['Revenue', 500, 480, 2000, 1900],
      ['Cost of sales', 300, 290, 1200, 1140],
      ['Gross profit', 200, 190, 800, 760],
    ];
    await bothWays(beside, (reading) => {
      expect([kinds(reading), taken(reading)]).toEqual([['entity'], []]);
    });
    const chosen = await readSheets({ PnL: beside }, { answers: { entity: 'Consolidated' } });
    expect(figures(chosen)['revenue 2026-09-30 3']).toBe('2000000');
    const below: Typed[][] = [
      ['EUR thousand'],
      ['Holding AG'],
      [null, 'Q3 2026'],
      ['Revenue', 500],
      ['Cost of sales', 300],
      ['Gross profit', 200],
      [],
      ['Werk GmbH'],
      [null, 'Q3 2026'],
      ['Revenue', 1600],
      ['Cost of sales', 1000],
      ['Gross profit', 600],
    ];
    await bothWays(below, (reading) => {
      expect([kinds(reading), taken(reading)]).toEqual([['entity'], []]);
    });
    const lower = await readSheets({ PnL: below }, { answers: { entity: 'Werk GmbH' } });
    expect(figures(lower)['revenue 2026-09-30 3']).toBe('1600000');
  });

  mess(22, 'eliminations are no entity; the consolidated column is one of the choices', async () => {
    const rows: Typed[][] = [
      ['Q3 2026, EUR thousand'],
      [null, 'Holding', 'Werk', 'Eliminations', 'Consolidated'],
      ['Revenue', 500, 1800, -300, 2000],
      ['Cost of sales', 300, 1200, -300, 1200],
      ['Gross profit', 200, 600, 0, 800],
    ];
    await bothWays(rows, (reading) => {
      expect([kinds(reading), taken(reading)]).toEqual([['entity'], []]);
      expect(reading.questions[0]?.options.map(({ value }) => value)).toEqual([
        'Holding',
        'Werk',
        'Consolidated',
      ]);
    });
    const chosen = await readSheets({ PnL: rows }, { answers: { entity: 'Consolidated' } });
    expect(figures(chosen)).toMatchObject({
      'revenue 2026-09-30 3': '2000000',
      'cogs 2026-09-30 3': '1200000',
    });
  });

  mess(23, 'a total that its parts do not give is read and marked', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', '30 Sep 2026'],
      ['Cash', 350],
      ['Trade receivables', 900],
      ['Inventories', 600],
      ['Total current assets', 1838],
      ['Property, plant and equipment', 2012],
      ['Total assets', 3850],
      ['Total liabilities', 2500],
      ['Total equity', 1350],
    ];
    await bothWays(rows, (reading) => {
      expect(reading.checks).toContainEqual(
        expect.objectContaining({ code: 'subtotal', outcome: 'warning', difference: '-12000' }),
      );
      expect(amount(reading, 'cash', '2026-09-30', 0)).toBe('350000');
    });
  });

  mess(24, 'a total that looks like a line is found by arithmetic and not counted again', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', 'Q3 2026', 'Q3 2025'],
      ['Sales north', 1200, 1100],
      ['Sales south', 800, 800],
      ['Sales', 2000, 1900],
      ['Materials', 900, 850],
      ['Wages', 400, 380],
      ['Rent', 100, 100],
      ['Costs of the business', 1400, 1330],
      ['Operating profit', 600, 570],
    ];
    await bothWays(rows, (reading) => {
      expect(figures(reading)).toEqual({
        'revenue 2026-09-30 3': '2000000',
        'revenue 2025-09-30 3': '1900000',
        'cogs 2026-09-30 3': '900000',
        'cogs 2025-09-30 3': '850000',
        'staff_costs 2026-09-30 3': '400000',
        'staff_costs 2025-09-30 3': '380000',
        'rent_expense 2026-09-30 3': '100000',
        'rent_expense 2025-09-30 3': '100000',
        'ebit 2026-09-30 3': '600000',
        'ebit 2025-09-30 3': '570000',
      });
      expect(kinds(reading)).toEqual([]);
    });
  });

  mess(25, 'rows set in below a total are its parts', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', '30 Sep 2026'],
      ['Assets'],
      ['Current assets', 1850],
      ['   Cash', 350],
      ['   Trade receivables', 900],
      ['   Inventories', 600],
      ['      Raw materials', 250],
      ['      Finished goods', 350],
      ['Fixed assets', 2000],
      ['Total assets', 3850],
    ];
    await bothWays(rows, (reading) => {
      expect(figures(reading)).toMatchObject({
        'cash 2026-09-30 0': '350000',
        'receivables 2026-09-30 0': '900000',
        'inventory 2026-09-30 0': '600000',
        'current_assets 2026-09-30 0': '1850000',
        'total_assets 2026-09-30 0': '3850000',
      });
      expect(kinds(reading)).toEqual([]);
    });
  });

  mess(26, 'labels that go on in the next column are joined, numbering left aside', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', null, null, 'Q3 2026', 'Q3 2025'],
      ['1.', 'Revenue', null, 2000, 1900],
      ['1.1', null, 'Cost of sales', 1200, 1140],
      ['2.', 'Gross profit', null, 800, 760],
      ['2.1.1', null, 'Administrative expenses', 400, 380],
      ['3.', 'Operating profit', null, 400, 380],
    ];
    await bothWays(rows, (reading) => {
      expect(figures(reading)).toMatchObject({
        'revenue 2026-09-30 3': '2000000',
        'cogs 2026-09-30 3': '1200000',
        'sga 2025-09-30 3': '380000',
        'ebit 2025-09-30 3': '380000',
      });
      expect(kinds(reading)).toEqual([]);
    });
    const accounts = await readSheets({
      PnL: [
        ['EUR thousand', null, 'Q3 2026'],
        [4000, 'Revenue', 2000],
        [5000, 'Cost of sales', 1200],
        [5999, 'Gross profit', 800],
      ],
    });
    expect(figures(accounts)).toEqual({
      'revenue 2026-09-30 3': '2000000',
      'cogs 2026-09-30 3': '1200000',
      'gross_profit 2026-09-30 3': '800000',
    });
  });

  mess(
    27,
    'abbreviated, misspelt and foreign labels are placed or asked about, two languages as well',
    async () => {
      const rows: Typed[][] = [
        ['EUR thousand', 'Q3 2026', 'Q3 2025'],
        ['Umsatzerlöse / Revenue', 2000, 1900],
        ['Herstellungskosten / Cost of sales', 1200, 1140],
        ['Bruttoergebnis / Gross profit', 800, 760],
        ['Admin. expnses', 400, 380],
        ['Betriebsergebnis / Operating profit', 400, 380],
      ];
      await bothWays(rows, (reading) => {
        expect(figures(reading)).toMatchObject({
          'revenue 2026-09-30 3': '2000000',
          'cogs 2026-09-30 3': '1200000',
          'ebit 2026-09-30 3': '400000',
        });
        const asked = kinds(reading);
        expect(asked.length === 0 ? amount(reading, 'sga', '2026-09-30', 3) : asked).toEqual(
          asked.length === 0 ? '400000' : ['placement'],
        );
      });
      const unknown = income(['Q3 2026'], [2000]).map((row) =>
        row[0] === 'Administrative expenses' ? ['Zorvath levy', 400] : row,
      );
      const reading = await readSheets({ PnL: unknown });
      expect(kinds(reading)).toEqual(['placement']);
      expect(amount(reading, 'sga', '2026-09-30', 3)).toBeUndefined();
      expect(reading.questions[0]?.answer).toBeNull();
    },
  );

  mess(28, 'one label in two sections means two lines', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', '30 Sep 2026'],
      ['Non-current assets'],
      ['Property, plant and equipment', 2000],
      ['Other', 50],
      ['Total', 2050],
      ['Current assets'],
      ['Trade receivables', 900],
      ['Other', 70],
      ['Cash', 330],
      ['Total', 1300],
      ['Total assets', 3350],
      ['Current liabilities'],
      ['Borrowings', 100],
      ['Other', 200],
      ['Total', 300],
      ['Non-current liabilities'],
      ['Borrowings', 1400],
      ['Other', 150],
      ['Total', 1550],
      ['Equity'],
      ['Share capital', 500],
      ['Retained earnings', 1000],
      ['Total', 1500],
      ['Total equity and liabilities', 3350],
    ];
    await bothWays(rows, (reading) => {
      expect(figures(reading)).toMatchObject({
        'other_non_current_assets 2026-09-30 0': '50000',
        'other_current_assets 2026-09-30 0': '70000',
        'current_assets 2026-09-30 0': '1300000',
        'short_term_debt 2026-09-30 0': '100000',
        'accrued_liabilities 2026-09-30 0': '200000',
        'senior_debt 2026-09-30 0': '1400000',
        'other_non_current_liabilities 2026-09-30 0': '150000',
        'equity 2026-09-30 0': '1500000',
      });
      expect(reading.checks).toContainEqual(expect.objectContaining({ code: 'balance', outcome: 'ties' }));
    });
  });

  mess(29, 'a new line of weight is asked about; what was answered before is kept', async () => {
    const rows = income(['Q3 2026'], [2000]);
    rows.splice(5, 0, ['Factoring fees', 42]);
    const reading = await readSheets({ PnL: rows });
    expect(kinds(reading)).toEqual(['placement']);
    expect(reading.questions[0]?.text).toMatch(/'Factoring fees'.*2\.1 % of revenue/);
    const key = reading.questions[0]?.key ?? '';
    const answered = await readSheets({ PnL: rows }, { answers: { [key]: 'interest_expense' } });
    expect(kinds(answered)).toEqual([]);
    expect(answered.questions).toMatchObject([{ key, answer: 'interest_expense', kind: 'placement' }]);
    expect(amount(answered, 'interest_expense', '2026-09-30', 3)).toBe('42000');
  });

  mess(30, 'a trial balance is placed account by account, and debits against credits', async () => {
    const rows: Typed[][] = [
      ['Trial balance for the nine months ended 30 September 2026, EUR'],
      ['Account', 'Name', 'Debit', 'Credit'],
      ['1000', 'Cash', 350000.55, null],
      ['1100', 'Trade receivables', 900000.25, null],
      ['2000', 'Trade payables', null, 700000.4],
      ['3000', 'Share capital and sundry', null, 250000.35],
      ['4000', 'Revenue', null, 2000000.05],
      ['5000', 'Cost of sales', 1700000, null],
      [null, 'Total', 2950000.8, 2950000.8],
    ];
    await bothWays(rows, (reading) => {
      expect(kinds(reading)).toEqual(['placement']);
      expect(taken(reading)).toEqual([]);
      expect(reading.checks).toContainEqual(
        expect.objectContaining({ code: 'debits-credits', outcome: 'ties' }),
      );
    });
  });

  mess(31, 'debit and credit become one amount in the direction of its line', async () => {
    const rows: Typed[][] = [
      ['Trial balance, nine months ended 30 September 2026, EUR'],
      ['Account', 'Name', 'Debit', 'Credit'],
      ['1000', 'Cash', 350000.25, null],
      ['1050', 'Inventories', 120000, 20000],
      ['2000', 'Trade payables', 30000, 730000],
      ['4000', 'Revenue', 50000, 2050000.25],
      ['5000', 'Cost of sales', 2250000, null],
      [null, 'Total', 2800000.25, 2800000.25],
    ];
    await bothWays(rows, (reading) => {
      expect(figures(reading)).toEqual({
        'cash 2026-09-30 0': '350000.25',
        'inventory 2026-09-30 0': '100000',
        'payables 2026-09-30 0': '700000',
        'revenue 2026-09-30 9': '2000000.25',
        'cogs 2026-09-30 9': '2250000',
      });
    });
  });

  mess(32, 'difference, share, budget and variance columns are left out and listed', async () => {
    const rows: Typed[][] = [
      ['EUR thousand'],
      [null, 'Q3 2026', 'Q3 2025', 'Var', 'Var %', 'Budget Q3 2026', 'vs budget', 'in % of revenue'],
      ['Revenue', 2000, 1900, 100, 5.3, 2100, -100, 100],
      ['Cost of sales', 1200, 1140, 60, 5.3, 1250, -50, 60],
      ['Gross profit', 800, 760, 40, 5.3, 850, -50, 40],
    ];
    await bothWays(rows, (reading) => {
      expect(
        reading.facts
          .map(({ cell }) => cell.slice(0, 1))
          .sort()
          .join(''),
      ).toBe('BBBCCC');
      expect(codes(reading)).toEqual(expect.arrayContaining(['scenario-columns', 'derived-columns-ignored']));
    });
    const unheaded = await readText(
      'EUR thousand;;;\n;Q3 2026;Q3 2025;\nRevenue;2000;1900;100\nCost of sales;1200;1140;60\nGross profit;800;760;40\n',
    );
    expect(new Set(unheaded.facts.map(({ cell }) => cell.slice(0, 1)))).toEqual(new Set(['B', 'C']));
  });

  mess(20, 'a balance sheet beside an income statement keeps its own periods', async () => {
    const [left, right] = [income(['Q3 2026'], [2000]), balance(['30 Sep 2026'], [100])];
    const rows = right.map((row, at) => [...(left[at] ?? [null, null]), null, ...row]);
    const reading = await readSheets({ Both: rows });
    expect(figures(reading)).toMatchObject({
      'revenue 2026-09-30 3': '2000000',
      'cash 2026-09-30 0': '100000',
    });
  });
});
