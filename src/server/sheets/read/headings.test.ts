import { expect, test } from 'vitest';
import { readHeadingText } from './headingText.ts';
import { readPeriodText } from './periodText.ts';
import { currencyOfFormat, readScaleText } from './scaleText.ts';

test.each([
  ['3 months to 31 Dec 2025', { end: '2025-12-31', months: 3 }],
  ['Nine months ended September 30, 2026', { end: '2026-09-30', months: 9 }],
  ['Profit and loss account for the year ended 31 March 2026', { end: '2026-03-31', months: 12 }],
  [
    'Geschäftsjahr vom 1. Januar bis 31. Dezember 2025',
    { start: '2025-01-01', end: '2025-12-31', months: 12 },
  ],
  ['1 January 2026 - 30 September 2026', { end: '2026-09-30', months: 9 }],
  ['Jul-Sep 2026', { start: '2026-07-01', end: '2026-09-30', months: 3 }],
  ['Nov 2025 to Jan 2026', { start: '2025-11-01', end: '2026-01-31', months: 3 }],
  ['Sep-26', { end: '2026-09-30', months: null }],
  ['30 Sept 2026', { end: '2026-09-30' }],
  ['31.12.2025', { end: '2025-12-31' }],
  ['30/09/2026', { end: '2026-09-30', eitherDay: null }],
  ['03/04/2026', { end: null, eitherDay: { dmy: '2026-04-03', mdy: '2026-03-04' } }],
  ['Q3 2026', { quarter: 3, year: 2026, fiscal: false }],
  ['3Q26', { quarter: 3, year: 2026 }],
  ['T3 2026', { quarter: 3, year: 2026 }],
  ['3. Quartal 2026', { quarter: 3, year: 2026 }],
  ['Q3 FY26', { quarter: 3, year: 2026, fiscal: true }],
  ['H1 2026', { half: 1, year: 2026 }],
  ['P6 FY26', { periodNumber: 6, year: 2026, fiscal: true }],
  ['2025/26', { year: 2026, fiscal: true }],
  ['9M 2026', { months: 9, year: 2026 }],
  ['YTD Sep-26', { end: '2026-09-30', yearToDate: true, months: null }],
  ['LTM Sep-26', { end: '2026-09-30', months: 12 }],
  ['53 weeks ended 2 January 2027', { end: '2027-01-02', months: 12, weeks: 53 }],
  ['Consolidated', { end: null, year: null, quarter: null, months: null }],
])("'%s' names its period", (text, said) => {
  expect(readPeriodText(text)).toMatchObject(said);
});

test.each([
  ['Dec-26E', { scenario: 'forecast' }],
  ['2026B', { scenario: 'budget' }],
  ['Q3 2026 Actual', { scenario: 'actual' }],
  ['Var. %', { derived: true }],
  ['Abweichung', { derived: true }],
  ['Vorjahr', { priorYear: true }],
  ['FY25 restated', { restated: true }],
  ['Note', { note: true }],
  ['Debit EUR', { side: 'debit' }],
  ['Holding AG', { rest: 'holding ag', scenario: null, derived: false }],
])("'%s' says more than a period", (text, said) => {
  expect(readHeadingText(text)).toMatchObject(said);
});

test.each([
  ["EUR '000", 1000, 'EUR'],
  ["£'000", 1000, 'GBP'],
  ['TEUR', 1000, 'EUR'],
  ['T€', 1000, 'EUR'],
  ['kSEK', 1000, 'SEK'],
  ['MSEK', 1_000_000, 'SEK'],
  ['EUR m', 1_000_000, 'EUR'],
  ['Mio. EUR', 1_000_000, 'EUR'],
  ['miles de euros', 1000, 'EUR'],
  ['(en euros)', 1, 'EUR'],
  ['in millions of US dollars', 1_000_000, 'USD'],
  ['Reporting currency: EUR', null, 'EUR'],
  ['thousands', 1000, null],
  ['EUR and USD thousand', 1000, null],
])("'%s' states its unit and currency", (text, unit, currency) => {
  expect(readScaleText(text)).toMatchObject({ unit, currency });
});

test('signs that several currencies share name none', () => {
  expect(readScaleText("$'000")).toMatchObject({ currency: null, sharedSign: '$' });
  expect(readScaleText('tkr')).toMatchObject({ unit: 1000, currency: null, sharedSign: 'kr' });
  expect(currencyOfFormat('$#,##0')).toEqual({ currency: null, sharedSign: '$' });
  expect(currencyOfFormat('[$€-407] #,##0')).toEqual({ currency: 'EUR', sharedSign: null });
});
