/** Who reads process.env: settings in one file, everything else by a name that a page explains. */
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { SETTING_NAMES } from '../../src/server/config/env.ts';
import { repositoryFiles } from './repositoryFiles.ts';

/** What Node, npm, vitest and CI set of their own. */
const NOT_OURS = ['NODE_ENV', 'CI', 'INIT_CWD'];
/** How our own programs tell each other something; nobody sets these by hand. */
const BETWEEN_PROGRAMS = ['CALLER_FOLDER', 'UNDERKEEL_SUPERVISED', 'TEST_TOTALS'];

const sources = repositoryFiles().filter((file) =>
  /^(src|jobs|seeders|tests)\/.*\.(ts|tsx|mjs|astro)$/.test(file),
);
const readIn = (file: string): string[] =>
  [...readFileSync(file, 'utf8').matchAll(/process\.env(?:\.|\[')([A-Z][A-Z_]*)/g)].map(
    ([, name]) => name ?? '',
  );

test('the server reads its settings through env() and nowhere else', () => {
  const readers = sources
    .filter((file) => file.startsWith('src/') && file !== 'src/server/config/env.ts')
    .flatMap((file) => readIn(file).map((name) => `${file}: ${name}`))
    .filter((reader) => !reader.endsWith(': NODE_ENV'));
  expect(readers).toEqual([]);
});

test('a variable that is no setting is explained in the README or in DEVELOPERS.md', () => {
  const explained = readFileSync('README.md', 'utf8') + readFileSync('DEVELOPERS.md', 'utf8');
  const known = [...SETTING_NAMES, ...NOT_OURS, ...BETWEEN_PROGRAMS];
  const named = new Set(sources.flatMap(readIn).filter((name) => !known.includes(name)));
  expect(named.size).toBeGreaterThan(0);
  expect([...named].filter((name) => !explained.includes(`\`${name}`))).toEqual([]);
});
