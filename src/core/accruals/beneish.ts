/** Beneish's M-score (1999, Financial Analysts Journal 55(5)); public US firms of 1982 to 1992. */
import { normalCdf } from '../statistics/normalDistribution.ts';

/** One year's amounts, one unit. */
export interface BeneishYear {
  readonly receivables: number;
  readonly currentAssets: number;
  readonly ppeNet: number;
  /** Securities held for the long term; left out, none. */
  readonly longTermSecurities?: number;
  readonly totalAssets: number;
  readonly currentLiabilities: number;
  readonly longTermDebt: number;
  readonly sales: number;
  readonly costOfSales: number;
  readonly sellingAndAdministrative: number;
  readonly incomeFromContinuingOperations: number;
  readonly cashFromOperations: number;
  /** Depreciation only, without amortisation. */
  readonly depreciation: number;
}

/** A year of which lines may be missing: an index that needs one is missing too. */
export type BeneishFigures = Readonly<Partial<BeneishYear>>;

export const BENEISH_INDICES = ['dsri', 'gmi', 'aqi', 'sgi', 'depi', 'sgai', 'lvgi', 'tata'] as const;
export type BeneishIndex = (typeof BENEISH_INDICES)[number];
export type BeneishIndices = Readonly<Record<BeneishIndex, number | null>>;

/** The published weights: the constant, then the indices in their order. */
const M8 = { constant: -4.84, weights: [0.92, 0.528, 0.404, 0.892, 0.115, -0.172, -0.327, 4.679] };
const M5 = { constant: -6.065, weights: [0.823, 0.906, 0.593, 0.717, 0.107, 0, 0, 0] };

/** May stand at one, the value of an unchanged firm, where they are missing (methods.md B2). */
const NEUTRAL: readonly BeneishIndex[] = ['aqi', 'depi', 'sgai'];

export interface MScore {
  /** Null where an index is missing that may not be filled. */
  readonly m8: number | null;
  readonly m5: number | null;
  readonly probability: number | null;
  readonly filled: readonly BeneishIndex[];
}

/**
 * The eight indices of a year against the year before. An index is null where its base is not positive or a line
 * that it needs is missing.
 *
 * Gross margin and depreciation are prior over current, the others current over prior.
 *
 * @example beneishIndices({ ...firmYear, sales: 177 }, firmYear).sgi // => 1.5
 */
export function beneishIndices(current: BeneishFigures, prior: BeneishFigures): BeneishIndices {
  const [now, before] = [withGaps(current), withGaps(prior)];
  const over = (read: (year: BeneishYear) => number): number | null => index(read(now), read(before));
  const under = (read: (year: BeneishYear) => number): number | null => index(read(before), read(now));
  return {
    dsri: over((year) => year.receivables / year.sales),
    gmi: under((year) => (year.sales - year.costOfSales) / year.sales),
    aqi: over(
      (year) => 1 - (year.currentAssets + year.ppeNet + (year.longTermSecurities ?? 0)) / year.totalAssets,
    ),
    sgi: over((year) => year.sales),
    depi: under((year) => year.depreciation / (year.depreciation + year.ppeNet)),
    sgai: over((year) => year.sellingAndAdministrative / year.sales),
    lvgi: over((year) => (year.currentLiabilities + year.longTermDebt) / year.totalAssets),
    tata: index(now.incomeFromContinuingOperations - now.cashFromOperations, now.totalAssets),
  };
}

/** A missing line is not a number, and so is all that is reckoned with it; `index` turns that into null. */
const withGaps = (figures: BeneishFigures): BeneishYear => ({
  receivables: NaN,
  currentAssets: NaN,
  ppeNet: NaN,
  totalAssets: NaN,
  currentLiabilities: NaN,
  longTermDebt: NaN,
  sales: NaN,
  costOfSales: NaN,
  sellingAndAdministrative: NaN,
  incomeFromContinuingOperations: NaN,
  cashFromOperations: NaN,
  depreciation: NaN,
  ...figures,
});

/**
 * Both published forms out of the indices. Weights confirmed in several public sources.
 *
 * @example mScore({ dsri: 1, gmi: 1, aqi: 1, sgi: 1, depi: 1, sgai: 1, lvgi: 1, tata: 0 }).m8 // => -2.48
 */
export function mScore(indices: BeneishIndices): MScore {
  const filled = NEUTRAL.filter((name) => indices[name] === null);
  const values = BENEISH_INDICES.map((name) => (filled.includes(name) ? 1 : indices[name]));
  const m8 = weighted(M8, values);
  return { m8, m5: weighted(M5, values), probability: m8 === null ? null : mProbability(m8), filled };
}

/**
 * The model is a probit: -1.78 stands for 3.8 %. Read it as a rank, not as a chance.
 *
 * @example mProbability(-1.78) // => 0.0375…
 */
export const mProbability = (score: number): number => normalCdf(score);

const index = (value: number, base: number): number | null =>
  base > 0 && Number.isFinite(base) && Number.isFinite(value) ? value / base : null;

function weighted({ constant, weights }: typeof M8, values: readonly (number | null)[]): number | null {
  let sum = constant;
  for (const [k, weight] of weights.entries()) {
    if (weight === 0) continue;
    const value = values[k];
    if (value === null || value === undefined) return null;
    sum += weight * value;
  }
  return sum;
}
