import { expect, test } from 'vitest';
import { beneishIndices, mProbability, mScore, type BeneishYear } from './beneish.ts';
import { altmanZ, ohlsonO, zmijewskiX } from './distressScores.ts';
import { fScore, fScoreAt, predictedAt } from './fScore.ts';

const unchanged = { dsri: 1, gmi: 1, aqi: 1, sgi: 1, depi: 1, sgai: 1, lvgi: 1, tata: 0 };

test('an unchanged firm scores -2.480 with eight variables and -2.919 with five', () => {
  expect(mScore(unchanged).m8).toBeCloseTo(-2.48, 12);
  expect(mScore(unchanged).m5).toBeCloseTo(-2.919, 12);
});

test('the cut-offs -1.49 and -1.78 stand for 6.8 % and 3.8 %, as published', () => {
  expect(mProbability(-1.49)).toBeCloseTo(0.068, 3);
  expect(mProbability(-1.78)).toBeCloseTo(0.038, 3);
});

test('depreciation, overhead and asset quality may stand at one; the others may not', () => {
  const { m8, filled } = mScore({ ...unchanged, depi: null, sgai: null, aqi: null });
  expect(m8).toBeCloseTo(-2.48, 12);
  expect(filled).toEqual(['aqi', 'depi', 'sgai']);
  expect(mScore({ ...unchanged, tata: null })).toMatchObject({ m8: null, probability: null });
  expect(mScore({ ...unchanged, tata: null }).m5).toBeCloseTo(-2.919, 12);
  expect(mScore({ ...unchanged, dsri: null })).toMatchObject({ m8: null, m5: null });
});

// Wahlen, Baginski & Bradshaw, problem 6.23, first year: inputs from a public copy, result recomputed in Python.
const current: BeneishYear = {
  receivables: 2060,
  currentAssets: 5933,
  ppeNet: 10657,
  totalAssets: 29350,
  currentLiabilities: 6107,
  longTermDebt: 7357,
  sales: 31260,
  costOfSales: 26381,
  sellingAndAdministrative: 2473,
  incomeFromContinuingOperations: 703,
  cashFromOperations: 1640,
  depreciation: 563,
};
const prior: BeneishYear = {
  receivables: 1697,
  currentAssets: 4669,
  ppeNet: 9170,
  totalAssets: 23422,
  currentLiabilities: 4412,
  longTermDebt: 6254,
  sales: 20273,
  costOfSales: 17311,
  sellingAndAdministrative: 1406,
  incomeFromContinuingOperations: 105,
  cashFromOperations: 501,
  depreciation: 480,
};

test('margin and depreciation are prior over current, the rest current over prior', () => {
  const indices = beneishIndices(current, prior);
  expect(indices.gmi).toBeCloseTo(0.936106345959, 10);
  expect(indices.depi).toBeCloseTo(0.991284661188, 10);
  expect(indices.dsri).toBeCloseTo(0.787253182105, 10);
  expect(mScore(indices).m8).toBeCloseTo(-2.377743557807, 9);
});

test('an index without a positive base is missing', () => {
  expect(beneishIndices(current, { ...prior, sales: 0 }).dsri).toBeNull();
  expect(beneishIndices({ ...current, costOfSales: 40_000 }, prior).gmi).toBeNull();
});

test('a firm of no changes has an F of 0.1, and F is one at -5.5957', () => {
  const still = {
    totalAccruals: 0,
    receivablesChange: 0,
    inventoryChange: 0,
    softAssets: 0,
    cashSalesGrowth: 0,
    returnOnAssetsChange: 0,
    hasIssued: false,
  };
  expect(fScore(still)).toMatchObject({ predicted: -7.893, band: 'normal' });
  expect(fScore(still).f).toBeCloseTo(0.100867165701, 10);
  expect(fScore({ ...still, hasIssued: true }).predicted).toBeCloseTo(-6.864, 12);
  expect(predictedAt(0.0037)).toBeCloseTo(-5.595715597401, 10);
});

test.each([
  [1, 'normal'],
  [1.0001, 'above normal'],
  [1.85, 'above normal'],
  [1.8501, 'substantial'],
  [2.4501, 'high'],
] as const)('an F of %d is %s', (f, band) => {
  // A hair under the line, since the way there and back through the logit costs the last digits.
  expect(fScoreAt(predictedAt(f * 0.0037 * (1 - 1e-9))).band).toBe(band);
});

const ratios = (one: number, two: number, three: number, four: number, five: number) => ({
  workingCapitalOverAssets: one,
  retainedEarningsOverAssets: two,
  ebitOverAssets: three,
  equityOverLiabilities: four,
  salesOverAssets: five,
});

test('Z of the published exercises: 2.519 and 2.70', () => {
  expect(altmanZ('listed', ratios(0.2, 0.3, 0.23, 0.5, 0.8)).z).toBeCloseTo(2.519, 10);
  expect(altmanZ('listed', ratios(0.34, 0.15, 0, 0.8, 1.6)).z).toBeCloseTo(2.7, 2);
});

test('with 3.25 added the zones move by 3.25 as well', () => {
  for (const x of [-0.3, 0, 0.1, 0.2, 0.35, 0.6]) {
    const plain = altmanZ('anyTrade', ratios(x, 0, 0, 0, 9));
    const shifted = altmanZ('anyTradeShifted', ratios(x, 0, 0, 0, 9));
    expect(shifted.z - plain.z).toBeCloseTo(3.25, 12);
    expect(shifted.zone).toBe(plain.zone);
  }
});

test('Ohlson and Zmijewski of an invented firm, worked in Python', () => {
  const sums = {
    totalAssets: 100,
    totalLiabilities: 62,
    currentAssets: 42,
    currentLiabilities: 28,
    netIncome: 4,
  };
  const ohlson = ohlsonO({
    ...sums,
    realAssets: 100_000_000 / 800,
    netIncomePrior: 3.2,
    fundsFromOperations: 8.5,
    hasTwoLosses: false,
  });
  expect(ohlson.score).toBeCloseTo(-2.911289408624, 10);
  expect(ohlson.probability).toBeCloseTo(0.05159830058, 10);
  expect(zmijewskiX(sums).score).toBeCloseTo(-0.98954, 10);
  expect(zmijewskiX(sums).probability).toBeCloseTo(0.16119950467, 10);
});
