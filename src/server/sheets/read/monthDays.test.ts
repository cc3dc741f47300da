import { afterAll, expect, test } from 'vitest';
import { balance, figures, income, kinds, read } from './messyFiles.fixture.ts';
import { readingPool } from './readWorkbook.ts';

afterAll(() => readingPool().close());

test('years below a day without a year are that day of each year', async () => {
  const rows = income(['2026', '2025'], [2000, 1900], 'EUR thousand');
  for (const title of [
    'Nine months ended 30 September',
    'Nine months ended September 30,',
    'Nine months ended 30 September 2026',
  ]) {
    const reading = await read({ PnL: [[title], ...rows] });
    expect(figures(reading), title).toMatchObject({
      'revenue 2026-09-30 9': '2000000',
      'revenue 2025-09-30 9': '1900000',
    });
  }
});

test("'September 30' is no month of 2030, over years in two levels", async () => {
  const reading = await read({
    PnL: [
      ['in thousands of euros'],
      [null, 'Three months ended September 30,', null, 'Nine months ended September 30,', null],
      [null, 2026, 2025, 2026, 2025],
      ['Net sales', 2000, 1900, 5900, 5600],
      ['Cost of goods sold', 1200, 1140, 3600, 3400],
      ['Gross profit', 800, 760, 2300, 2200],
    ],
  });
  expect(figures(reading)).toMatchObject({
    'revenue 2026-09-30 3': '2000000',
    'revenue 2025-09-30 3': '1900000',
    'revenue 2026-09-30 9': '5900000',
    'revenue 2025-09-30 9': '5600000',
  });
});

test('a balance date gives its day to the column of its own year only', async () => {
  const reading = await read({
    BS: [['Balance sheet as at 30 September 2026'], ...balance(['2026', '2025'], [100, 90])],
  });
  expect(figures(reading)).toHaveProperty(['cash 2026-09-30 0']);
  expect(kinds(reading)).toEqual(['year-end']);
});

test('months below a year are taken in their order, and a month to date is one month', async () => {
  const months = [['Management accounts 2026'], ...income(['Jan', 'Feb', 'Mar'], [100, 110, 120])];
  const reading = await read({ PnL: months });
  expect(kinds(reading)).toEqual(['period-length']);
  const key = reading.questions[0]?.key ?? '';
  expect(figures(await read({ PnL: months }, { answers: { [key]: 'each:1' } }))).toHaveProperty([
    'revenue 2026-02-28 1',
  ]);
  const wrapped = await read({
    PnL: [['Management accounts 2026'], ...income(['Nov', 'Dec', 'Jan'], [100, 110, 120])],
  });
  expect(wrapped.facts).toEqual([]);
  const toDate = await read({ PnL: income(['Sep 2026 MTD'], [100]) });
  expect(figures(toDate)).toHaveProperty(['revenue 2026-09-30 1']);
});
