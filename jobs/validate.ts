/**
 * npm run validate -- [--seeds 201-230] [--quick] [--write]: tries score and patterns on simulated books.
 *
 * Prints size, power, area under the curve and false shares, for the product's methods and for published measures on
 * the same books. --quick takes the first seed only; --write keeps the figures where the method page finds them.
 * Exit codes: 0 done, 1 a bound fails, 2 the arguments cannot be used. Needs no database.
 */
import { writeFile } from 'node:fs/promises';
import { parseArgs } from 'node:util';
import { plainDate } from '#core/calendar/plainDate.ts';
import { validationFigures } from '#contracts/validation.ts';
import { report } from './validate/report.ts';
import { runSeeds } from './validate/runSeeds.ts';
import { figuresOf, SEEDS, type Seeds } from './validate/validation.ts';

const FIGURES = new URL('../src/core/validation.json', import.meta.url);

process.exitCode = await main();

async function main(): Promise<number> {
  const wanted = wantedRun();
  if (wanted === null) {
    console.error('usage: npm run validate -- [--seeds FROM-TO] [--quick] [--write]\nNothing was computed.');
    return 2;
  }
  const today = plainDate(new Date().toISOString().slice(0, 10));
  const results = await runSeeds(wanted.seeds, (done) => {
    if (process.stderr.isTTY) process.stderr.write(`\r${done} seeds done`);
  });
  const figures = figuresOf(wanted.seeds, results, today);
  if (process.stderr.isTTY) process.stderr.write('\r');
  console.log(report(figures));
  if (wanted.isWriting)
    await writeFile(FIGURES, `${JSON.stringify(validationFigures.parse(rounded(figures)), null, 2)}\n`);
  return figures.bounds.every(({ holds }) => holds) ? 0 : 1;
}

function wantedRun(): { readonly seeds: Seeds; readonly isWriting: boolean } | null {
  try {
    const { values } = parseArgs({
      options: { seeds: { type: 'string' }, quick: { type: 'boolean' }, write: { type: 'boolean' } },
    });
    const seeds = values.seeds === undefined ? SEEDS : seedsOf(values.seeds);
    if (!seeds) return null;
    return {
      seeds: values.quick ? { from: seeds.from, to: seeds.from } : seeds,
      isWriting: values.write ?? false,
    };
  } catch (error) {
    if (error instanceof TypeError) return null;
    throw error;
  }
}

function seedsOf(text: string): Seeds | null {
  const match = /^(\d{1,6})-(\d{1,6})$/.exec(text);
  const [from, to] = [Number(match?.[1]), Number(match?.[2])];
  return match && from >= 1 && to >= from ? { from, to } : null;
}

/** Five decimals: finer than any of it is known. */
function rounded(figures: unknown): unknown {
  return JSON.parse(
    JSON.stringify(figures, (_, value: unknown) =>
      typeof value === 'number' ? Number(value.toFixed(5)) : value,
    ),
  );
}
