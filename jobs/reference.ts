/**
 * npm run reference -- FILE.json [--print]: runs a file of reference vectors through the core.
 *
 * Prints `id key expected got` for each mismatch and, last, how many are right and wrong; exits non-zero on any
 * wrong. --print prints every computed value as JSON first. Needs no database.
 */
import { readFile } from 'node:fs/promises';
import { resolve } from 'node:path';
import { checkFile, type Checked } from './reference/checkFile.ts';

const [, , ...args] = process.argv;
const path = args.find((arg) => !arg.startsWith('--'));

if (path === undefined) {
  console.error('Which file? npm run reference -- FILE.json [--print]');
  process.exitCode = 2;
} else {
  report(await checked(path), args.includes('--print'));
}

async function checked(file: string): Promise<readonly Checked[]> {
  const from = process.env['CALLER_FOLDER'] ?? process.cwd();
  return checkFile(JSON.parse(await readFile(resolve(from, file), 'utf8')));
}

function report(results: readonly Checked[], isPrinting: boolean): void {
  if (isPrinting) console.log(JSON.stringify(computedValues(results), null, 2));
  for (const result of results)
    if (result.outcome === 'wrong')
      for (const { id, key, expected, got } of result.mismatches)
        console.log(`${id} ${key} ${JSON.stringify(expected)} ${JSON.stringify(got) ?? 'nothing'}`);
  const count = (outcome: Checked['outcome']) => results.filter((each) => each.outcome === outcome).length;
  console.log(`${count('right')} right, ${count('wrong')} wrong`);
  if (count('wrong') > 0) process.exitCode = 1;
}

function computedValues(results: readonly Checked[]): Record<string, unknown> {
  return Object.fromEntries(results.map(({ id, got }) => [id, got]));
}
