/** Ways in which borrowers' files are messy, and what is done with each. Common practice, no source. */
import { vi } from 'vitest';
import type { Reading, ReadingContext } from '#core/statements/workbookReading.ts';
import { gridWorkbook, type Typed, type TypedSheets } from '../../../../tests/support/gridWorkbook.ts';
import { readWorkbook } from './readWorkbook.ts';

/** Workers start slowly on a busy machine. */
vi.setConfig({ testTimeout: 60_000 });

export const NOTHING_KNOWN: ReadingContext = {
  fiscalYearEndMonth: null,
  reportingCurrency: null,
  answers: {},
  lastQuarterRevenue: null,
};
export type Change = Parameters<typeof gridWorkbook>[1];

export const read = async (
  sheets: TypedSheets,
  context: Partial<ReadingContext> = {},
  change?: Change,
): Promise<Reading> =>
  readWorkbook(await gridWorkbook(sheets, change), 'sent.xlsx', { ...NOTHING_KNOWN, ...context });

/** 'revenue 2026-09-30 3' → amount; parts of one line are added with a plus. */
export const figures = (reading: Reading): Record<string, string> => {
  const found: Record<string, string> = {};
  for (const { code, periodEnd, months, amount } of reading.facts) {
    const key = `${code} ${periodEnd} ${months}`;
    found[key] = found[key] === undefined ? amount : `${found[key]}+${amount}`;
  }
  return found;
};
export const kinds = ({ questions }: Reading) =>
  questions.filter(({ answer }) => answer === null).map(({ kind }) => kind);
export const codes = ({ notes }: Reading) => notes.map(({ code }) => code);

/** Revenue, 60 % cost of sales, 20 % administration. */
export const income = (
  headings: readonly Typed[],
  revenue: readonly number[],
  unit: Typed = 'EUR thousand',
): Typed[][] => [
  [unit],
  [null, ...headings],
  ['Revenue', ...revenue],
  ['Cost of sales', ...revenue.map((amount) => amount * 0.6)],
  ['Gross profit', ...revenue.map((amount) => amount * 0.4)],
  ['Administrative expenses', ...revenue.map((amount) => amount * 0.2)],
  ['Operating profit', ...revenue.map((amount) => amount * 0.2)],
];
export const balance = (
  headings: readonly Typed[],
  cash: readonly number[],
  unit: Typed = 'EUR thousand',
): Typed[][] => [
  [unit],
  [null, ...headings],
  ['Cash', ...cash],
  ['Trade receivables', ...cash.map((amount) => amount * 2)],
  ['Total current assets', ...cash.map((amount) => amount * 3)],
  ['Property, plant and equipment', ...cash.map((amount) => amount * 5)],
  ['Total assets', ...cash.map((amount) => amount * 8)],
  ['Trade payables', ...cash.map((amount) => amount * 3)],
  ['Total liabilities', ...cash.map((amount) => amount * 3)],
  ['Total equity', ...cash.map((amount) => amount * 5)],
  ['Total equity and liabilities', ...cash.map((amount) => amount * 8)],
];
