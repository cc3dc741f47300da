import { mkdir, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { PlainDate } from '../src/core/calendar/plainDate.ts';
import { demoBook, LATE } from './demo/demoBook.ts';
import { demoWorkbook } from './demo/demoWorkbook.ts';

interface DemoUpload {
  readonly path: string;
  readonly borrowerName: string;
  /** What is special about the file. */
  readonly remark: string;
}

/**
 * The quarters that two borrowers owe, as workbooks to upload by hand: one says its unit, the other does not, so
 * that it has to be asked. A file that is there stays as it is: who uploads it twice sends the same bytes.
 */
export async function writeUploads(folder: string, seedDay: PlainDate): Promise<DemoUpload[]> {
  await mkdir(folder, { recursive: true });
  const owing = demoBook(seedDay, ({ scenario }) => LATE.includes(scenario));
  return Promise.all(
    owing.map(async ({ name, scenario, currency, quarters, owed }) => {
      const statesUnit = scenario === 'late';
      const newQuarters = [quarters.at(-1), owed].filter(
        (quarter) => quarter !== null && quarter !== undefined,
      );
      const quarterEnd = owed?.quarterEnd ?? seedDay;
      const stem = `${name.split(' ')[0]} ${quarterEnd.slice(0, 7)}${statesUnit ? '' : ' no unit'}`;
      const path = join(folder, `${stem}.xlsx`);
      const bytes = await demoWorkbook({
        borrowerName: name,
        unit: statesUnit ? `${currency} thousands` : null,
        quarters: newQuarters,
        madeOn: seedDay,
      });
      await writeFile(path, bytes, { flag: 'wx' }).catch(unlessThere);
      const remark = statesUnit ? `in ${currency} thousands` : 'no unit or currency stated: it is asked';
      return { path, borrowerName: name, remark };
    }),
  );
}

function unlessThere(error: unknown): void {
  if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error;
}
