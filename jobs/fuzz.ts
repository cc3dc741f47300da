/**
 * npm run fuzz [-- --count N] [--seed N] [--only N] [--keep FOLDER]: reads the example files with random damage, 20,000
 * of them in a full run. Exit 1 where a reading crashes, hangs or contradicts itself. A run with the same seed is the
 * same run; --only reads one file of it again, --keep writes the files that failed into a folder. Needs no database.
 */
import { mkdirSync, writeFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import type { ReadingContext } from '../src/core/statements/workbookReading.ts';
import { readWorkbook } from '../src/server/sheets/read/readWorkbook.ts';
import { seeded } from '../tests/fixtures/workbooks/inventedAccounts.ts';
import { examplesIn } from './fuzz/examples.ts';
import { fuzz, type FuzzResult } from './fuzz/run.ts';

const FULL_RUN = 20_000;
const SAID_EVERY = 1_000;
const NOTHING_KNOWN: ReadingContext = {
  fiscalYearEndMonth: null,
  reportingCurrency: null,
  answers: {},
  lastQuarterRevenue: null,
};

const { values } = parseArgs({
  options: {
    count: { type: 'string', default: String(FULL_RUN) },
    seed: { type: 'string', default: '1' },
    only: { type: 'string' },
    keep: { type: 'string' },
  },
});
const [count, seed] = [Number(values.count), Number(values.seed)];

const rejections: unknown[] = [];
process.on('unhandledRejection', (reason) => rejections.push(reason));

if (!Number.isInteger(count) || count < 1 || !Number.isInteger(seed)) {
  console.error('--count and --seed are whole numbers, --count at least 1.');
  process.exitCode = 2;
} else {
  const folder = fileURLToPath(new URL('../tests/fixtures/workbooks/examples', import.meta.url));
  const numbers =
    values.only === undefined ? Array.from({ length: count }, (_, at) => at + 1) : [Number(values.only)];
  const result = await fuzz(
    await examplesIn(folder),
    (number) => seeded(seed * 1_000_003 + number),
    numbers,
    (bytes, name) => readWorkbook(bytes, name, NOTHING_KNOWN),
    (done) => {
      if (done % SAID_EVERY === 0) console.error(`${done} of ${numbers.length} files read`);
    },
  );
  report(result, values.keep);
}

function report({ count: read, ends, failures }: FuzzResult, keep: string | undefined): void {
  for (const { number, file, how, what, bytes } of failures) {
    console.log(`file ${number} (${file}, damaged in its ${how}): ${what}`);
    if (keep === undefined) continue;
    const folder = resolve(process.env.CALLER_FOLDER ?? process.cwd(), keep);
    mkdirSync(folder, { recursive: true });
    writeFileSync(join(folder, `${number} ${file}`), bytes);
  }
  for (const reason of rejections) console.log(`unhandled rejection: ${String(reason)}`);
  const ended = [...ends].sort((one, other) => other[1] - one[1]).map(([end, times]) => `${end} ${times}`);
  console.log(`${read} files read with seed ${seed}: ${ended.join(', ')}`);
  console.log(`${failures.length} failed, ${rejections.length} unhandled rejections`);
  if (failures.length + rejections.length > 0) process.exitCode = 1;
}
