import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { currentRatio } from '../measures/currentRatio.ts';
import { interestCover } from '../measures/interestCover.ts';
import { minimumLiquidity } from '../measures/minimumLiquidity.ts';
import { netLeverage } from '../measures/netLeverage.ts';
import { decimal } from '../money/decimal.ts';
import type { Operator } from './covenant.ts';
import type { Sides } from './headroom.ts';
import { holdAgainstLevel, type Terms } from './holdAgainstLevel.ts';

const sides = (numerator: number | string, denominator: number | string | null): Sides => ({
  numerator: decimal(numerator),
  denominator: denominator === null ? null : decimal(denominator),
});
const terms = (operator: Operator, level: number | string, roundingPlaces: number | null = null): Terms => ({
  operator,
  level: decimal(level),
  roundingPlaces,
});

describe('at, just below and just above the level', () => {
  test.each([
    ['<=', '34.99', 'met'],
    ['<=', '35', 'met'],
    ['<=', '35.01', 'not met'],
    ['<', '34.99', 'met'],
    ['<', '35', 'not met'],
    ['<', '35.01', 'not met'],
  ] as const)('net leverage %s 3.50x with debt of %s over 10 is %s', (operator, debt, outcome) => {
    expect(holdAgainstLevel(netLeverage, sides(debt, 10), terms(operator, '3.5')).outcome).toBe(outcome);
  });

  test.each([
    ['>=', '29.99', 'not met'],
    ['>=', '30', 'met'],
    ['>=', '30.01', 'met'],
    ['>', '29.99', 'not met'],
    ['>', '30', 'not met'],
    ['>', '30.01', 'met'],
  ] as const)('cover %s 3.00x with earnings of %s over 10 is %s', (operator, earnings, outcome) => {
    expect(holdAgainstLevel(interestCover, sides(earnings, 10), terms(operator, 3)).outcome).toBe(outcome);
  });

  test.each([
    ['>=', '4.99', 'not met'],
    ['>=', '5', 'met'],
    ['>', '5', 'not met'],
    ['>', '5.01', 'met'],
    ['<=', '5', 'met'],
    ['<', '5', 'not met'],
  ] as const)('an amount %s 5 of %s is %s', (operator, amount, outcome) => {
    expect(holdAgainstLevel(minimumLiquidity, sides(amount, null), terms(operator, 5)).outcome).toBe(outcome);
  });
});

describe('rounding', () => {
  test('is applied only where the agreement rounds, and then said', () => {
    const tested = sides('42.048', 12);
    expect(holdAgainstLevel(netLeverage, tested, terms('<=', '3.5')).outcome).toBe('not met');
    const rounded = holdAgainstLevel(netLeverage, tested, terms('<=', '3.5', 2));
    expect(rounded).toMatchObject({ outcome: 'met', roundingDecides: true });
    expect(rounded.tested?.toFixed()).toBe('3.504');
  });

  test('is half up: 3.505 at two places is over 3.50x', () => {
    expect(holdAgainstLevel(netLeverage, sides('35.05', 10), terms('<=', '3.5', 2)).outcome).toBe('not met');
    expect(holdAgainstLevel(netLeverage, sides('35.0499', 10), terms('<=', '3.5', 2)).outcome).toBe('met');
  });
});

describe('cases without a ratio', () => {
  test.each([
    ['debt and no earnings', 40, 0, 'not met, ratio has no meaning'],
    ['debt and a loss', 40, -8, 'not met, ratio has no meaning'],
    ['net cash and earnings', -5, 12, 'met, net cash'],
    ['neither debt nor cash, and earnings', 0, 12, 'met, net cash'],
    ['net cash and a loss, whose quotient looks fine', -5, -12, 'cannot be tested'],
  ] as const)('leverage with %s', (_, debt, earnings, outcome) => {
    expect(holdAgainstLevel(netLeverage, sides(debt, earnings), terms('<=', '3.5')).outcome).toBe(outcome);
  });

  test.each([
    ['no charge and earnings', 12, 0, 'met, no charge to cover'],
    ['a negative charge and earnings', 12, -1, 'met, no charge to cover'],
    ['no charge and a loss', -1, 0, 'cannot be tested'],
    ['a charge and a loss', -1, 4, 'not met'],
  ] as const)('cover with %s', (_, earnings, charge, outcome) => {
    expect(holdAgainstLevel(interestCover, sides(earnings, charge), terms('>=', '2.5')).outcome).toBe(
      outcome,
    );
  });

  test('no headroom is given where there is no ratio', () => {
    const held = holdAgainstLevel(netLeverage, sides(40, -8), terms('<=', '3.5'));
    expect(held).toMatchObject({
      tested: null,
      headroom: { absolute: null, mayFall: null, moneyLeft: null },
    });
  });

  test('an operator that does not fit the measure is left to a person', () => {
    expect(holdAgainstLevel(netLeverage, sides(40, 12), terms('>=', '3.5')).outcome).toBe('cannot be tested');
    expect(holdAgainstLevel(interestCover, sides(40, 12), terms('<=', '3.5')).outcome).toBe(
      'cannot be tested',
    );
  });
});

describe('headroom', () => {
  const amount = fc.integer({ min: 1, max: 10_000_000 });
  const level = fc.integer({ min: 1, max: 2_000 }).map((hundredths) => decimal(hundredths).div(100));
  const one = decimal(1);

  test('what may fall brings leverage exactly to the level', () => {
    fc.assert(
      fc.property(amount, amount, level, (debt, earnings, most) => {
        const { mayFall } = holdAgainstLevel(
          netLeverage,
          sides(debt, earnings),
          terms('<=', most.toFixed()),
        ).headroom;
        const fallen = decimal(earnings).times(one.minus(mayFall ?? 0));
        expect(decimal(debt).div(fallen).minus(most).abs().lt('1e-20')).toBe(true);
      }),
    );
  });

  test('what may fall brings cover exactly to the level, and is never more than the share of the level', () => {
    fc.assert(
      fc.property(amount, amount, level, (earnings, interest, least) => {
        const { headroom } = holdAgainstLevel(
          interestCover,
          sides(earnings, interest),
          terms('>=', least.toFixed()),
        );
        const fallen = decimal(earnings).times(one.minus(headroom.mayFall ?? 0));
        expect(fallen.div(interest).minus(least).abs().lt('1e-20')).toBe(true);
        expect(headroom.mayFall?.lte(headroom.shareOfLevel ?? 0)).toBe(true);
      }),
    );
  });

  test('what may fall brings an amount exactly to its minimum', () => {
    fc.assert(
      fc.property(amount, amount, (cash, least) => {
        const { mayFall } = holdAgainstLevel(
          minimumLiquidity,
          sides(cash, null),
          terms('>=', least),
        ).headroom;
        expect(
          decimal(cash)
            .times(one.minus(mayFall ?? 0))
            .minus(least)
            .abs()
            .lt('1e-20'),
        ).toBe(true);
      }),
    );
  });

  test('what is left in money and what debt may rise by bring the test exactly to the level', () => {
    fc.assert(
      fc.property(amount, amount, level, (debt, earnings, most) => {
        const { headroom } = holdAgainstLevel(
          netLeverage,
          sides(debt, earnings),
          terms('<=', most.toFixed()),
        );
        const afterLoss = decimal(debt).div(decimal(earnings).minus(headroom.moneyLeft ?? 0));
        const afterBorrowing = decimal(debt)
          .plus(headroom.otherSideMayRise ?? 0)
          .div(earnings);
        expect(afterLoss.minus(most).abs().lt('1e-20')).toBe(true);
        expect(afterBorrowing.minus(most).abs().lt('1e-20')).toBe(true);
      }),
    );
  });

  test('says of what the share is: earnings, or the tested amount where there are none', () => {
    expect(holdAgainstLevel(netLeverage, sides(3, 1), terms('<=', 4)).headroom.fallOf).toBe('earnings');
    expect(holdAgainstLevel(currentRatio, sides(3, 1), terms('>=', 1)).headroom.fallOf).toBe('tested amount');
  });

  // Worked example of the trade: debt 320, EBITDA 100, at most 4.0x; EBITDA 36, interest 10, at least 3.0x.
  test('of a maximum is 20 % either way, of a minimum less than it looks', () => {
    const leverage = holdAgainstLevel(netLeverage, sides(320, 100), terms('<=', 4)).headroom;
    expect([leverage.mayFall, leverage.moneyLeft, leverage.otherSideMayRise].map(String)).toEqual([
      '0.2',
      '20',
      '80',
    ]);
    const cover = holdAgainstLevel(interestCover, sides(36, 10), terms('>=', 3)).headroom;
    expect([cover.shareOfLevel, cover.moneyLeft, cover.otherSideMayRise].map(String)).toEqual([
      '0.2',
      '6',
      '2',
    ]);
    expect(cover.mayFall?.toFixed(4)).toBe('0.1667');
  });
});
