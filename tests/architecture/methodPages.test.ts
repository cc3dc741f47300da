/** Every number's method has a page that says what it must, and the figures on it are what core computes. */
import { readFileSync } from 'node:fs';
import { parseFrontmatter } from '@astrojs/markdown-remark';
import { describe, expect, test } from 'vitest';
import { methodPage, type MethodExample } from '../../src/contracts/methods.ts';
import { METHOD_TOPIC_NAMES, METHOD_TOPICS } from '../../src/contracts/methodTopics.ts';
import * as fixture from '../../src/core/example.fixture.ts';
import { METHOD_VERSION } from '../../src/core/policy.ts';
import { evaluate, plain } from './coreExamples.ts';
import { repositoryFiles } from './repositoryFiles.ts';

const FOLDER = 'src/content/methods/';
const files = repositoryFiles();
const pages = files.filter((file) => file.startsWith(FOLDER));
const topicOf = (file: string): string => file.slice(FOLDER.length).replace(/\.md$/, '');
const pageOf = (file: string) => {
  const { frontmatter, content } = parseFrontmatter(readFileSync(file, 'utf8'));
  return { ...methodPage.parse(frontmatter), content };
};

test('every topic has its page, and every page its topic', () => {
  expect(pages.map(topicOf).toSorted()).toEqual([...METHOD_TOPIC_NAMES].sort());
});

test('every link to a method names a topic, and is read out as a sentence of its own', () => {
  const linked = files
    .filter((file) => /^src\/.*\.(tsx|astro)$/.test(file))
    .flatMap((file) =>
      [...readFileSync(file, 'utf8').matchAll(/<MethodLink\s+topic="([^"]*)"/g)].map(([, topic]) => topic),
    );
  expect(
    linked.filter((topic) => !(METHOD_TOPIC_NAMES as readonly (string | undefined)[]).includes(topic)),
  ).toEqual([]);
  const names = Object.values(METHOD_TOPICS);
  expect(new Set(names).size).toBe(names.length);
  expect(names.filter((name) => !/^How .+[a-z]$/.test(name))).toEqual([]);
});

describe.each(pages)('%s', (file) => {
  test('says formula, inputs, source and limits, and names only settings that exist', () => {
    const read = methodPage.safeParse(parseFrontmatter(readFileSync(file, 'utf8')).frontmatter);
    expect(read.success ? [] : read.error.issues).toEqual([]);
  });

  test('explains in words, without raw HTML, and sends nobody to itself', () => {
    const { content, related } = pageOf(file);
    expect(content.trim().length).toBeGreaterThan(100);
    expect(content).not.toMatch(/<[a-z!/]/i);
    expect(content).not.toMatch(/\]\((?!https:\/\/)/);
    expect(related).not.toContain(topicOf(file));
  });

  test('is computed so since a method version that has been', () => {
    expect(Number(pageOf(file).since)).toBeLessThanOrEqual(Number(METHOD_VERSION));
  });

  test('prints figures that core computes', async () => {
    for (const example of pageOf(file).examples)
      expect(await computed(example), example.text).toBe(example.comesTo);
  });
});

test('a figure that core does not compute is seen', async () => {
  const example = { text: 'half', module: 'src/core/money/decimal.ts', run: 'decimal("0.5")' };
  expect(await computed({ ...example, comesTo: '50 %' })).toBe('50 %');
  expect(await computed({ ...example, comesTo: '51 %' })).toBe('50 %');
  expect(await computed({ ...example, comesTo: '0.50x' })).toBe('0.50x');
});

/** What the example gives, printed as the page prints what it comes to: same digits, same unit. */
async function computed({ run, module, comesTo }: MethodExample): Promise<string> {
  const exported = (await import(`../../${module}`)) as Record<string, unknown>;
  const value = plain(evaluate(run, { ...fixture, ...exported }));
  if (typeof value !== 'number') return String(value);
  const [, printed = '', unit = ''] = /^([−-]?[\d,]*\.?\d+)(.*)$/.exec(comesTo) ?? [];
  const places = printed.split('.')[1]?.length ?? 0;
  const shown = (/^\s*%/.test(unit) ? value * 100 : value).toLocaleString('en-GB', {
    minimumFractionDigits: places,
    maximumFractionDigits: places,
    useGrouping: printed.includes(','),
  });
  return shown.replace('-', printed.startsWith('−') ? '−' : '-') + unit;
}
