/** Words that must not stand in the repository, and words that the product must not print. */
import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { repositoryFiles } from './repositoryFiles.ts';

const SELF = 'tests/architecture/words.test.ts';
const files = repositoryFiles().filter(
  (file) =>
    file !== SELF && file !== 'package-lock.json' && !/\.(png|ico|xlsx|xlsm|xls|zip|pdf|woff2?)$/.test(file),
);

/** Where something was learnt, by whom it was told, on which machine it was written. */
const NOT_OF_THE_PRODUCT = [
  /\b(lect[u]res?|transcri[p]ts?|we[b]inars?|po[d]casts?|ke[y]notes?)\b/i,
  /\b(this|the|his|her|their) talk\b/i,
  /(^|[\s'"`(=:])\/(work|root|home)\//m,
  /(^|[\s'"`(=:])\/tmp\//m,
  /\bTODO\b|\bFIXME\b|\bXXX\b/,
  /@ts-(ignore|nocheck|expect-error)/,
];

/** The lender and the agreement decide what a failed test is called. */
const NOT_PRINTED = [/\bbreach/i, /events? of default/i, /\bin default\b/i, /\bfraud/i, /\bsnooz/i];
const PRINTS =
  /^(src\/(components|content|pages|layouts|contracts|server\/(mail|sheets\/write|services))|seeders)\//;

const found = (paths: readonly string[], words: readonly RegExp[]): string[] =>
  paths.flatMap((path) => {
    const text = readFileSync(path, 'utf8');
    return words.flatMap((word) => {
      const match = word.exec(text);
      return match ? [`${path}:${text.slice(0, match.index).split('\n').length}: ${match[0].trim()}`] : [];
    });
  });

test('nothing in the repository speaks of where it was learnt or written', () => {
  expect(files.length).toBeGreaterThan(400);
  expect(found(files, NOT_OF_THE_PRODUCT)).toEqual([]);
});

test('what the product prints names no failed test by a word of law or blame', () => {
  const printing = files.filter((file) => PRINTS.test(file) && !/\.test\.tsx?$/.test(file));
  expect(printing.length).toBeGreaterThan(150);
  expect(found(printing, NOT_PRINTED)).toEqual([]);
});

test('each of the words would be found', () => {
  const samples = [
    ...['a lect~ure', 'the ta~lk', ' /wo~rk/main', ' /tm~p/a', 'TO~DO later', '@ts~-ignore'],
    ...['a breach', 'event of default', 'in default', 'fraudulent', 'snoozed'],
  ];
  // The tilde keeps this page from holding what it looks for.
  const words = [...NOT_OF_THE_PRODUCT, ...NOT_PRINTED];
  expect(samples.map((sample, place) => words[place]?.test(sample.replace('~', '')))).toEqual(
    words.map(() => true),
  );
});
