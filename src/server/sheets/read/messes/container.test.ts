import { describe, expect } from 'vitest';
import { compound, pictureOn, textBoxOn, withParts } from './containers.fixture.ts';
import { gridWorkbook } from '../../../../../tests/support/gridWorkbook.ts';
import { incomeRows, rawArchive, workbookParts } from '../../../../../tests/support/rawArchive.ts';
import {
  amount,
  asText,
  codes,
  figures,
  income,
  kinds,
  mess,
  readBytesAs,
  readSheets,
  readText,
  taken,
} from './messes.fixture.ts';

const PLAIN = income(['Q3 2026', 'Q3 2025'], [2000, 1900]);

describe('container', () => {
  mess(1, 'the content counts, not the name', async () => {
    const page = Buffer.from(
      '\n<HTML><body><table><tr><td>Revenue</td><td>1</td></tr></table></body></HTML>',
    );
    expect((await readBytesAs(page, 'figures.xlsx')).refusal).toMatchObject({
      code: 'not-a-workbook',
      message: expect.stringMatching(/web page.*Nothing was imported\.$/) as string,
    });
    const book = await gridWorkbook({ PnL: PLAIN });
    expect(amount(await readBytesAs(book, 'figures.csv'), 'revenue', '2026-09-30', 3)).toBe('2000000');
    const text = await readBytesAs(Buffer.from(asText(PLAIN)), 'figures.xlsx');
    expect(amount(text, 'revenue', '2026-09-30', 3)).toBe('2000000');
    expect(codes(text)).toContain('plain-text');
    const open = rawArchive([
      { name: 'mimetype', content: 'application/vnd.oasis.opendocument.spreadsheet' },
      { name: 'content.xml', content: '<office:document-content/>' },
    ]);
    expect((await readBytesAs(open, 'figures.xlsx')).refusal).toMatchObject({
      code: 'not-a-workbook',
      message: expect.stringContaining('OpenDocument') as string,
    });
    expect((await readBytesAs(Buffer.from('%PDF-1.7 …'), 'figures.xlsx')).refusal?.code).toBe(
      'not-a-workbook',
    );
  });

  mess(2, 'an old .xls workbook is refused with what to do', async () => {
    const { refusal } = await readBytesAs(compound('Workbook'), 'figures.xls');
    expect(refusal?.code).toBe('legacy-xls');
    expect(refusal?.message).toMatch(/save it as \.xlsx.*Nothing was imported/);
  });

  mess(3, 'a protected file is refused, and no password is asked for', async () => {
    const { refusal } = await readBytesAs(compound('EncryptedPackage'), 'figures.xlsx');
    expect(refusal?.code).toBe('password');
    expect(refusal?.message).toMatch(/without the password.*not stored.*Nothing was imported/);
  });

  mess(4, 'macros, links and connections are noted and never followed', async () => {
    const reading = await readBytesAs(
      await withParts({ PnL: PLAIN }, [
        { name: 'xl/vbaProject.bin', content: 'x' },
        { name: 'xl/externalLinks/externalLink1.xml', content: '<externalLink/>' },
        {
          name: 'xl/externalLinks/_rels/externalLink1.xml.rels',
          content:
            '<Relationships><Relationship Id="r" Target="file:///S:/Group/Consol%20Q3.xlsx"/></Relationships>',
        },
        { name: 'xl/connections.xml', content: '<connections/>' },
      ]),
      'figures.xlsm',
    );
    expect(codes(reading)).toEqual(
      expect.arrayContaining(['macros-ignored', 'external-links', 'data-connections']),
    );
    expect(reading.notes.find(({ code }) => code === 'external-links')?.text).toContain('Consol Q3.xlsx');
    expect(amount(reading, 'revenue', '2026-09-30', 3)).toBe('2000000');
  });

  mess(5, 'a file that is cut off or too large is refused as a whole', async () => {
    const whole = rawArchive(workbookParts({ rows: incomeRows() }));
    const cut = await readBytesAs(whole.subarray(0, whole.length - 200), 'figures.xlsx');
    expect(cut.refusal).toMatchObject({ code: 'damaged' });
    expect(cut.refusal?.message).toMatch(/cannot be read completely.*Nothing was imported/);
    const rows = Array.from({ length: 50_001 }, (_, at) => `Line ${at};1`).join('\n');
    expect((await readText(rows)).refusal?.code).toBe('too-large');
    const bomb = rawArchive(workbookParts({ rows: incomeRows(), after: ' '.repeat(40_000_000) }));
    expect((await readBytesAs(bomb, 'figures.xlsx')).refusal?.code).toBe('hostile');
  });

  mess(6, 'a picture of figures is refused with its place', async () => {
    const reading = await readBytesAs(
      await pictureOn({ Cover: [['Accounts']], Scan: [['see below']] }, 'Scan', 2, 4),
    );
    expect(reading.refusal).toMatchObject({ code: 'picture-only', where: { sheet: 'Scan', cell: 'C5' } });
    expect(reading.refusal?.message).toMatch(/picture Scan!C5.*Nothing was imported/);
  });

  mess(7, 'text boxes and comments are shown and not read as figures', async () => {
    const boxed = await readBytesAs(await textBoxOn({ PnL: PLAIN }, 'Revenue excludes 310 of rebates'));
    expect(boxed.notes.find(({ code }) => code === 'text-boxes')?.text).toContain(
      'Revenue excludes 310 of rebates',
    );
    const commented = await readSheets({ PnL: PLAIN }, {}, (workbook) => {
      const cell = workbook.getWorksheet('PnL')?.getCell('B3');
      if (cell) cell.note = 'Before rebates of 310';
    });
    expect(commented.notes.find(({ code }) => code === 'comments')).toMatchObject({
      text: expect.stringContaining('Before rebates of 310') as string,
      where: { sheet: 'PnL', cell: 'B3' },
    });
    expect(figures(commented)).toEqual(figures(boxed));
  });

  mess(8, 'semicolons, tabs, pipes, commas and a stated separator are told apart', async () => {
    const expected = figures(await readText(asText(PLAIN)));
    expect(expected['revenue 2026-09-30 3']).toBe('2000000');
    for (const mark of ['\t', '|', ',']) {
      expect(figures(await readText(asText(PLAIN).replaceAll(';', mark))), mark).toEqual(expected);
    }
    expect(figures(await readText(`sep=^\r\n${asText(PLAIN).replaceAll(';', '^')}`))).toEqual(expected);
  });

  mess(9, 'every encoding that exports use is told by its bytes', async () => {
    const words = asText([
      ['in TEUR'],
      ['', 'Q3 2026', 'Q3 2025'],
      ['Umsatzerlöse', 2000, 1900],
      ['Bestandsveränderungen', 10, 20],
      ['Erträge aus übrigem Geschäft', 5, 5],
      ['Löhne und Gehälter', 500, 490],
    ]);
    const mac = (text: string) =>
      Buffer.from([...text].map((letter) => ({ ö: 0x9a, ä: 0x8a, ü: 0x9f })[letter] ?? letter.charCodeAt(0)));
    const forms = {
      'UTF-8 with a mark': Buffer.from(`\ufeff${words}`),
      'UTF-16': Buffer.from(`\ufeff${words}`, 'utf16le'),
      'UTF-16, the other way': Buffer.from(`\ufeff${words}`, 'utf16le').swap16(),
      'UTF-16 without a mark': Buffer.from(words, 'utf16le'),
      'Windows-1252': Buffer.from(words, 'latin1'),
      Mac: mac(words),
    };
    for (const [name, bytes] of Object.entries(forms)) {
      const reading = await readBytesAs(bytes, 'export.csv');
      expect(amount(reading, 'revenue', '2026-09-30', 3), name).toBe('2000000');
      expect(amount(reading, 'staff_costs', '2026-09-30', 3), name).toBe('500000');
    }
    const damaged = await readBytesAs(Buffer.from(Buffer.from(words).toString('latin1')), 'export.csv');
    expect(codes(damaged)).toContain('damaged-text');
    expect(amount(damaged, 'revenue', '2026-09-30', 3)).toBe('2000000');
  });

  mess(10, 'line breaks and quotes in fields stay in them; lines with other counts are listed', async () => {
    const reading = await readText(
      '"EUR thousand, as in ""Pack"""\n,Q3 2026,Q3 2025\nRevenue,2000,1900\n"Cost of\nsales",1200,1140\nGross profit,800,760,checked by AB\n',
    );
    expect(amount(reading, 'cogs', '2026-09-30', 3)).toBe('1200000');
    expect(reading.notes.find(({ code }) => code === 'ragged-rows')?.text).toContain('5');
    const split = await readText(
      'EUR thousand\n,Q3 2026,Q3 2025\nRevenue,2,000,1,900\nCost of sales,1,200,1,140\nGross profit,800,760\n',
    );
    expect(split.refusal).toMatchObject({ code: 'damaged', where: { sheet: 'CSV', cell: 'A3' } });
    expect(split.refusal?.message).toMatch(/quot/);
  });

  mess(11, 'of many sheets, those that are set aside by name are asked about', async () => {
    const sheets = Object.fromEntries(
      Array.from({ length: 12 }, (_, at) => [
        `Site ${at + 1}`,
        [
          ['Headcount', at],
          ['Area', at * 10],
        ],
      ]),
    );
    const old = income(['FY24', 'Year ended 31 December 2024'], [1500, 1500]).map((row) => [
      row[0] ?? null,
      row[2] ?? null,
    ]);
    const reading = await readSheets({ ...sheets, 'P&L': PLAIN, 'P&L old - do not use': old });
    expect(kinds(reading)).toEqual(['which-sheets']);
    expect(reading.questions[0]?.text).toContain('P&L old - do not use');
    expect(new Set(taken(reading).map(({ sheet }) => sheet))).toEqual(new Set(['P&L']));
  });

  mess(12, 'hidden rows with amounts are asked about; hidden sheets are read and said', async () => {
    const reading = await readSheets({ PnL: PLAIN, Aside: [['Notes']] }, {}, (workbook) => {
      const row = workbook.getWorksheet('PnL')?.getRow(6);
      if (row) row.hidden = true;
    });
    expect(kinds(reading)).toEqual(['hidden-rows']);
    expect(reading.questions[0]?.text).toMatch(/1 hidden row.*PnL/);
    const hidden = await readSheets({ Cover: [['Pack']], PnL: PLAIN }, {}, (workbook) => {
      const sheet = workbook.getWorksheet('PnL');
      if (sheet) sheet.state = 'veryHidden';
    });
    expect(codes(hidden)).toContain('hidden-sheet-read');
    expect(amount(hidden, 'revenue', '2026-09-30', 3)).toBe('2000000');
  });

  mess(13, 'the same file is read the same, and a changed cell changes one fact', async () => {
    const [first, second] = [await readSheets({ PnL: PLAIN }), await readSheets({ PnL: PLAIN })];
    expect(second).toEqual(first);
    const changed = PLAIN.map((row) => row.map((value) => (value === 400 ? 401 : value)));
    const third = await readSheets({ PnL: changed });
    expect(third.layoutKey).toBe(first.layoutKey);
    const differing = first.facts.filter(
      (fact) => !third.facts.some((other) => other.cell === fact.cell && other.amount === fact.amount),
    );
    expect(differing.map(({ cell }) => cell)).toEqual(['B6', 'B7']);
  });

  mess(14, 'a form without figures is refused, whatever its totals say', async () => {
    const form = PLAIN.map((row, at) => (at > 1 ? [row[0] ?? null, null, null] : row));
    form[4] = ['Gross profit', { formula: 'B3-B4', result: 0 }, { formula: 'C3-C4', result: 0 }];
    const reading = await readSheets({ PnL: form });
    expect(reading.refusal?.code).toBe('no-amounts');
    expect(reading.refusal?.message).toMatch(/No amounts were found.*Nothing was imported/);
    expect(
      (
        await readText(
          asText(form.map((row) => row.map((value) => (typeof value === 'string' ? value : null)))),
        )
      ).refusal?.code,
    ).toBe('no-amounts');
  });
});
