/** A corpus of hostile files, made anew for each run: every one is refused, or read without harm, in time. */
import { afterAll, expect, test, vi } from 'vitest';
import type { Reading, ReadingContext } from '#core/statements/workbookReading.ts';
import {
  incomeRows,
  rawArchive,
  text,
  workbookParts,
  type RawPart,
} from '../../../../tests/support/rawArchive.ts';
import { readingPool, readWorkbook } from './readWorkbook.ts';

/** Workers start slowly on a busy machine. */
vi.setConfig({ testTimeout: 60_000 });

const NOTHING_KNOWN: ReadingContext = {
  fiscalYearEndMonth: null,
  reportingCurrency: null,
  answers: {},
  lastQuarterRevenue: null,
};
const MOST_MILLISECONDS = 6_000;
const plain = workbookParts({ rows: incomeRows() });
const sheetOf = (sheet: Parameters<typeof workbookParts>[0]) => rawArchive(workbookParts(sheet));
const withPart = (...parts: readonly RawPart[]) => rawArchive([...plain, ...parts]);
const compound = (stream: string) =>
  Buffer.concat([Buffer.from('d0cf11e0a1b11ae1', 'hex'), Buffer.alloc(504), Buffer.from(stream, 'utf16le')]);

/** Name, bytes, and the code that it is refused with; null where it is read. */
const CORPUS: readonly (readonly [string, () => Buffer, string | null])[] = [
  ['a plain file, which is read', () => rawArchive(plain), null],
  ['no bytes at all', () => Buffer.alloc(0), 'damaged'],
  ['a file cut in the middle', () => rawArchive(plain).subarray(0, 900), 'damaged'],
  ['an encrypted workbook', () => compound('EncryptedPackage'), 'password'],
  [
    'an archive with an encrypted part',
    () => rawArchive(plain.map((part) => ({ ...part, encrypted: true }))),
    'password',
  ],
  ['an old .xls workbook', () => compound('Workbook'), 'legacy-xls'],
  ['an old workbook without a container', () => Buffer.from('0908100000060500', 'hex'), 'legacy-xls'],
  [
    'a web page',
    () => Buffer.from('<html><body><table><tr><td>Revenue</td><td>1</td></tr></table></body></html>'),
    'not-a-workbook',
  ],
  ['a PDF', () => Buffer.from('%PDF-1.7\n%\u00e2\u00e3'), 'not-a-workbook'],
  ['another archive', () => rawArchive([{ name: 'readme.txt', content: 'x' }]), 'not-a-workbook'],
  [
    'a workbook behind a PDF header',
    () => Buffer.concat([Buffer.from('%PDF-1.4 <html>'), rawArchive(plain)]),
    'not-a-workbook',
  ],
  [
    'one cell of 80 MB of blanks',
    () => sheetOf({ rows: `<row r="1">${text('A1', ' '.repeat(80_000_000))}</row>` }),
    'hostile',
  ],
  [
    'two million shared strings',
    () => sheetOf({ sharedStrings: '<si><t/></si>'.repeat(2_000_000) }),
    'hostile',
  ],
  ['200,000 rows', () => sheetOf({ rows: rowsOf(200_000) }), 'too-large'],
  [
    'a merge of 32 million cells',
    () =>
      sheetOf({
        rows: incomeRows(),
        after: '<mergeCells count="1"><mergeCell ref="A1:XFD2000"/></mergeCells>',
      }),
    'hostile',
  ],
  [
    'entities declared',
    () =>
      sheetOf({
        doctype: '<!DOCTYPE x [<!ENTITY a SYSTEM "file:///etc/hostname">]>',
        rows: `<row r="1">${text('A1', '&a;')}</row>`,
      }),
    'hostile',
  ],
  [
    'nested entities',
    () =>
      sheetOf({
        doctype: '<!DOCTYPE lolz [<!ENTITY a "aaaaaaaaaa"><!ENTITY b "&a;&a;&a;">]>',
        rows: `<row r="1">${text('A1', '&b;')}</row>`,
      }),
    'hostile',
  ],
  [
    'a part named to be written elsewhere',
    () => withPart({ name: '../../etc/cron.d/x', content: 'x' }),
    'hostile',
  ],
  ['a part with an absolute name', () => withPart({ name: '/etc/x.xml', content: '<x/>' }), 'hostile'],
  ['a part twice', () => withPart({ name: 'xl/worksheets/sheet1.xml', content: '<worksheet/>' }), 'hostile'],
  [
    '201 parts',
    () => withPart(...Array.from({ length: 196 }, (_, at) => ({ name: `xl/x${at}.xml`, content: '<x/>' }))),
    'hostile',
  ],
  [
    'a part that declares less than it holds',
    () => rawArchive(plain.map((part) => ({ ...part, declaredBytes: 10 }))),
    'damaged',
  ],
  ['eleven megabytes', () => Buffer.alloc(11 * 1024 * 1024, 65), 'too-large'],
  [
    'a reference that is no cell',
    () => sheetOf({ rows: '<row r="1"><c r="ZZZZZZ999999999"><v>1</v></c></row>' }),
    'damaged',
  ],
  [
    'a filled cell at the far corner',
    () => sheetOf({ rows: incomeRows('<row r="1048576"><c r="XFD1048576"><v>1</v></c></row>') }),
    null,
  ],
  [
    'columns declared to the last',
    () => sheetOf({ before: '<cols><col min="1" max="16384" width="9"/></cols>', rows: incomeRows() }),
    null,
  ],
  ['macros, which are not run', () => withPart({ name: 'xl/vbaProject.bin', content: 'x' }), null],
  [
    'names of the language as labels and sheet',
    () =>
      sheetOf({
        name: '__proto__',
        rows: incomeRows(
          `<row r="12">${text('A12', '__proto__')}<c r="B12"><v>5</v></c></row><row r="13">${text('A13', 'constructor')}<c r="B13"><v>5</v></c></row>`,
        ),
      }),
    null,
  ],
  ['a negative row', () => sheetOf({ rows: `<row r="-5">${text('A-5', 'x')}</row>` }), 'no-amounts'],
];

function rowsOf(count: number): string {
  return Array.from(
    { length: count },
    (_, at) => `<row r="${at + 1}"><c r="A${at + 1}"><v>${at * 7919}</v></c></row>`,
  ).join('');
}

const read = (bytes: Buffer): Promise<Reading> => readWorkbook(bytes, 'sent.xlsx', NOTHING_KNOWN);

afterAll(() => readingPool().close());

test.each(CORPUS)(
  '%s',
  async (_name, make, code) => {
    const bytes = make();
    const began = performance.now();
    const reading = await read(bytes);
    expect(performance.now() - began).toBeLessThan(MOST_MILLISECONDS);
    expect(reading.refusal?.code ?? null, reading.refusal?.message).toBe(code);
    if (reading.refusal) expect(reading.refusal.message).toMatch(/Nothing was imported\.$/);
    else expect(reading.facts.find((fact) => fact.code === 'revenue')?.amount).toBe('12400000');
    expect(Object.hasOwn(Object.prototype, 'revenue')).toBe(false);
  },
  30_000,
);

test('numbers that are none are errors in their cells', async () => {
  const rows = incomeRows().replace('<v>12400</v>', '<v>1e400</v>');
  const reading = await read(sheetOf({ rows }));
  expect(reading.refusal).toMatchObject({
    code: 'error-in-needed-cell',
    where: { sheet: 'P&L', cell: 'B2' },
  });
});

test('a stored value of a formula is taken and says that it is one', async () => {
  const rows = incomeRows().replace(
    '<c r="B2"><v>12400</v></c>',
    '<c r="B2"><f>6000+6400</f><v>12400</v></c>',
  );
  const fact = (await read(sheetOf({ rows }))).facts.find(({ code }) => code === 'revenue');
  expect(fact).toMatchObject({ amount: '12400000', fromFormula: true });
});

test('a file that takes too long ends with its worker, and the next one is read by another', async () => {
  const { ReadingPool } = await import('../workers/pool.ts');
  const pool = new ReadingPool(1);
  const slow = sheetOf({ rows: rowsOf(20_000) });
  const job = { kind: 'xlsx', bytes: slow, notes: [], context: NOTHING_KNOWN } as const;
  expect(await pool.read(job)).toBe('took-too-long');
  await pool.close();
  expect((await read(rawArchive(plain))).outcome).toBe('ready');
});

test('the program answers others while hostile files are read', async () => {
  const files = CORPUS.filter(([name]) => /million|80 MB|200,000/.test(name)).map(([, make]) => make());
  let answered = 0;
  const others = setInterval(() => (answered += 1), 1);
  await Promise.all(files.map(read));
  clearInterval(others);
  // Read on this thread, the files would let nobody in between: what is left is a handful of turns.
  expect(answered).toBeGreaterThan(20);
}, 30_000);
