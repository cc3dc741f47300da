import { describe, expect } from 'vitest';
import type { Typed } from '../../../../../tests/support/gridWorkbook.ts';
import {
  amount,
  asText,
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

const Q3 = '2026-09-30';
const format =
  (pattern: string, sheet = 'PnL'): Change =>
  (workbook) => {
    workbook.getWorksheet(sheet)?.eachRow((row) => {
      row.eachCell((cell) => {
        if (typeof cell.value === 'number') cell.numFmt = pattern;
      });
    });
  };

describe('numbers', () => {
  mess(
    33,
    'the unit is taken where it is stated, from corner, heading, footnote or cover, else asked',
    async () => {
      const expected = { 'revenue 2026-09-30 3': '2000000' };
      for (const unit of [
        'EUR thousand',
        "€'000",
        'in TEUR',
        '(all amounts in thousands of euros)',
        'k€',
        'Angaben in Tausend Euro',
        'en milliers d’euros',
        'en miles de euros',
      ]) {
        await bothWays(income(['Q3 2026'], [2000], unit), (reading) => {
          expect(figures(reading), unit).toMatchObject(expected);
          expect(kinds(reading), unit).toEqual([]);
        });
      }
      const [, ...rows] = income(['Q3 2026'], [2000]);
      await bothWays([...rows, [], ['Figures are stated in EUR thousands.']], (reading) => {
        expect(figures(reading)).toMatchObject(expected);
      });
      const heading = income(['Q3 2026 €k'], [2000], null);
      expect(figures(await readSheets({ PnL: heading }))).toMatchObject(expected);
      const cover = await readSheets({ Cover: [['Amounts in thousands of EUR']], PnL: rows });
      expect(figures(cover)).toMatchObject(expected);
      const millions = await readSheets({ PnL: income(['Q3 2026'], [2.5], 'EUR m') });
      expect(figures(millions)['revenue 2026-09-30 3']).toBe('2500000');
      const open = await readSheets(
        { PnL: income(['Q3 2026'], [49310], 'EUR') },
        { lastQuarterRevenue: '48200000' },
      );
      expect([kinds(open), taken(open)]).toEqual([['unit'], []]);
      expect(open.questions[0]?.text).toMatch(/48,200,000.*49310/);
      const jump = await readSheets(
        { PnL: income(['Q3 2026'], [49310], 'Whole euros, in EUR units') },
        { lastQuarterRevenue: '48200000' },
      );
      expect([kinds(jump), taken(jump)]).toEqual([['scale-jump'], []]);
    },
  );

  mess(34, 'each block has its own unit; headcount and earnings per share have none', async () => {
    const rows = income(['Q3 2026'], [2000]);
    rows.push(['Average headcount', 143], ['Earnings per share (EUR)', 1.25]);
    const reading = await readSheets({ PnL: rows, BS: balance(['30 Sep 2026'], [350000], 'in whole euros') });
    expect(amount(reading, 'revenue', Q3, 3)).toBe('2000000');
    expect(amount(reading, 'cash', Q3, 0)).toBe('350000');
    expect(codes(reading)).toContain('mixed-scale');
    expect(reading.facts.map(({ rawText }) => rawText)).not.toContain('143');
    expect(kinds(reading)).toEqual([]);
    const open = await readSheets({
      PnL: income(['Q3 2026'], [2000]),
      BS: balance(['30 Sep 2026'], [350000], null),
    });
    expect(kinds(open)).toEqual(['unit']);
    expect(taken(open).every(({ sheet }) => sheet === 'PnL')).toBe(true);
  });

  mess(35, 'a currency is taken from words and formats; a shared sign is asked about', async () => {
    for (const [unit, currency] of [
      ['SEK thousand', 'SEK'],
      ["£'000", 'GBP'],
      ['US$ thousand', 'USD'],
      ['TCHF', 'CHF'],
      ['tusental svenska kronor', 'SEK'],
    ] as const) {
      const reading = await readSheets({ PnL: income(['Q3 2026'], [2000], unit) });
      expect([reading.currency, kinds(reading)], unit).toEqual([currency, []]);
    }
    for (const unit of ["$'000", 'tkr', 'thousands']) {
      const reading = await readSheets({ PnL: income(['Q3 2026'], [2000], unit) });
      expect([kinds(reading), taken(reading)], unit).toEqual([['currency'], []]);
    }
    const formatted = await readSheets(
      { PnL: income(['Q3 2026'], [2000], 'thousands') },
      {},
      format('[$€-407] #,##0'),
    );
    expect([formatted.currency, kinds(formatted)]).toEqual(['EUR', []]);
    const mixed = await readSheets({
      PnL: [
        ['Thousands'],
        [null, 'Q3 2026 EUR', 'Q3 2026 USD'],
        ['Revenue', 2000, 2200],
        ['Cost of sales', 1200, 1320],
        ['Gross profit', 800, 880],
      ],
    });
    expect(taken(mixed)).toEqual([]);
    expect(kinds(mixed).length).toBeGreaterThan(0);
  });

  mess(36, 'every notation of a negative figure is read; colour alone is asked about', async () => {
    for (const loss of ['(120)', '120-', '−120', '–120', '-120', '120 CR', '- 120', '(120) ']) {
      const rows: Typed[][] = [
        ['EUR thousand', 'Q3 2026'],
        ['Revenue', 1000],
        ['Cost of sales', 700],
        ['Gross profit', 300],
        ['Administrative expenses', 420],
        ['Operating loss', loss],
      ];
      await bothWays(rows, (reading) => {
        expect(amount(reading, 'ebit', Q3, 3), loss).toBe('-120000');
        expect(amount(reading, 'sga', Q3, 3), loss).toBe('420000');
      });
    }
    const red = await readSheets(
      {
        PnL: [
          ['EUR thousand', 'Q3 2026', 'Q2 2026'],
          ['Revenue', 1000, 1100],
          ['Operating profit', 120, 40],
        ],
      },
      {},
      (workbook) => {
        const cell = workbook.getWorksheet('PnL')?.getCell('B3');
        if (cell) cell.font = { color: { argb: 'FFC00000' } };
      },
    );
    expect(kinds(red)).toEqual(['sign']);
    expect(taken(red).map(({ code }) => code)).toEqual(['revenue', 'revenue']);
  });

  mess(
    37,
    'costs are turned as a block, sheet by sheet and run by run, where the totals prove it',
    async () => {
      const negative = income(['Q3 2026', 'Q3 2025'], [2000, 1900]).map((row) =>
        row[0] === 'Cost of sales' || row[0] === 'Administrative expenses'
          ? row.map((value) => (typeof value === 'number' ? -value : value))
          : row,
      );
      await bothWays(negative, (reading) => {
        expect(figures(reading)).toMatchObject({
          'cogs 2026-09-30 3': '1200000',
          'sga 2025-09-30 3': '380000',
        });
        expect(codes(reading)).toContain('costs-negative');
      });
      const flips = await readSheets({
        'P&L 26': negative.map((row) => row.slice(0, 2)),
        'P&L 25': income(['Q3 2025'], [1900]),
      });
      expect(figures(flips)).toMatchObject({
        'cogs 2026-09-30 3': '1200000',
        'cogs 2025-09-30 3': '1140000',
      });
      const years: Typed[][] = [
        ['EUR thousand', 'Q3 2026', 'Q3 2025'],
        ['Revenue', 2000, 1900],
        ['Cost of sales', 1200, -1140],
        ['Gross profit', 800, 760],
        ['Administrative expenses', 400, -380],
        ['Operating profit', 400, 380],
      ];
      await bothWays(years, (reading) => {
        const costs = reading.facts.filter(({ code }) => code === 'cogs' || code === 'sga');
        expect(
          costs.filter(({ amount: value, waitsFor }) => value.startsWith('-') && waitsFor.length === 0),
        ).toEqual([]);
      });
    },
  );

  mess(38, 'marks of decimals and thousands are proven by the file, or asked about', async () => {
    const file = (figures_: readonly string[], unit = 'EUR thousand') =>
      `${unit};Q3 2026\nRevenue;${figures_[0]}\nCost of sales;${figures_[1]}\nGross profit;${figures_[2]}\n`;
    for (const [style, ...written] of [
      ['German', '2.000,5', '1.200,25', '800,25'],
      ['English', '"2,000.5"', '"1,200.25"', '800.25'],
      ['Swiss', "2'000.5", "1'200.25", '800.25'],
      ['thin spaces', '2\u202f000,5', '1\u202f200,25', '800,25'],
      ['spaces', '2 000,5', '1 200,25', '800,25'],
    ] as const) {
      const reading = await readText(file(written));
      expect(figures(reading), style).toMatchObject({
        'revenue 2026-09-30 3': '2000500',
        'cogs 2026-09-30 3': '1200250',
      });
    }
    const indian = await readText(file(['1,23,45,678', '1,00,45,678', '23,00,000'], 'in whole INR units'));
    expect(figures(indian)).toMatchObject({
      'revenue 2026-09-30 3': '12345678',
      'gross_profit 2026-09-30 3': '2300000',
    });
    const alone = await readText('EUR thousand;Q3 2026\nRevenue;2.000\nCost of sales;1.200\n');
    expect(taken(alone)).toEqual([]);
    expect(alone.outcome).not.toBe('ready');
    const proven = await readText(file(['2.000', '1.200', '800']));
    expect(figures(proven)).toMatchObject({
      'revenue 2026-09-30 3': '2000000',
      'gross_profit 2026-09-30 3': '800000',
    });
  });

  mess(39, 'figures stored as text are converted and counted', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', 'Q3 2026', 'Q3 2025'],
      ['Revenue', '2,000', "'1,900"],
      ['Cost of sales', '1,200 ', '\u00a01,140'],
      ['Gross profit', '€800', 'EUR 760'],
    ];
    await bothWays(rows, (reading) => {
      expect(figures(reading)).toMatchObject({
        'revenue 2026-09-30 3': '2000000',
        'revenue 2025-09-30 3': '1900000',
        'cogs 2025-09-30 3': '1140000',
        'gross_profit 2026-09-30 3': '800000',
        'gross_profit 2025-09-30 3': '760000',
      });
      expect(reading.notes.find(({ code }) => code === 'text-numbers')?.text).toContain('6');
    });
  });

  mess(40, 'a dash and nil are zero; blank, n/a and a full stop are missing', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', 'Q3 2026', 'Q3 2025'],
      ['Revenue', 2000, 1900],
      ['Cost of sales', 1200, 'n/a'],
      ['Other operating income', '-', 'nil'],
      ['Research and development', null, '.'],
      ['Operating profit', 800, 760],
    ];
    await bothWays(rows, (reading) => {
      expect(amount(reading, 'other_operating_income', Q3, 3)).toBe('0');
      expect(amount(reading, 'other_operating_income', '2025-09-30', 3)).toBe('0');
      expect(amount(reading, 'cogs', '2025-09-30', 3)).toBeUndefined();
      expect(amount(reading, 'research_development', Q3, 3)).toBeUndefined();
      expect(amount(reading, 'research_development', '2025-09-30', 3)).toBeUndefined();
    });
  });

  mess(41, 'an error in a needed cell refuses the file by its name; elsewhere it is a note', async () => {
    for (const error of ['#REF!', '#DIV/0!', '#N/A', '#NAME?', '#VALUE!', '#SPILL!']) {
      const rows = income(['Q3 2026'], [2000]);
      rows[3] = ['Cost of sales', { error }];
      const reading = await readSheets({ PnL: rows });
      expect(reading.refusal, error).toMatchObject({
        code: 'error-in-needed-cell',
        where: { sheet: 'PnL', cell: 'B4' },
      });
      expect(reading.refusal?.message).toMatch(
        /PnL!B4 holds #.*required figure.*with a note.*Nothing was imported/,
      );
      const text = await readText(asText(rows));
      expect(text.refusal, error).toMatchObject({
        code: 'error-in-needed-cell',
        where: { sheet: 'CSV', cell: 'B4' },
      });
    }
    const beside = income(['Q3 2026', 'Var %'], [2000]).map((row, at) =>
      at > 1 ? [...row, { error: '#DIV/0!' }] : row,
    );
    const reading = await readSheets({ PnL: beside });
    expect([reading.outcome, codes(reading).includes('errors-ignored')]).toEqual(['ready', true]);
  });

  mess(42, 'a formula without a value is worked out, or the file is refused', async () => {
    const rows = income(['Q3 2026'], [2000]);
    rows[4] = ['Gross profit', { formula: 'B3-B4' }];
    const reading = await readSheets({ PnL: rows });
    expect(amount(reading, 'gross_profit', Q3, 3)).toBe('800000');
    expect(codes(reading)).toContain('values-from-formulas');
    rows[4] = ['Gross profit', { formula: 'INDEX(Data!A:A,MATCH(A5,Data!B:B,0))' }];
    const refused = await readSheets({ PnL: rows });
    expect(refused.refusal).toMatchObject({
      code: 'formulas-not-calculated',
      where: { sheet: 'PnL', cell: 'B5' },
    });
    expect(refused.refusal?.message).toMatch(/recalculate.*save.*Nothing was imported/);
  });

  mess(43, 'a stored value that its own simple sum does not give is remarked on', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', '30 Sep 2026'],
      ['Cash', 350],
      ['Trade receivables', 900],
      ['Total current assets', { formula: 'SUM(B2:B3)', result: 1200 }],
      ['Total assets', { formula: 'B4', result: 1200 }],
    ];
    const reading = await readSheets({ BS: rows });
    expect(reading.notes.find(({ code }) => code === 'stale-values')).toMatchObject({
      text: expect.stringMatching(/BS!B4.*1200.*1250/) as string,
    });
  });

  mess(44, 'rounding of parts is no mismatch', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', 'Q3 2026', 'Q3 2025'],
      ['Revenue', 2000, 1900],
      ['Cost of sales', 1199, 1141],
      ['Gross profit', 800, 760],
      ['Administrative expenses', 401, 379],
      ['Operating profit', 400, 380],
    ];
    await bothWays(rows, (reading) => {
      expect(reading.checks.every(({ outcome }) => outcome === 'ties')).toBe(true);
      expect(amount(reading, 'gross_profit', Q3, 3)).toBe('800000');
    });
  });

  mess(45, 'percentages are no amounts, however they are written', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', 'Q3 2026', 'Q3 2025'],
      ['Revenue', 2000, 1900],
      ['Growth', '5.3 %', '2 %'],
      ['Cost of sales', 1200, 1140],
      ['Gross profit', 800, 760],
      ['Gross margin %', 0.4, 0.4],
      ['EBITDA margin', 15, 15],
      ['Operating profit', 800, 760],
    ];
    await bothWays(rows, (reading) => {
      expect(reading.facts.map(({ rawText }) => Number(rawText)).filter((value) => value < 100)).toEqual([]);
      expect(kinds(reading)).toEqual([]);
      expect(amount(reading, 'gross_profit', Q3, 3)).toBe('800000');
    });
  });

  mess(46, 'a footnote mark in the cell is no part of the number', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', 'Q3 2026', 'Q3 2025'],
      ['Revenue', '2,000*', '1,900 (a)'],
      ['Cost of sales', '1,200¹', '1,140 b)'],
      ['Gross profit', '800**', '760†'],
    ];
    await bothWays(rows, (reading) => {
      expect(figures(reading)).toMatchObject({
        'revenue 2026-09-30 3': '2000000',
        'revenue 2025-09-30 3': '1900000',
        'cogs 2026-09-30 3': '1200000',
        'cogs 2025-09-30 3': '1140000',
        'gross_profit 2025-09-30 3': '760000',
      });
    });
  });

  mess(47, 'a line that makes the sums come out is named', async () => {
    const rows: Typed[][] = [
      ['EUR thousand', '30 Sep 2026'],
      ['Cash', 350],
      ['Trade receivables', 900],
      ['Balancing item', 37],
      ['Total assets', 1287],
      ['Total liabilities', 800],
      ['Total equity', 487],
    ];
    await bothWays(rows, (reading) => {
      expect(codes(reading)).toContain('plug-line');
      expect(reading.facts.map(({ rawText }) => rawText)).not.toContain('37');
    });
  });

  mess(48, 'a balance sheet that does not balance is taken only by word, and marked', async () => {
    const rows = balance(['30 Sep 2026'], [100]).map((row) =>
      row[0] === 'Total equity' ? ['Total equity', 450] : row,
    );
    rows.pop();
    await bothWays(rows, (reading) => {
      expect(kinds(reading)).toEqual(['does-not-balance']);
      expect(reading.questions[0]?.text).toContain('50000');
      expect(taken(reading)).toEqual([]);
    });
  });

  mess(49, 'a cash flow that does not tie is marked; none at all is said', async () => {
    const flow: Typed[][] = [
      ['EUR thousand', 'Q3 2026'],
      ['Net cash from operating activities', 260],
      ['Net cash from investing activities', -90],
      ['Net cash from financing activities', -50],
      ['Opening cash', 230],
      ['Closing cash', 380],
    ];
    const reading = await readSheets({ 'Cash flow': flow });
    expect(reading.checks).toContainEqual(
      expect.objectContaining({ code: 'cash-roll', outcome: 'does-not-tie' }),
    );
    expect(amount(reading, 'cfo', Q3, 3)).toBe('260000');
    await bothWays(income(['Q3 2026'], [2000]), (none) => expect(codes(none)).toContain('no-cash-flow'));
  });

  mess(
    50,
    'dates of both systems, as numbers and as text; a date of two readings is asked about',
    async () => {
      const late: Change = (workbook) => {
        workbook.properties.date1904 = true;
      };
      const rows = (heading: Typed) =>
        income([heading], [2000]).map((row) => (row[0] === null ? ['Quarter ended', ...row.slice(1)] : row));
      const dated = await readSheets({ PnL: rows(new Date('2026-09-30')) }, {}, late);
      expect(amount(dated, 'revenue', Q3, 3)).toBe('2000000');
      const serial = await readSheets({ PnL: rows(46295) });
      expect(amount(serial, 'revenue', Q3, 3)).toBe('2000000');
      for (const text of [
        '30.09.2026',
        '30/09/2026',
        '30-Sep-26',
        '2026-09-30',
        'September 30, 2026',
        '30 septembre 2026',
      ]) {
        await bothWays(rows(text), (reading) =>
          expect(amount(reading, 'revenue', Q3, 3), text).toBe('2000000'),
        );
      }
      await bothWays(rows('12/11/2026'), (reading) => {
        expect([kinds(reading), taken(reading)]).toEqual([['date-order'], []]);
      });
      const answered = await readSheets({ PnL: rows('12/11/2026') }, { answers: { 'date-order': 'dmy' } });
      expect(answered.facts[0]?.periodEnd).toBe('2026-11-12');
    },
  );
});
