/** The quarter that a demo borrower owes, as the workbook that finally comes. */
import { inject } from 'vitest';
import { demoBook } from '../../seeders/demo/demoBook.ts';
import type { DemoLine, DemoQuarter } from '../../seeders/demo/demoLines.ts';
import { demoWorkbook } from '../../seeders/demo/demoWorkbook.ts';
import { plainDate } from '../../src/core/calendar/plainDate.ts';

export interface OwedWorkbook {
  readonly borrowerName: string;
  readonly fileName: string;
  readonly bytes: Buffer;
}

/** Lines that grow where money is borrowed and lent on to customers: every identity still ties. */
const GROWING: readonly DemoLine[] = [
  'receivables',
  'current_assets',
  'total_assets',
  'senior_debt',
  'total_liabilities',
  'debt_drawn',
  'cff',
];

/**
 * `moreDebt` in thousands comes on top of what the borrower's story says; so that two files of one borrower differ.
 * The file names neither unit nor currency.
 */
export async function owedWorkbook(borrower: string, moreDebt: number): Promise<OwedWorkbook> {
  const seedDay = plainDate(inject('productSettings')['SEED_DAY'] ?? '');
  const [found] = demoBook(seedDay, ({ name }) => name.startsWith(borrower));
  const latest = found?.quarters.at(-1);
  if (!found?.owed || !latest) throw new Error(`${borrower} owes no quarter`);
  const bytes = await demoWorkbook({
    borrowerName: found.name,
    unit: null,
    quarters: [latest, withMoreDebt(found.owed, moreDebt)],
    madeOn: seedDay,
  });
  return {
    borrowerName: found.name,
    fileName: `${borrower} ${found.owed.quarterEnd}.xlsx`,
    bytes: Buffer.from(bytes),
  };
}

function withMoreDebt({ quarterEnd, lines }: DemoQuarter, more: number): DemoQuarter {
  const grown = GROWING.map((line) => [line, lines[line] + more] as const);
  return { quarterEnd, lines: { ...lines, ...Object.fromEntries(grown), cfo: lines.cfo - more } };
}
