import { z } from './zod.ts';
import { day } from './watchlist.ts';

/** A share of one, or an area under a curve. */
const share = z.number().min(0).max(1);

/** Over the seeds. */
const spread = z.object({ mean: share, deviation: z.number().min(0), least: share, most: share });
export type Spread = z.infer<typeof spread>;

/** Honest firms by what makes their accounts unusual; each is of the first kind that fits. */
export const HONEST_KINDS = ['acquirer', 'fast grower', 'seasonal', 'other'] as const;
export type HonestKind = (typeof HONEST_KINDS)[number];
const byKind = z.object({
  acquirer: share,
  'fast grower': share,
  seasonal: share,
  other: share,
}) satisfies z.ZodType<Record<HonestKind, number>>;

/** What one line of a test marks: shares of the honest, of the lifting, and of those marked that are honest. */
const flags = z.object({
  test: z.string(),
  size: share,
  power: share,
  falseShare: share,
  falseAlarms: byKind,
});
export type Flags = z.infer<typeof flags>;

const measured = z.object({ name: z.string(), area: spread, worstTenth: flags });
export type MeasuredArea = z.infer<typeof measured>;

const namedArea = z.object({ name: z.string(), area: spread });

export const BOOK_KINDS = ['without lifting', 'with lifting', 'with lifting and cushion seekers'] as const;
export type BookKind = (typeof BOOK_KINDS)[number];

const falseShares = {
  /** Of the listed of a book those that never lift, mean over books; nought where nobody is listed. */
  falseShare: share,
  /** The same over all that are listed in all books together; null where nobody is. */
  falseShareOfListed: share.nullable(),
  /** Of all listed those without one lifted test, lifters or not. */
  neverLiftedOfListed: share.nullable(),
};

const cell = z.object({
  headroom: z.enum(['tight', 'normal']),
  tests: z.number().int().positive(),
  lifting: share,
  cushionSeekers: share,
  books: z.number().int().positive(),
  /** Books whose gate opens, and books in which a list appears. */
  gateOpen: share,
  withList: share,
  listedPerBook: z.number().min(0),
  ...falseShares,
  /** Listed of those that lift, and of those that lifted twice at least; null without lifting. */
  power: share.nullable(),
  powerRepeated: share.nullable(),
  area: share.nullable(),
  /** Counting tests just inside the limit: area, and the list of all with three. */
  count: z.object({ area: share.nullable(), power: share.nullable(), falseShareOfListed: share.nullable() }),
});
export type HeadroomCellFigures = z.infer<typeof cell>;

/** All books of one kind together. */
const totals = z.object({
  kind: z.enum(BOOK_KINDS),
  books: z.number().int().positive(),
  withList: share,
  ...falseShares,
});
export type HeadroomTotals = z.infer<typeof totals>;

const bound = z.object({
  what: z.string(),
  bound: z.number(),
  reached: z.number(),
  holds: z.boolean(),
});
export type Bound = z.infer<typeof bound>;

const seedFigures = z.object({
  seed: z.number().int().positive(),
  score: share,
  headline: share,
  bestMeasure: z.object({ name: z.string(), area: share }),
  /** Books in which a list appears, of those without lifting and honest cushions. */
  listsWithoutLifting: z.number().int().min(0),
  listed: z.number().int().min(0),
  falselyListed: z.number().int().min(0),
});
export type SeedFigures = z.infer<typeof seedFigures>;

/** What `npm run validate` found on simulated books; the method page shows it. */
export const validationFigures = z.object({
  date: day,
  command: z.string(),
  methodVersion: z.string(),
  seeds: z.object({ from: z.number().int().positive(), to: z.number().int().positive() }),
  /** Stands wherever the figures stand. */
  caution: z.string(),
  statementBooks: z.object({
    firms: z.number().int().positive(),
    lifters: z.number().int().positive(),
    quarters: z.number().int().positive(),
    /** Of one quarter end, and the headline over three. */
    score: measured,
    headline: measured,
    /** Falling by area. */
    measures: z.array(measured).min(1),
    blocks: z.array(namedArea).min(1),
    byChannel: z.array(namedArea).min(1),
    byQuartersIn: z.array(namedArea).min(1),
    /** At lines that are published or that the product uses. */
    lines: z.array(flags).min(1),
    /** Of honest firms, in points from quarter to quarter. */
    quarterlyMove: z.object({ score: z.number().min(0), headline: z.number().min(0) }),
    withoutScore: share,
  }),
  headroomBooks: z.object({
    borrowers: z.number().int().positive(),
    cells: z.array(cell).min(1),
    totals: z.array(totals).length(3),
  }),
  bounds: z.array(bound),
  bySeed: z.array(seedFigures).min(1),
});
export type ValidationFigures = z.infer<typeof validationFigures>;
