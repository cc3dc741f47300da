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
  taken,
} from './messes.fixture.ts';

const Q3 = '2026-09-30';

describe('periods and meaning', () => {
  mess(51, 'the length of a column is proven by figures, or asked about', async () => {
    await bothWays(income(['Sep-26', 'Sep-25'], [2000, 1900]), (reading) => {
      expect([kinds(reading), taken(reading)]).toEqual([['period-length'], []]);
    });
    const growing = await readSheets({ PnL: income(['Mar-26', 'Jun-26', 'Sep-26'], [700, 1420, 2150]) });
    expect(kinds(growing)).toEqual(['period-length']);
    expect(growing.questions[0]?.text).toMatch(/look cumulative/);
    const answered = await readSheets(
      { PnL: income(['Mar-26', 'Jun-26', 'Sep-26'], [700, 1420, 2150]) },
      { answers: { [growing.questions[0]?.key ?? '']: 'from-year-end:12' } },
    );
    expect(figures(answered)).toMatchObject({
      'revenue 2026-03-31 3': '700000',
      'revenue 2026-09-30 9': '2150000',
    });
    const labelled = await readSheets(
      {
        PnL: income(['Q3 2026', 'YTD Sep 2026', 'LTM Sep 2026', 'Month of Sep 2026'], [700, 2150, 2900, 240]),
      },
      { fiscalYearEndMonth: 12 },
    );
    expect(figures(labelled)).toMatchObject({
      'revenue 2026-09-30 3': '700000',
      'revenue 2026-09-30 9': '2150000',
      'revenue 2026-09-30 1': '240000',
    });
    expect(kinds(labelled)).toEqual([]);
  });

  mess(52, 'weeks make a quarter or a year that ends on its own last day', async () => {
    for (const [heading, end, months] of [
      ['13 weeks ended 27 September 2026', '2026-09-27', 3],
      ['14 weeks to 3 October 2026', '2026-10-03', 3],
      ['52 weeks ended 28 March 2026', '2026-03-28', 12],
      ['53 weeks ended 2 January 2027', '2027-01-02', 12],
      ['39 weeks ended 26 September 2026', '2026-09-26', 9],
    ] as const) {
      await bothWays(income([heading], [2000]), (reading) => {
        expect(amount(reading, 'revenue', end, months), heading).toBe('2000000');
        expect(codes(reading)).toContain('week-year');
      });
    }
  });

  mess(53, 'a stub period keeps its own length', async () => {
    await bothWays(
      income(['5 months ended 31 May 2026', 'Year ended 31 December 2025'], [800, 1900]),
      (reading) => {
        expect(figures(reading)).toMatchObject({
          'revenue 2026-05-31 5': '800000',
          'revenue 2025-12-31 12': '1900000',
        });
        expect(reading.facts.find(({ months }) => months === 5)?.periodStart).toBe('2026-01-01');
      },
    );
    await bothWays(income(['1 January 2026 - 30 April 2026'], [800]), (reading) => {
      expect(amount(reading, 'revenue', '2026-04-30', 4)).toBe('800000');
    });
    await bothWays(income(['15 months ended 31 March 2026'], [2500]), (reading) => {
      expect(amount(reading, 'revenue', '2026-03-31', 15)).toBe('2500000');
    });
  });

  mess(54, 'labels of financial years and their parts need the year end', async () => {
    for (const heading of [
      'FY26',
      'FY2026',
      '2025/26',
      'H1 FY26',
      'P6 FY26',
      'Q2 FY26',
      'GJ 2025/26',
      'Exercice 2026',
      'Ejercicio 2026',
    ]) {
      await bothWays(income([heading], [2000]), (reading) => {
        expect([heading, kinds(reading), taken(reading)]).toEqual([heading, ['year-end'], []]);
      });
    }
    const march = { fiscalYearEndMonth: 3, answers: { 'year-end': '03-31' } };
    for (const [heading, end, months] of [
      ['FY26', '2026-03-31', 12],
      ['H1 FY26', '2025-09-30', 6],
      ['Q2 FY26', '2025-09-30', 3],
      ['2025/26', '2026-03-31', 12],
    ] as const) {
      const reading = await readSheets({ PnL: income([heading], [2000]) }, march);
      expect(amount(reading, 'revenue', end, months), heading).toBe('2000000');
    }
    for (const [heading, end, months] of [
      ['T3 2026', Q3, 3],
      ['3. Quartal 2026', Q3, 3],
      ['3e trimestre 2026', Q3, 3],
      ['1. Halbjahr 2026', '2026-06-30', 6],
      ['2T 2026', '2026-06-30', 3],
      ['S1 2026', '2026-06-30', 6],
      ['9M 2026', Q3, 9],
    ] as const) {
      const reading = await readSheets({ PnL: income([heading], [2000]) }, { fiscalYearEndMonth: 12 });
      expect(amount(reading, 'revenue', end, months), heading).toBe('2000000');
    }
  });

  mess(55, 'two versions of one period are asked about, and both are kept to choose from', async () => {
    for (const headings of [
      ['Q3 2025 restated', 'Q3 2025'],
      ['Q3 2025 (as reported)', 'Q3 2025 (restated)'],
    ]) {
      const asked = await readSheets({ PnL: income(['Q3 2026', ...headings], [2000, 1840, 1900]) });
      expect(kinds(asked)).toEqual(['restated']);
      expect(taken(asked).every(({ periodEnd }) => periodEnd === Q3)).toBe(true);
      expect(taken(asked).length).toBeGreaterThan(0);
    }
    await bothWays(income(['Q3 2026', 'Q3 2025', 'Q3 2025'], [2000, 1900, 1900]), (reading) => {
      expect(kinds(reading)).toEqual([]);
      expect(codes(reading)).toContain('duplicate-period');
      expect(figures(reading)['revenue 2025-09-30 3']).toBe('1900000');
    });
  });

  mess(56, 'forecast and budget columns are kept apart, however they are marked', async () => {
    for (const heading of [
      'Dec-26E',
      'Q4 2026 B',
      'Q4 2026 LE',
      'FC Q4 2026',
      'Q4 26F',
      'Plan Q4 2026',
      'Budget Q4 2026',
      'Prognose Q4 2026',
      'Q4 2026 Soll',
      'Prévision T4 2026',
      'Q4 2026 Presupuesto',
      'Q4 2026e',
      'Q4 2026 outlook',
      'Hochrechnung Q4 2026',
      'BUD Q4/2026',
      'Target Q4 2026',
      'Rolling forecast Q4 2026',
      'Latest view Q4 2026',
      'Projected Q4 2026',
    ]) {
      await bothWays(income(['Q3 2026', heading], [2000, 2100]), (reading) => {
        expect(new Set(reading.facts.map(({ periodEnd }) => periodEnd)), heading).toEqual(new Set([Q3]));
      });
    }
    const sheet = await readSheets({
      'P&L': income(['Q3 2026'], [2000]),
      'Budget 2026': income(['Q3 2026', 'Q4 2026'], [2050, 2100]),
    });
    expect(new Set(sheet.facts.map((fact) => fact.sheet))).toEqual(new Set(['P&L']));
  });

  mess(57, 'what the file says of its status is shown', async () => {
    const rows = income(['Q3 2026'], [2000]);
    rows.unshift(['Draft, unaudited']);
    await bothWays(rows, (reading) => {
      expect(reading.notes.find(({ code }) => code === 'status-stated')?.text).toContain('Draft, unaudited');
      expect(amount(reading, 'revenue', Q3, 3)).toBe('2000000');
    });
    const both = await readSheets({
      PnL: income(['Q3 2026 audited', 'Q3 2026 management accounts'], [2000, 2040]),
    });
    expect(taken(both)).toEqual([]);
    expect(kinds(both).length).toBe(1);
  });

  mess(58, 'accounts on two bases are never mixed', async () => {
    const both = await readSheets({ PnL: income(['Q3 2026 HGB', 'Q3 2026 IFRS'], [2000, 2040]) });
    expect([kinds(both), taken(both)]).toEqual([['entity'], []]);
    const one = income(['Q3 2026'], [2000]);
    one.unshift(['Prepared in accordance with IFRS 16, consolidated']);
    const reading = await readSheets({ PnL: one });
    expect(reading.notes.find(({ code }) => code === 'basis-stated')?.text).toContain('IFRS');
    expect(amount(reading, 'revenue', Q3, 3)).toBe('2000000');
  });

  mess(59, 'pro forma figures stand apart from those as reported', async () => {
    const reading = await readSheets({
      PnL: income(['Q3 2026 as reported', 'Q3 2026 pro forma'], [2000, 2300]),
    });
    expect(figures(reading)).toMatchObject({ 'revenue 2026-09-30 3': '2000000' });
    expect(reading.facts).toHaveLength(5);
    const rows = income(['Q3 2026'], [2000]);
    rows.push(['Profit from discontinued operations', 90]);
    const discontinued = await readSheets({ PnL: rows });
    expect(taken(discontinued).map(({ rawText }) => rawText)).not.toContain('90');
    expect(kinds(discontinued)).toEqual(['placement']);
  });

  mess(60, 'a certificate is a statement of the borrower, held against its accounts', async () => {
    const certificate: Typed[][] = [
      ['Compliance certificate, twelve months ended 30 September 2026'],
      ['EUR thousand'],
      ['Reported EBITDA', 1600],
      ['Add-back: restructuring', 120],
      ['Add-back: one-off legal costs', 80],
      ['Adjusted EBITDA', 1800],
      ['Net debt', 6300],
      ['Leverage', '3.50x'],
    ];
    const accounts: Typed[][] = [
      ['EUR thousand', 'Twelve months ended 30 September 2026'],
      ['Revenue', 8000],
      ['Cost of sales', 4800],
      ['Gross profit', 3200],
      ['Administrative expenses', 1650],
      ['EBITDA', 1550],
      ['Depreciation', 400],
      ['Operating profit', 1150],
    ];
    const reading = await readSheets({ 'P&L': accounts, Certificate: certificate });
    expect(codes(reading)).toContain('certificate-read');
    expect(amount(reading, 'ebitda_reported', Q3, 12)).toBe('1550000');
    expect(reading.addBacks?.map((addBack) => addBack.amount)).toEqual(['120000', '80000']);
    expect(reading.checks).toContainEqual(
      expect.objectContaining({ code: 'certificate-ebitda', outcome: 'does-not-tie', difference: '50000' }),
    );
    expect(kinds(reading)).toEqual([]);
  });

  mess(61, 'columns in two currencies are never mixed', async () => {
    const reading = await readSheets({
      PnL: income(['Q3 2026 EUR thousand', 'Q3 2026 USD thousand'], [2000, 2300], null),
    });
    expect(taken(reading)).toEqual([]);
    expect(kinds(reading).length).toBeGreaterThan(0);
    const sheets = await readSheets({
      PnL: income(['Q3 2026'], [2000], 'EUR thousand'),
      BS: balance(['30 Sep 2026'], [100], 'USD thousand'),
    });
    expect([kinds(sheets), taken(sheets)]).toEqual([['currency'], []]);
  });

  mess(62, 'figures that are restated for a price index stand apart', async () => {
    for (const heading of [
      'Q3 2026 index-adjusted',
      'Q3 2026 inflation-adjusted (IAS 29)',
      'Q3 2026 hyperinflation restated',
    ]) {
      const reading = await readSheets({ PnL: income(['Q3 2026', heading], [2000, 2300]) });
      expect(figures(reading)['revenue 2026-09-30 3'], heading).toBe('2000000');
      expect(codes(reading), heading).toContain('index-adjusted');
    }
  });

  mess(
    63,
    'averages are no closing balances; net debt and total debt are no lines of their own',
    async () => {
      const rows: Typed[][] = [
        ['EUR thousand'],
        [null, '30 Sep 2026', 'Average Q3 2026'],
        ['Cash', 350, 310],
        ['Trade receivables', 900, 880],
        ['Total assets', 1250, 1190],
        ['Bank loans due after one year', 600, 640],
        ['Lease liabilities', 100, 105],
        ['Total liabilities', 700, 745],
        ['Total equity', 550, 445],
        ['Gross debt', 700, 745],
        ['Net debt', 350, 435],
      ];
      await bothWays(rows, (reading) => {
        expect(figures(reading)).toEqual({
          'cash 2026-09-30 0': '350000',
          'receivables 2026-09-30 0': '900000',
          'total_assets 2026-09-30 0': '1250000',
          'senior_debt 2026-09-30 0': '600000',
          'lease_liabilities 2026-09-30 0': '100000',
          'total_liabilities 2026-09-30 0': '700000',
          'equity 2026-09-30 0': '550000',
        });
        expect(kinds(reading)).toEqual([]);
      });
    },
  );

  mess(64, 'a sheet with personal data is neither read nor shown', async () => {
    const payroll: Typed[][] = [
      ['Name', 'IBAN', 'Gross pay'],
      ['Ines Brandt', 'DE89 3704 0044 0532 0130 00', 4100],
      ['Tom Vestergren', 'SE45 5000 0000 0583 9825 7466', 3900],
    ];
    for (const name of ['Payroll Sep', 'Gehälter', 'Sheet7']) {
      const reading = await readSheets({ PnL: income(['Q3 2026'], [2000]), [name]: payroll });
      expect(
        reading.sheets.map((sheet) => sheet.name),
        name,
      ).toEqual(['PnL']);
      expect(reading.notes.find(({ code }) => code === 'personal-data-not-read')?.text, name).toContain(name);
      expect(JSON.stringify(reading)).not.toContain('Brandt');
    }
  });
});
