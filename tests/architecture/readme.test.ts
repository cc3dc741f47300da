/** What the pages for people say is there: commands, files, sections, settings, and doors of a fitting size. */
import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { repositoryFiles } from './repositoryFiles.ts';

const files = repositoryFiles();
const pages = files.filter((file) => file.endsWith('.md'));
const doors = pages.filter((file) => file !== 'README.md' && file.endsWith('README.md'));
const textOf = (file: string): string => readFileSync(file, 'utf8');
const scripts = Object.keys((JSON.parse(textOf('package.json')) as { scripts: object }).scripts);

/** npm's own names need no "run". */
const BY_THEMSELVES = ['start', 'test'];
const commandsIn = (text: string): string[] => [
  ...[...text.matchAll(/\bnpm run ([\w:-]+)/g)].map(([, name]) => name ?? ''),
  ...BY_THEMSELVES.filter((name) => new RegExp(`\\bnpm ${name}\\b`).test(text)),
];

test('the README names every script of package.json and no other', () => {
  expect([...new Set(commandsIn(textOf('README.md')))].toSorted()).toEqual(scripts.toSorted());
});

test('the README begins with the job, then the two commands, then a picture', () => {
  const [title, job, commands, ...rest] = textOf('README.md').split(/\n{2,}/);
  expect(title).toBe('# Underkeel');
  expect(job).toMatch(/^A lending desk/);
  expect(commands?.split('\n').filter((line) => line.startsWith('npm '))).toEqual(['npm start', 'npm test']);
  const firstHeading = rest.findIndex((part) => part.startsWith('## '));
  expect(rest.findIndex((part) => part.startsWith('![')) < firstHeading).toBe(true);
});

describe.each(pages)('%s', (page) => {
  test('names only scripts that exist', () => {
    expect(commandsIn(textOf(page)).filter((name) => !scripts.includes(name))).toEqual([]);
  });

  test('links only to what is there', () => {
    const links = [...textOf(page).matchAll(/\]\(([^)#\s]+)(?:#[^)]*)?\)/g)].map(
      ([, target]) => target ?? '',
    );
    const broken = links.filter(
      (target) => !/^https?:/.test(target) && !existsSync(join(dirname(page), target)),
    );
    expect(broken).toEqual([]);
  });

  test('names only files and folders that are there', () => {
    const named = [...textOf(page).matchAll(/`((?:src|jobs|seeders|tests|public)\/[\w./[\]-]*)`/g)];
    expect(
      named.map(([, path]) => path ?? '').filter((path) => !existsSync(path) && !/[A-Z]{4}/.test(path)),
    ).toEqual([]);
  });
});

test.each(doors)('%s is a door of at most 25 lines', (door) => {
  expect(textOf(door).trimEnd().split('\n').length).toBeLessThanOrEqual(25);
});

test('every page and section that a comment cites is there', () => {
  const dangling = files
    .filter((file) => /\.(ts|tsx|mjs|astro|css|json)$/.test(file) && !file.startsWith('package'))
    .flatMap((file) =>
      [...citationsIn(textOf(file))].filter((cited) => !isThere(cited)).map((cited) => `${file}: ${cited}`),
    );
  expect(dangling).toEqual([]);
});

/** 'methods.md', and 'methods.md A3' for each section that is named behind it. */
function* citationsIn(text: string): Generator<string> {
  for (const [, page, rest] of text.matchAll(
    /\b([\w-]+\.md)\b((?:(?:,| and| to|:| Part C)? ?[A-C]?\d[\d.]*)*)/g,
  )) {
    yield page ?? '';
    for (const [section] of (rest ?? '').matchAll(/[A-C]\d+|(?<=Part C.*)\d\.\d/g))
      yield `${page} ${section}`;
  }
}

function isThere(cited: string): boolean {
  const [name = '', section] = cited.split(' ');
  const page = pages.find((file) => file === name || file.endsWith(`/${name}`));
  return page !== undefined && (section === undefined || hasHeading(textOf(page), section));
}

const hasHeading = (text: string, section: string): boolean =>
  text.includes(`\n## ${section}.`) ||
  text.includes(`\n### ${section} `) ||
  text.includes(`\n- **${section} `);
