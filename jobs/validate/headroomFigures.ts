/** The figures of all simulated books of tests together, by kind of book. */
import {
  BOOK_KINDS,
  type BookKind,
  type HeadroomCellFigures,
  type HeadroomTotals,
} from '#contracts/validation.ts';
import type { HeadroomCell } from './headroomBook.ts';
import { headroomResult, type HeadroomResult } from './headroomResults.ts';

/** Books of one seed: a kind of book, and how many of it. */
interface PlannedCell {
  readonly cell: HeadroomCell;
  readonly books: number;
}

/** More books without lifting, because how often a list appears there is what has a bound. */
const BOOKS_WITHOUT_LIFTING = 2;

/** The grid of methods.md C5: tight and normal books, 8, 12 and 20 tests, lifting seldom, often, mostly. */
const PLAN: readonly PlannedCell[] = [0, 0.1].flatMap((cushionSeekers) =>
  (['tight', 'normal'] as const).flatMap((headroom) =>
    [8, 12, 20].flatMap((tests) =>
      [0, 0.1, 0.4, 0.8].map((lifting) => ({
        cell: { headroom, tests, lifting, cushionSeekers },
        books: lifting === 0 && cushionSeekers === 0 ? BOOKS_WITHOUT_LIFTING : 1,
      })),
    ),
  ),
);

/** Streams of draws of these books lie beyond those of the statement books. */
const FIRST_PLACE = 100;

/** In the order of the plan. */
export type SeedHeadrooms = readonly (readonly HeadroomResult[])[];

export const headroomResults = (seed: number): SeedHeadrooms =>
  PLAN.map(({ cell, books }, k) =>
    Array.from({ length: books }, (_, book) =>
      headroomResult(seed, FIRST_PLACE + k * BOOKS_WITHOUT_LIFTING + book, cell),
    ),
  );

export const headroomFigures = (seeds: readonly SeedHeadrooms[]): HeadroomCellFigures[] =>
  PLAN.map(({ cell }, k) => ({ ...cell, ...cellFigures(seeds.flatMap((seed) => seed[k]!)) }));

const KINDS: Readonly<Record<BookKind, (cell: HeadroomCell) => boolean>> = {
  'without lifting': ({ lifting, cushionSeekers }) => lifting === 0 && cushionSeekers === 0,
  'with lifting': ({ lifting, cushionSeekers }) => lifting > 0 && cushionSeekers === 0,
  'with lifting and cushion seekers': ({ lifting, cushionSeekers }) => lifting > 0 && cushionSeekers > 0,
};

/** Every book of one kind. */
export const booksOf = (seeds: readonly SeedHeadrooms[], kind: BookKind): readonly HeadroomResult[] =>
  seeds.flatMap((seed) => seed.flatMap((results, k) => (KINDS[kind](PLAN[k]!.cell) ? results : [])));

export const headroomTotals = (seeds: readonly SeedHeadrooms[]): HeadroomTotals[] =>
  BOOK_KINDS.map((kind) => {
    const books = booksOf(seeds, kind);
    const { withList, falseShare, falseShareOfListed, neverLiftedOfListed } = cellFigures(books);
    return { kind, books: books.length, withList, falseShare, falseShareOfListed, neverLiftedOfListed };
  });

function cellFigures(books: readonly HeadroomResult[]): Omit<HeadroomCellFigures, keyof HeadroomCell> {
  const sum = (read: (book: HeadroomResult) => number): number =>
    books.reduce((total, book) => total + read(book), 0);
  const lifters = sum((book) => book.lifters);
  const repeated = sum((book) => book.repeatedLifters);
  const areas = books.flatMap((book) => book.areas ?? []);
  const meanArea = (name: 'ranking' | 'count') =>
    ratio(
      areas.reduce((total, area) => total + area[name], 0),
      areas.length,
    );
  return {
    books: books.length,
    gateOpen: sum(({ isGateOpen }) => (isGateOpen ? 1 : 0)) / books.length,
    withList: sum(({ published }) => (published.listed > 0 ? 1 : 0)) / books.length,
    listedPerBook: sum(({ published }) => published.listed) / books.length,
    falseShare: meanFalseShare(books),
    falseShareOfListed: ratio(
      sum(({ published }) => published.falselyListed),
      sum(({ published }) => published.listed),
    ),
    neverLiftedOfListed: ratio(
      sum(({ published }) => published.neverLifted),
      sum(({ published }) => published.listed),
    ),
    power: ratio(
      sum(({ published }) => published.found),
      lifters,
    ),
    powerRepeated: ratio(
      sum(({ published }) => published.foundOfRepeated),
      repeated,
    ),
    area: meanArea('ranking'),
    count: {
      area: meanArea('count'),
      power: ratio(
        sum(({ counted }) => counted.found),
        lifters,
      ),
      falseShareOfListed: ratio(
        sum(({ counted }) => counted.falselyListed),
        sum(({ counted }) => counted.listed),
      ),
    },
  };
}

/** The realised false-discovery rate: mean over books of the false among the listed, nought where nobody is. */
const meanFalseShare = (books: readonly HeadroomResult[]): number =>
  books.reduce(
    (sum, { published }) => sum + (published.listed === 0 ? 0 : published.falselyListed / published.listed),
    0,
  ) / books.length;

const ratio = (part: number, whole: number): number | null => (whole === 0 ? null : part / whole);
