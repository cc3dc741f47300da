import { readdirSync, readFileSync } from 'node:fs';
import { expect, test } from 'vitest';

const MESSES = 64;

test('each of the 64 ways in which files are messy has a test of its own', () => {
  const folder = new URL('.', import.meta.url);
  const sources = readdirSync(folder)
    .filter((name) => name.endsWith('.test.ts') && name !== 'everyMess.test.ts')
    .map((name) => readFileSync(new URL(name, folder), 'utf8'));
  const tested = new Set(
    sources.flatMap((source) =>
      [...source.matchAll(/^ {2}mess\(\s*(\d+),/gm)].map((match) => Number(match[1])),
    ),
  );
  expect([...tested].sort((one, other) => one - other)).toEqual(
    Array.from({ length: MESSES }, (_, at) => at + 1),
  );
});
