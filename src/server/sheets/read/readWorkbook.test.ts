import { afterAll, describe, expect, test, vi } from 'vitest';
import { decimal } from '#core/money/decimal.ts';
import type { Reading, ReadingContext } from '#core/statements/workbookReading.ts';
import { tyingPeriod } from '../../../../tests/support/tyingFigures.ts';
import { buildWorkbook, type BorrowerWorkbook } from '../../../../tests/support/workbooks.ts';
import { readingPool, readWorkbook } from './readWorkbook.ts';

/** Workers start slowly on a busy machine. */
vi.setConfig({ testTimeout: 60_000 });

const NOTHING_KNOWN: ReadingContext = {
  fiscalYearEndMonth: null,
  reportingCurrency: null,
  answers: {},
  lastQuarterRevenue: null,
};
const PERIODS = [
  tyingPeriod('2026-06-30', 12_400_000, 2_150_000),
  tyingPeriod('2026-09-30', 12_910_000, 2_300_000),
];
const PACK: BorrowerWorkbook = { borrower: 'Harrowfell Castings Ltd', periods: PERIODS };

const read = async (pack: BorrowerWorkbook, context: Partial<ReadingContext> = {}): Promise<Reading> =>
  readWorkbook(await buildWorkbook(pack), 'pack.xlsx', { ...NOTHING_KNOWN, ...context });

const amountOf = (reading: Reading, code: string, end: string, months: number): string | undefined =>
  reading.facts.find((fact) => fact.code === code && fact.periodEnd === end && fact.months === months)
    ?.amount;

afterAll(() => readingPool().close());

describe('a plain three-sheet pack', () => {
  test('is ready, with every written amount read in whole units from its own cell', async () => {
    const reading = await read(PACK);
    expect(reading.outcome).toBe('ready');
    expect([reading.currency, reading.unit]).toEqual(['EUR', '1000']);
    const [, period] = PERIODS;
    for (const [line, amount] of Object.entries(period?.amounts ?? {})) {
      const fact = reading.facts.find(({ code, periodEnd }) => code === line && periodEnd === '2026-09-30');
      if (fact) expect(decimal(fact.amount).eq(amount), line).toBe(true);
    }
    expect(amountOf(reading, 'revenue', '2026-09-30', 3)).toBe('12910000');
    expect(amountOf(reading, 'capex', '2026-09-30', 3)).toBe('-451850');
    expect(reading.facts.find(({ code }) => code === 'total_assets')?.months).toBe(0);
    expect(
      reading.facts.find(({ code, periodEnd }) => code === 'revenue' && periodEnd === '2026-09-30'),
    ).toMatchObject({
      sheet: 'Income statement',
      cell: 'C5',
      periodStart: '2026-07-01',
      waitsFor: [],
    });
  });

  test('ties in balance, cash, gross profit, profit before tax and net income', async () => {
    const { checks } = await read(PACK);
    expect(new Set(checks.map(({ code, outcome }) => `${code} ${outcome}`))).toEqual(
      new Set(['balance ties', 'cash-roll ties', 'gross-profit ties', 'pbt ties', 'net-income ties']),
    );
  });

  test('keeps one layout key from quarter to quarter, and another for another set of rows', async () => {
    const [first] = PERIODS;
    const next = await read({
      ...PACK,
      periods: [...PERIODS.slice(1), tyingPeriod('2026-12-31', 13_000_000, 2_400_000)],
    });
    const other = await read({ ...PACK, periods: first ? [first] : [], statements: ['income'] });
    const own = await read(PACK);
    expect(next.layoutKey).toBe(own.layoutKey);
    expect(other.layoutKey).not.toBe(own.layoutKey);
  });

  test('with costs as negative figures is turned as a block, because its totals prove it', async () => {
    const reading = await read({ ...PACK, costsNegative: true });
    expect(amountOf(reading, 'cogs', '2026-09-30', 3)).toBe('8004200');
    expect(amountOf(reading, 'income_tax', '2026-09-30', 3)).toBe(
      amountOf(await read(PACK), 'income_tax', '2026-09-30', 3),
    );
    expect(reading.notes.map(({ code }) => code)).toContain('costs-negative');
  });
});

describe('what a file does not say', () => {
  test('is asked: the unit, with nothing taken until it is answered', async () => {
    const reading = await read({ ...PACK, unit: null }, { lastQuarterRevenue: '12400000' });
    expect(reading.outcome).toBe('questions');
    expect(reading.questions).toMatchObject([
      { key: 'unit', kind: 'unit', answer: null, holdsFor: 'layout' },
    ]);
    expect(reading.questions[0]?.text).toContain('12,400,000');
    expect(reading.facts.every(({ waitsFor }) => waitsFor.includes('unit'))).toBe(true);
    const answered = await read({ ...PACK, unit: null }, { answers: { unit: '1000' } });
    expect(answered.outcome).toBe('ready');
    expect(amountOf(answered, 'revenue', '2026-09-30', 3)).toBe('12910000');
  });

  test('is asked: the currency, also where only a shared sign stands', async () => {
    const reading = await read({
      ...PACK,
      currency: null,
      change: (workbook) => {
        for (const sheet of workbook.worksheets) sheet.getCell('A4').value = '$ thousand';
      },
    });
    expect(reading.questions.map(({ kind }) => kind)).toEqual(['currency']);
    expect(reading.questions[0]?.text).toContain('$');
  });

  test('is asked: the length of a period, unless the cash roll proves it', async () => {
    const bare = (workbook: Parameters<NonNullable<BorrowerWorkbook['change']>>[0]) => {
      for (const sheet of workbook.worksheets) {
        if (sheet.name === 'Balance sheet') continue;
        sheet.getCell('B4').value = 'Jun-26';
        sheet.getCell('C4').value = 'Sep-26';
      }
    };
    const asked = await read({ ...PACK, statements: ['income'], change: bare });
    expect(asked.questions.map(({ kind }) => kind)).toEqual(['period-length']);
    expect(asked.facts).toEqual([]);
    const rolling = [tyingPeriod('2026-06-30', 12_400_000, 2_150_000)];
    const closing = Number(rolling[0]?.amounts.closing_cash);
    rolling.push(tyingPeriod('2026-09-30', 12_910_000, closing));
    const proven = await read({ ...PACK, periods: rolling, change: bare });
    expect(amountOf(proven, 'revenue', '2026-09-30', 3)).toBe('12910000');
  });

  test('an answer that was not offered leaves the question open', async () => {
    const reading = await read({ ...PACK, unit: null }, { answers: { unit: '12' } });
    expect(reading.questions[0]?.answer).toBeNull();
  });

  test('is asked: an unknown label, where it is large enough to matter', async () => {
    const change: BorrowerWorkbook['change'] = (workbook) => {
      const cell = workbook.getWorksheet('Income statement')?.getCell('A8');
      if (cell) cell.value = 'Factoring and sundry charges';
    };
    const reading = await read({ ...PACK, change });
    expect(reading.questions.map(({ key }) => key)).toEqual([
      'placement:Income statement:Factoring and sundry charges',
    ]);
    const answers = { 'placement:Income statement:Factoring and sundry charges': 'sga' };
    const answered = await read({ ...PACK, change }, { answers });
    expect(answered.outcome).toBe('ready');
    expect(amountOf(answered, 'sga', '2026-09-30', 3)).toBe('2582000');
  });
});

describe('what a file holds that cannot be taken', () => {
  const spoilt =
    (value: unknown): BorrowerWorkbook['change'] =>
    (workbook) => {
      const cell = workbook.getWorksheet('Income statement')?.getCell('C5');
      if (cell) cell.value = value as never;
    };

  test('an error in a needed cell refuses the file and names the cell', async () => {
    const reading = await read({ ...PACK, change: spoilt({ error: '#REF!' }) });
    expect(reading.refusal).toMatchObject({
      code: 'error-in-needed-cell',
      where: { sheet: 'Income statement', cell: 'C5' },
    });
    expect(reading.refusal?.message).toMatch(/Income statement!C5 holds #REF!.*Nothing was imported\.$/);
    expect(reading.facts).toEqual([]);
  });

  test('a formula without a value is worked out from the cells it names, or refuses the file', async () => {
    const sum = await read({ ...PACK, change: spoilt({ formula: 'C7+C6' }) });
    expect(amountOf(sum, 'revenue', '2026-09-30', 3)).toBe('12910000');
    expect(sum.notes.map(({ code }) => code)).toContain('values-from-formulas');
    const unknown = await read({ ...PACK, change: spoilt({ formula: 'VLOOKUP(A5,Other!A:B,2)' }) });
    expect(unknown.refusal).toMatchObject({ code: 'formulas-not-calculated', where: { cell: 'C5' } });
  });

  test('a balance sheet that does not balance is asked about, and its facts wait', async () => {
    const change: BorrowerWorkbook['change'] = (workbook) => {
      const sheet = workbook.getWorksheet('Balance sheet');
      sheet?.eachRow((row) => {
        if (
          ['Total equity', 'Total equity and liabilities', 'Retained earnings'].includes(row.getCell(1).text)
        )
          row.getCell(3).value = Number(row.getCell(3).value) + 900;
      });
    };
    const reading = await read({ ...PACK, change });
    expect(reading.questions).toMatchObject([{ kind: 'does-not-balance', holdsFor: 'file' }]);
    expect(reading.checks).toContainEqual(
      expect.objectContaining({
        code: 'balance',
        outcome: 'does-not-tie',
        periodEnd: '2026-09-30',
        difference: '-900000',
      }),
    );
    const assets = reading.facts.filter(({ code }) => code === 'total_assets');
    expect(assets.map(({ periodEnd, waitsFor }) => [periodEnd, waitsFor.length])).toEqual([
      ['2026-06-30', 0],
      ['2026-09-30', 1],
    ]);
    const draft = await read({ ...PACK, change }, { answers: { 'does-not-balance:2026-09-30': 'draft' } });
    expect(draft.outcome).toBe('ready');
    const wait = await read({ ...PACK, change }, { answers: { 'does-not-balance:2026-09-30': 'wait' } });
    expect(wait.outcome).toBe('questions');
  });

  test('a form without figures is refused', async () => {
    const empty = { end: '2026-09-30', months: 3, amounts: { revenue: 0, cogs: 0, gross_profit: 0 } };
    const reading = await read({ ...PACK, periods: [empty], statements: ['income'] });
    expect(reading.refusal?.code).toBe('no-amounts');
  });
});
