/** The ways in which files are messy, by number, each with a test of its own; what is done is common practice. */
import { afterAll, test } from 'vitest';
import type { Reading, ReadingContext } from '#core/statements/workbookReading.ts';
import { gridWorkbook, type Typed, type TypedSheets } from '../../../../../tests/support/gridWorkbook.ts';
import { readingPool, readWorkbook } from '../readWorkbook.ts';
import { NOTHING_KNOWN, type Change } from '../messyFiles.fixture.ts';

export { balance, codes, figures, income, kinds } from '../messyFiles.fixture.ts';
export type { Change } from '../messyFiles.fixture.ts';

/** Workers start slowly on a busy machine. */
const MOST_MILLISECONDS = 60_000;

afterAll(() => readingPool().close());

/** One test of one mess. */
export const mess = (number: number, title: string, body: () => Promise<void>): void =>
  test(`mess ${number}: ${title}`, body, MOST_MILLISECONDS);

export const readBytesAs = (
  bytes: Buffer,
  name = 'sent.xlsx',
  context: Partial<ReadingContext> = {},
): Promise<Reading> => readWorkbook(bytes, name, { ...NOTHING_KNOWN, ...context });

export const readSheets = async (
  sheets: TypedSheets,
  context: Partial<ReadingContext> = {},
  change?: Change,
): Promise<Reading> => readBytesAs(await gridWorkbook(sheets, change), 'sent.xlsx', context);

export const readText = (text: string, context: Partial<ReadingContext> = {}): Promise<Reading> =>
  readBytesAs(Buffer.from(text), 'sent.csv', context);

const written = (value: Typed): string => {
  if (value === null) return '';
  if (value instanceof Date) return value.toISOString().slice(0, 10);
  if (typeof value !== 'object') return String(value);
  return 'error' in value ? value.error : String(value.result ?? '');
};

/** The rows as a text file with semicolons. */
export const asText = (rows: readonly (readonly Typed[])[]): string =>
  rows.map((row) => row.map(written).join(';')).join('\r\n');

/** The same rows as a workbook of one sheet and as a text file: both are read alike. */
export async function bothWays(
  rows: readonly (readonly Typed[])[],
  check: (reading: Reading) => void,
  context: Partial<ReadingContext> = {},
): Promise<void> {
  check(await readSheets({ Sheet1: rows }, context));
  check(await readText(asText(rows), context));
}

export const amount = (reading: Reading, code: string, end: string, months: number): string | undefined =>
  reading.facts.find((fact) => fact.code === code && fact.periodEnd === end && fact.months === months)
    ?.amount;

/** Facts that may be taken as they are. */
export const taken = (reading: Reading): Reading['facts'] =>
  reading.facts.filter(({ waitsFor }) => waitsFor.length === 0);
