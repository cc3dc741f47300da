import { describe, expect, test } from 'vitest';
import { decimal } from '../money/decimal.ts';
import { currentStatements } from './currentStatements.ts';
import { balanceAt, flowOver, lastTwelveMonths, quarterFlow } from './flows.ts';
import type { Reading } from './reading.ts';
import { buildStatement } from './statement.fixture.ts';
import { bookOf, openBook } from './statementBook.ts';

const amount = (reading: Reading): string =>
  reading.kind === 'value' ? reading.value.toFixed() : reading.kind;

describe('the statement in force', () => {
  test('is the latest version of a period', () => {
    const first = buildStatement('2025-12-31', 12, { revenue: 100 });
    const second = buildStatement('2025-12-31', 12, { revenue: 97 }, { version: 2 });
    expect(currentStatements([second, first], { scope: 'group', asOf: '2026-06-30' })).toEqual([second]);
  });

  test('is audited over reviewed over management, whatever the version', () => {
    const audited = buildStatement('2025-12-31', 12, { revenue: 100 }, { basis: 'audited' });
    const reviewed = buildStatement('2025-12-31', 12, { revenue: 98 }, { basis: 'reviewed', version: 5 });
    const management = buildStatement('2025-12-31', 12, { revenue: 97 }, { version: 9 });
    const selection = { scope: 'group', asOf: '2026-06-30' } as const;
    expect(currentStatements([management, audited, reviewed], selection)).toEqual([audited]);
    expect(currentStatements([management, reviewed], selection)).toEqual([reviewed]);
  });

  test('is never a forecast, never of another scope, never received after the day', () => {
    const statements = [
      buildStatement('2025-12-31', 12, { revenue: 1 }, { basis: 'forecast' }),
      buildStatement('2025-12-31', 12, { revenue: 2 }, { scope: 'stand-alone' }),
      buildStatement('2025-12-31', 12, { revenue: 3 }, { receivedOn: '2026-03-02' }),
    ];
    expect(currentStatements(statements, { scope: 'group', asOf: '2026-03-01' })).toEqual([]);
    expect(currentStatements(statements, { scope: 'group', asOf: '2026-03-02' })).toHaveLength(1);
  });
});

describe('balances and exact periods', () => {
  test('a period end within six days of a month end belongs to that month', () => {
    const statements = [buildStatement('2025-12-28', 0, { cash: 7 })];
    expect(amount(balanceAt(bookOf(statements, 12), 'cash', '2025-12-31'))).toBe('7');
  });

  test('a zero is a zero and a blank is missing, named by line and period', () => {
    const statements = [buildStatement('2025-12-31', 0, { cash: 0 })];
    expect(amount(balanceAt(bookOf(statements, 12), 'cash', '2025-12-31'))).toBe('0');
    expect(balanceAt(bookOf(statements, 12), 'inventory', '2025-12-31')).toEqual({
      kind: 'missing',
      missing: [{ line: 'inventory', periodEnd: '2025-12-31', months: 0 }],
    });
    expect(flowOver(bookOf(statements, 12), 'revenue', '2025-12-31', 12)).toEqual({
      kind: 'missing',
      missing: [{ line: 'statement', periodEnd: '2025-12-31', months: 12 }],
    });
  });

  test('depreciation and amortisation are put together where the sheet gives them apart', () => {
    const apart = [buildStatement('2025-12-31', 12, { depreciation: 3, amortisation: 0.7 })];
    const sum = [buildStatement('2025-12-31', 12, { depreciation_and_amortisation: 3.7 })];
    for (const statements of [apart, sum])
      expect(
        amount(flowOver(bookOf(statements, 12), 'depreciation_and_amortisation', '2025-12-31', 12)),
      ).toBe('3.7');
  });
});

describe('depreciation alone', () => {
  const earlier = buildStatement('2024-12-31', 12, { depreciation: 3, amortisation: 0.7 });
  const alone = buildStatement('2025-12-31', 12, { depreciation: 3 });

  test('is all there is where amortisation was never carried', () => {
    const book = bookOf([alone], 12);
    expect(amount(flowOver(book, 'depreciation_and_amortisation', '2025-12-31', 12))).toBe('3');
  });

  test('is not all there is where amortisation was carried before: the blank is missing', () => {
    const book = bookOf([earlier, alone], 12);
    expect(flowOver(book, 'depreciation_and_amortisation', '2025-12-31', 12)).toEqual({
      kind: 'missing',
      missing: [{ line: 'depreciation_and_amortisation', periodEnd: '2025-12-31', months: 12 }],
    });
  });
});

describe('a line that many borrowers do not have', () => {
  const yearsToDate = (lines: readonly (number | undefined)[]) =>
    bookOf(
      (['2024-09-30', '2024-12-31', '2025-09-30'] as const).map((end, k) =>
        buildStatement(end, [9, 12, 9][k]!, { revenue: 100, interest_income: lines[k] }),
      ),
      12,
    );
  const over = (lines: readonly (number | undefined)[]) =>
    amount(lastTwelveMonths(yearsToDate(lines), 'interest_income', '2025-09-30', 'optional'));

  test('is nought where no statement ever carried it', () => {
    expect(over([undefined, undefined, undefined])).toBe('0');
  });

  test('is none before the first statement that carries it', () => {
    expect(over([undefined, undefined, 5])).toBe('5');
  });

  test('is missing where it was carried before and is left out', () => {
    expect(over([4, 6, undefined])).toBe('missing');
    expect(over([4, undefined, 5])).toBe('missing');
  });

  test('is no reason to make up a statement that is not there', () => {
    const book = yearsToDate([undefined, undefined, 5]);
    expect(lastTwelveMonths(book, 'interest_income', '2025-12-31', 'optional').kind).toBe('missing');
  });
});

describe('a quarter', () => {
  const yearToDate = [
    buildStatement('2025-03-31', 3, { revenue: 20 }),
    buildStatement('2025-09-30', 9, { revenue: 66 }),
    buildStatement('2025-12-31', 12, { revenue: 95 }),
  ];

  test('is the three-month statement, else a difference of years to date', () => {
    expect(amount(quarterFlow(bookOf(yearToDate, 12), 'revenue', '2025-03-31'))).toBe('20');
    expect(amount(quarterFlow(bookOf(yearToDate, 12), 'revenue', '2025-12-31'))).toBe('29');
  });

  test('is missing where a year to date is missing, and says which', () => {
    expect(quarterFlow(bookOf(yearToDate, 12), 'revenue', '2025-09-30')).toEqual({
      kind: 'missing',
      missing: [{ line: 'statement', periodEnd: '2025-06-30', months: 6 }],
    });
  });

  test('never crosses a year end', () => {
    expect(
      amount(
        quarterFlow(
          bookOf([...yearToDate, buildStatement('2026-03-31', 3, { revenue: 22 })], 12),
          'revenue',
          '2026-03-31',
        ),
      ),
    ).toBe('22');
  });
});

describe('twelve months', () => {
  const pieces = [
    buildStatement('2024-09-30', 9, { revenue: 74 }),
    buildStatement('2024-12-31', 12, { revenue: 100 }),
    buildStatement('2025-09-30', 9, { revenue: 82 }),
  ];

  test('are year to date + last full year - the same year to date a year earlier, each with its sign', () => {
    const reading = lastTwelveMonths(bookOf(pieces, 12), 'revenue', '2025-09-30');
    expect(amount(reading)).toBe('108');
    expect(reading.kind === 'value' && reading.inputs.map(({ sign, months }) => [sign, months])).toEqual([
      [1, 9],
      [1, 12],
      [-1, 9],
    ]);
  });

  test('are missing where any part is missing, with the gap named', () => {
    expect(lastTwelveMonths(bookOf(pieces.slice(1), 12), 'revenue', '2025-09-30')).toEqual({
      kind: 'missing',
      missing: [{ line: 'statement', periodEnd: '2024-09-30', months: 9 }],
    });
  });

  test('are four quarters where there is no year to date', () => {
    const quarters = ['2024-12-31', '2025-03-31', '2025-06-30', '2025-09-30'].map((end, index) =>
      buildStatement(end as '2024-12-31', 3, { revenue: 20 + index }),
    );
    expect(amount(lastTwelveMonths(bookOf(quarters, 12), 'revenue', '2025-09-30'))).toBe('86');
  });

  test('from quarters name the quarter that is missing, not a year to date that never came', () => {
    const quarters = (['2024-12-31', '2025-03-31', '2025-09-30'] as const).map((end) =>
      buildStatement(end, 3, { revenue: 20 }),
    );
    expect(lastTwelveMonths(bookOf(quarters, 12), 'revenue', '2025-09-30')).toEqual({
      kind: 'missing',
      missing: [{ line: 'statement', periodEnd: '2025-06-30', months: 3 }],
    });
  });

  const quarterly = (last: number) => [
    ...[20, 30, 25].map((revenue, index) =>
      buildStatement((['2025-03-31', '2025-06-30', '2025-09-30'] as const)[index]!, 3, { revenue }),
    ),
    buildStatement('2025-12-31', 3, { revenue: last }),
  ];

  test('by two routes may differ by what rounding explains and no more', () => {
    // five figures rounded to whole units: tolerance 5 x 1 / 2 = 2.5
    const year = buildStatement('2025-12-31', 12, { revenue: 100 });
    expect(amount(lastTwelveMonths(bookOf([year, ...quarterly(27.5)], 12), 'revenue', '2025-12-31'))).toBe(
      '100',
    );
    const apart = lastTwelveMonths(bookOf([year, ...quarterly(27.6)], 12), 'revenue', '2025-12-31');
    expect(apart.kind === 'not-meaningful' && apart.reason).toMatch(/100 by .* and 102\.6 by four quarters/);
  });

  test('that rest on an audited year supersede quarters on management figures', () => {
    const audited = buildStatement('2025-12-31', 12, { revenue: 100 }, { basis: 'audited' });
    expect(amount(lastTwelveMonths(bookOf([audited, ...quarterly(40)], 12), 'revenue', '2025-12-31'))).toBe(
      '100',
    );
  });
});

describe('of several routes', () => {
  test('the one that rests on better founded figures is taken', () => {
    const year = buildStatement('2025-12-31', 12, { revenue: 100 });
    const quarters = (['2025-03-31', '2025-06-30', '2025-09-30', '2025-12-31'] as const).map((end) =>
      buildStatement(end, 3, { revenue: 20 }, { basis: 'audited' }),
    );
    expect(amount(lastTwelveMonths(bookOf([year, ...quarters], 12), 'revenue', '2025-12-31'))).toBe('80');
  });
});

describe('a restatement', () => {
  const selection = { scope: 'group', asOf: '2026-12-31' } as const;
  const originals = [
    buildStatement('2024-09-30', 9, { revenue: 74, cogs: 40 }, { receivedOn: '2024-11-10' }),
    buildStatement('2024-12-31', 12, { revenue: 100, cogs: 60 }, { receivedOn: '2025-02-20' }),
    buildStatement('2025-09-30', 9, { revenue: 82, cogs: 45 }, { receivedOn: '2025-11-10' }),
  ];
  const restated = (end: '2024-09-30' | '2024-12-31', months: number, revenue: number, cogs: number) =>
    buildStatement(end, months, { revenue, cogs }, { version: 2, receivedOn: '2025-11-10' });

  test('of both parts gives the same twelve months (97 - 71 = 100 - 74)', () => {
    const all = openBook(
      [...originals, restated('2024-12-31', 12, 97, 60), restated('2024-09-30', 9, 71, 40)],
      selection,
      12,
    );
    expect(amount(lastTwelveMonths(all, 'revenue', '2025-09-30'))).toBe('108');
  });

  test('of one part alone is not mixed into twelve months', () => {
    const onlyYear = [...originals, restated('2024-12-31', 12, 97, 60)];
    const onlyNineMonths = [...originals, restated('2024-09-30', 9, 71, 40)];
    for (const all of [onlyYear, onlyNineMonths]) {
      const reading = lastTwelveMonths(bookOf(all, 12), 'revenue', '2025-09-30');
      expect(reading.kind === 'not-meaningful' && reading.reason).toContain('not mixed');
    }
  });

  test('leaves lines alone that it did not change', () => {
    const all = [...originals, restated('2024-12-31', 12, 97, 60)];
    expect(amount(lastTwelveMonths(bookOf(all, 12), 'cogs', '2025-09-30'))).toBe('65');
  });

  test('is not what a new version is that comes before any later period', () => {
    const closed = buildStatement(
      '2024-12-31',
      12,
      { revenue: 97 },
      { version: 2, receivedOn: '2025-03-31' },
    );
    expect(amount(lastTwelveMonths(bookOf([...originals, closed], 12), 'revenue', '2025-09-30'))).toBe('105');
  });
});

test('amounts enter as decimals, not doubles', () => {
  const statements = [0.1, 0.2, 0.3, 0.4].map((revenue, index) =>
    buildStatement((['2025-03-31', '2025-06-30', '2025-09-30', '2025-12-31'] as const)[index]!, 3, {
      revenue,
    }),
  );
  const reading = lastTwelveMonths(bookOf(statements, 12), 'revenue', '2025-12-31');
  expect(reading.kind === 'value' && reading.value.eq(decimal(1))).toBe(true);
});
