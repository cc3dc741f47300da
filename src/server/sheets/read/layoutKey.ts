/** The layout of a file, amounts and periods aside: the next file of the same make has the same key. */
import { createHash } from 'node:crypto';
import { MONTH_PATTERN } from './monthNames.ts';
import { plainText } from './plainWords.ts';
import type { StatementTable } from './statements.ts';

const MONTH = new RegExp(`(?<![a-z])(?:${MONTH_PATTERN})(?![a-z])`, 'g');

/** 'Q3 2026' and 'Q4 2026', 'Sep-26' and 'Dec-26' are one shape. */
const shape = (text: string): string =>
  plainText(text).replace(MONTH, 'm').replace(/\d+/g, '#').replace(/\s+/g, ' ').trim();

export function layoutKeyOf(tables: readonly StatementTable[]): string {
  const parts = tables.map(({ table, columns }) => ({
    sheet: shape(table.sheet.name),
    headings: [...new Set(columns.map(({ heading }) => shape(heading)))].sort(),
    labels: table.rows.map(({ label }) => shape(label)).filter((label) => label !== ''),
  }));
  return createHash('sha256').update(JSON.stringify(parts)).digest('hex');
}
