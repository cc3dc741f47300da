import { fileURLToPath } from 'node:url';
import { afterAll, expect, test } from 'vitest';
import type { Reading } from '../../src/core/statements/workbookReading.ts';
import { nothingRead } from '../../src/server/sheets/read/readings.ts';
import { readingPool, readWorkbook } from '../../src/server/sheets/read/readWorkbook.ts';
import { refusal } from '../../src/server/sheets/read/refusals.ts';
import { seeded } from '../../tests/fixtures/workbooks/inventedAccounts.ts';
import { examplesIn } from './examples.ts';
import { mutantOf } from './mutations.ts';
import { faultOf, fuzz } from './run.ts';

const FOLDER = fileURLToPath(new URL('../../tests/fixtures/workbooks/examples', import.meta.url));
const COUNT = 80;
const MOST_MILLISECONDS = 240_000;
const NOTHING_KNOWN = {
  fiscalYearEndMonth: null,
  reportingCurrency: null,
  answers: {},
  lastQuarterRevenue: null,
};
const NUMBERS = Array.from({ length: COUNT }, (_, at) => at + 1);

afterAll(() => readingPool().close());

test(
  'damaged files crash nothing, hang nothing, and end in a refusal or in a reading that is one',
  async () => {
    const read = (bytes: Buffer, name: string) => readWorkbook(bytes, name, NOTHING_KNOWN);
    const result = await fuzz(await examplesIn(FOLDER), (number) => seeded(number), NUMBERS, read);
    expect(result.failures.map(({ number, what }) => `${number}: ${what}`)).toEqual([]);
    expect([...result.ends.values()].reduce((sum, times) => sum + times, 0)).toBe(COUNT);
    expect(result.ends.has('questions') || result.ends.has('ready')).toBe(true);
  },
  MOST_MILLISECONDS,
);

test('one seed damages a file in one way', async () => {
  const [example] = await examplesIn(FOLDER);
  if (!example) throw new Error('there are example files');
  expect(mutantOf(example, seeded(7))).toEqual(mutantOf(example, seeded(7)));
  expect(mutantOf(example, seeded(7)).bytes.equals(mutantOf(example, seeded(8)).bytes)).toBe(false);
});

test('a reading that contradicts itself, hangs or throws is a failure', async () => {
  const late = nothingRead(refusal('took-too-long', null, 'more than 5 seconds'));
  const ready: Reading = { ...late, outcome: 'ready', refusal: null };
  const fact = {
    code: 'revenue',
    periodEnd: '2026-09-30',
    months: 3,
    periodStart: '2026-07-01',
    amount: '1e5',
  } as const;
  const rest = {
    sheet: 'P&L',
    cell: 'B3',
    rawText: '',
    label: '',
    fromFormula: false,
    waitsFor: [],
    borrower: null,
  };
  expect(faultOf(late)).toMatch(/hung/);
  expect(faultOf(ready)).toBeNull();
  expect(faultOf({ ...ready, facts: [{ ...fact, ...rest }] })).toMatch(/B3 was read as the amount 1e5/);
  const failing = await fuzz(
    await examplesIn(FOLDER),
    (number) => seeded(number),
    [1],
    () => {
      throw new Error('no such cell');
    },
  );
  expect(failing.failures).toMatchObject([{ number: 1, what: 'no such cell' }]);
});
