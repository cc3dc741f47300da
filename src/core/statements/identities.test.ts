import { describe, expect, test } from 'vitest';
import { decimal, ZERO } from '../money/decimal.ts';
import { withCostsTurned, writesCostsNegative } from './costSigns.ts';
import { balanceIdentity, cashIdentity, retainedEarningsIdentity } from './identities.ts';
import { scaleSlip } from './scaleSlip.ts';

const balance = (equity: string, roundingUnit = '1') =>
  balanceIdentity({
    totalAssets: decimal(100_000),
    totalLiabilities: decimal(62_000),
    equity: decimal(equity),
    roundingUnit: decimal(roundingUnit),
  }).outcome;

describe('a balance sheet of 100,000', () => {
  // Tolerance 0.01 % is 10; warning to 0.5 % is 500.
  test.each([
    ['37990', 'ties'],
    ['37989.99', 'warning'],
    ['37500', 'warning'],
    ['37499.99', 'does-not-tie'],
    ['38500.01', 'does-not-tie'],
  ] as const)('with equity of %s %s', (equity, outcome) => {
    expect(balance(equity)).toBe(outcome);
  });

  test('in thousands ties within half a unit for each of three figures', () => {
    expect(balance('36500', '1000')).toBe('ties');
    expect(balance('36499', '1000')).toBe('does-not-tie');
  });
});

test('cash rolls forward over signed flows', () => {
  const roll = (closing: number) =>
    cashIdentity({
      opening: decimal(500),
      flows: [decimal(120), decimal(-80), decimal(-30), decimal(2)],
      closing: decimal(closing),
      totalAssets: decimal(10_000),
      roundingUnit: ZERO,
    });
  expect(roll(512).outcome).toBe('ties');
  expect(roll(500)).toMatchObject({ outcome: 'warning' });
  expect(roll(500).difference.toFixed()).toBe('12');
});

test('an unexplained entry to retained earnings is a warning, however large', () => {
  const roll = (closing: number) =>
    retainedEarningsIdentity({
      opening: decimal(900),
      netIncome: decimal(75),
      dividends: decimal(20),
      namedEntries: ZERO,
      closing: decimal(closing),
      totalAssets: decimal(2_000),
      roundingUnit: ZERO,
    }).outcome;
  expect([roll(955), roll(950), roll(100)]).toEqual(['ties', 'warning', 'warning']);
});

describe('a slip of scale', () => {
  const slip = (...values: number[]) => scaleSlip(values.map((value) => decimal(value)));

  test('is within 10 % of a factor of its neighbours', () => {
    expect(slip(100, 100, 110_000)).toMatchObject({ index: 2, factor: 1_000 });
    expect(slip(100, 100, 110_001)).toBeNull();
    expect(slip(100, 100, 90_000)).toMatchObject({ factor: 1_000 });
    expect(slip(100, 100, 89_999)).toBeNull();
  });

  test('is not growth, and not nought', () => {
    expect(slip(100, 130, 170, 220)).toBeNull();
    expect(slip(0, 0, 5)).toBeNull();
    expect(slip(5)).toBeNull();
  });
});

describe('costs written as negatives', () => {
  const sheet = (...costs: number[]) => costs.map((cogs) => ({ revenue: decimal(80), cogs: decimal(cogs) }));

  test('are turned from 80 % of the filled cost cells on', () => {
    expect(writesCostsNegative(sheet(-1, -1, -1, -1, 1))).toBe(true);
    expect(writesCostsNegative(sheet(-1, -1, -1, 1, 0, 0))).toBe(false);
    expect(writesCostsNegative([{ revenue: decimal(80) }])).toBe(false);
  });

  test('are turned as one block, revenue left alone', () => {
    const turned = withCostsTurned({ revenue: decimal(80), cogs: decimal(-48), sga: decimal(-20) });
    expect([turned.revenue, turned.cogs, turned.sga].map(String)).toEqual(['80', '48', '20']);
  });
});
