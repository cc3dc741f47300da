import { expect, test } from 'vitest';
import { randomNumbers } from './randomNumbers.ts';
import { SECTOR_PROFILES, type SectorName } from './sectorProfiles.ts';
import { faultsOf } from './identities.fixture.ts';
import { ORDINARY, QUARTERS_REPORTED, quartersUpTo, type TradingPlan } from './tradingPlan.ts';
import { tradingYears } from './tradingYears.ts';

const plan = (changes: Partial<TradingPlan>): TradingPlan => ({
  seed: 'Ordinary Works',
  calendar: quartersUpTo('2026-09-30'),
  fiscalYearEndMonth: 12,
  profile: SECTOR_PROFILES.metal,
  revenue: 20_000,
  growthPerYear: 0.04,
  termDebt: 25_000,
  juniorShare: 0.25,
  interestRate: 0.06,
  dividendShare: 0.6,
  openingCashShare: 0.05,
  property: null,
  shape: ORDINARY,
  ...changes,
});

test.each(Object.keys(SECTOR_PROFILES) as SectorName[])('eighteen quarters of %s tie', (sector) => {
  const quarters = tradingYears(plan({ profile: SECTOR_PROFILES[sector] }));
  expect(quarters).toHaveLength(QUARTERS_REPORTED);
  expect(quarters.at(-1)?.quarterEnd).toBe('2026-09-30');
  expect(faultsOf(quarters)).toEqual([]);
});

test('a business that loses money ties as well, and draws rather than run out of cash', () => {
  const quarters = tradingYears(plan({ shape: () => ({ extraCostShare: 0.3 }) }));
  expect(faultsOf(quarters)).toEqual([]);
  expect(quarters.at(-1)?.lines.revolver_drawn).toBeGreaterThan(0);
  expect(Math.min(...quarters.map(({ lines }) => lines.cash))).toBeGreaterThan(0);
  expect(quarters.map(({ lines }) => lines.income_tax)).toEqual(Array(QUARTERS_REPORTED).fill(0));
});

test('the identities notice a figure that is one thousand off', () => {
  const quarters = tradingYears(plan({}));
  const [first, second, ...rest] = quarters;
  if (!first || !second) throw new Error('quarters expected');
  const off = { ...second, lines: { ...second.lines, cash: second.lines.cash + 1 } };
  expect(faultsOf([first, off, ...rest])).toContain(`${second.quarterEnd} cash roll: 1`);
});

test('the same seed gives the same course, another seed another', () => {
  expect(tradingYears(plan({}))).toEqual(tradingYears(plan({})));
  expect(tradingYears(plan({ seed: 'Other Works' }))).not.toEqual(tradingYears(plan({})));
});

test('random numbers stay within their bounds and differ', () => {
  const random = randomNumbers('bounds');
  const shares = Array.from({ length: 5_000 }, () => random.share());
  expect(Math.min(...shares)).toBeGreaterThanOrEqual(0);
  expect(Math.max(...shares)).toBeLessThan(1);
  expect(new Set(shares).size).toBeGreaterThan(4_900);
  const counts = new Set(Array.from({ length: 500 }, () => random.count(2, 4)));
  expect([...counts].toSorted()).toEqual([2, 3, 4]);
  expect(
    Math.abs(Array.from({ length: 500 }, () => random.wobble()).reduce((a, b) => a + b, 0) / 500),
  ).toBeLessThan(0.1);
});
