import { expect, test } from 'vitest';
import { validationFigures } from '#contracts/validation.ts';
import { METHOD_VERSION } from '#core/policy.ts';
import kept from '../../src/core/validation.json' with { type: 'json' };
import { borrowerInputs } from './borrowerInputs.ts';
import { headroomBook } from './headroomBook.ts';
import { statementBook } from './statementBook.ts';
import { figuresOf, seedResult } from './validation.ts';

/** Seconds on a machine at rest; a busy one gets time. */
const SLOW = 300_000;

const figures = validationFigures.parse(kept);

test('the kept figures are of thirty seeds at least, of the method in force, and every bound holds', () => {
  expect(figures.bySeed.map(({ seed }) => seed)).toEqual(
    Array.from({ length: figures.bySeed.length }, (_, k) => figures.seeds.from + k),
  );
  expect(figures.bySeed.at(-1)?.seed).toBe(figures.seeds.to);
  expect(figures.bySeed.length).toBeGreaterThanOrEqual(30);
  expect(figures.methodVersion).toBe(METHOD_VERSION);
  expect(figures.bounds.map(({ holds }) => holds)).toEqual([true, true, true]);
});

test('the kept figures say of the whole what they say of the seeds', () => {
  const mean = (read: (seed: (typeof figures.bySeed)[number]) => number): number =>
    figures.bySeed.reduce((sum, seed) => sum + read(seed), 0) / figures.bySeed.length;
  const { score, headline, measures } = figures.statementBooks;
  expect(score.area.mean).toBeCloseTo(
    mean((seed) => seed.score),
    4,
  );
  expect(headline.area.mean).toBeCloseTo(
    mean((seed) => seed.headline),
    4,
  );
  expect(score.area.mean).toBeGreaterThan(Math.max(...measures.map(({ area }) => area.mean)));
  const [without, lifted] = figures.headroomBooks.totals;
  const lists = figures.bySeed.reduce((sum, seed) => sum + seed.listsWithoutLifting, 0);
  expect(without!.withList).toBeCloseTo(lists / without!.books, 4);
  const [listed, falsely] = (['listed', 'falselyListed'] as const).map((name) =>
    figures.bySeed.reduce((sum, seed) => sum + seed[name], 0),
  );
  expect(lifted!.falseShareOfListed).toBeCloseTo(falsely! / listed!, 4);
});

test(
  'one seed computed again gives what is kept of it; else: npm run validate -- --write',
  () => {
    const expected = figures.bySeed[0]!;
    const seeds = { from: expected.seed, to: expected.seed };
    const { bySeed, bounds } = figuresOf(seeds, [seedResult(expected.seed)], figures.date);
    const [again] = bySeed;
    expect(again!.score).toBeCloseTo(expected.score, 4);
    expect(again!.headline).toBeCloseTo(expected.headline, 4);
    expect(again!.bestMeasure.name).toBe(expected.bestMeasure.name);
    expect(again!.bestMeasure.area).toBeCloseTo(expected.bestMeasure.area, 4);
    expect(again!.listsWithoutLifting).toBe(expected.listsWithoutLifting);
    expect(again!.listed).toBe(expected.listed);
    expect(again!.falselyListed).toBe(expected.falselyListed);
    // One seed decides nothing.
    expect(bounds).toEqual([]);
  },
  SLOW,
);

test(
  "simulated statements tie by the product's identities",
  () => {
    const book = statementBook(7);
    expect(book).toHaveLength(600);
    expect(book.filter(({ plan }) => plan.lifting)).toHaveLength(60);
    const statements = book.slice(0, 60).flatMap((firm) => borrowerInputs(firm).statements);
    expect(statements).toHaveLength(60 * 24 * 2);
    expect(statements.every(({ tie }) => tie === 'ties')).toBe(true);
  },
  SLOW,
);

test(
  'a seed gives the same book again, and another seed another',
  () => {
    const [book, again, other] = [7, 7, 8].map((seed) => JSON.stringify(statementBook(seed)));
    expect(again === book).toBe(true);
    expect(other === book).toBe(false);
  },
  SLOW,
);

test('tests are lifted only by lifters, only over the limit, and not at all in a book without lifting', () => {
  const cell = { headroom: 'tight', tests: 20, cushionSeekers: 0.1 } as const;
  const lifted = headroomBook(7, 100, { ...cell, lifting: 0.8 });
  expect(lifted.filter(({ role }) => role === 'lifter')).toHaveLength(100);
  expect(lifted.filter(({ role }) => role === 'cushion seeker')).toHaveLength(50);
  expect(lifted.every(({ role, lifted: count }) => count === 0 || role === 'lifter')).toBe(true);
  expect(lifted.some(({ lifted: count }) => count >= 2)).toBe(true);
  const plain = headroomBook(7, 100, { ...cell, lifting: 0 });
  expect(plain.every(({ role, lifted: count }) => role !== 'lifter' && count === 0)).toBe(true);
});
