/** Verdicts by random search around the level, against exact fractions of whole numbers. */
import fc from 'fast-check';
import { expect, test } from 'vitest';
import { allowAddBacks } from '../measures/addBacks.ts';
import { interestCover } from '../measures/interestCover.ts';
import { netLeverage } from '../measures/netLeverage.ts';
import { decimal } from '../money/decimal.ts';
import { compared, least, minus, over, plus, rational, times } from '../money/rational.fixture.ts';
import { verdictOn } from './holdAgainstLevel.ts';

/** Ten-thousandths as plain text, the places that amounts and levels are held with. */
const text = (units: bigint): string => {
  const digits = (units < 0n ? -units : units).toString().padStart(5, '0');
  return `${units < 0n ? '-' : ''}${digits.slice(0, -4)}.${digits.slice(-4)}`;
};

const earningsUnits = fc.bigInt({ min: 1n, max: 10n ** 16n });
const levelUnits = fc.bigInt({ min: 1n, max: 150_000n });
/** How far the other side lies from exactly at the level: mostly not at all, or by the last place that is held. */
const awayUnits = fc.oneof(fc.constantFrom(-1n, 0n, 1n), fc.bigInt({ min: -(10n ** 12n), max: 10n ** 12n }));

test.each([
  ['<=', netLeverage, (side: number) => side <= 0],
  ['<', netLeverage, (side: number) => side < 0],
  ['>=', interestCover, (side: number) => side >= 0],
  ['>', interestCover, (side: number) => side > 0],
] as const)('a ratio %s its level is met as the exact fraction is', (operator, measure, satisfies) => {
  fc.assert(
    fc.property(earningsUnits, levelUnits, awayUnits, (below, level, away) => {
      const above = (below * level) / 10_000n + away;
      fc.pre(above > 0n);
      const [numerator, denominator, held] = [above, below, level].map(text) as [string, string, string];
      const side = compared(over(rational(numerator), rational(denominator)), rational(held));
      const sides = { numerator: decimal(numerator), denominator: decimal(denominator) };
      const terms = { operator, level: decimal(held), roundingPlaces: null };
      expect(verdictOn(measure, sides, terms).outcome).toBe(satisfies(side) ? 'met' : 'not met');
    }),
    { numRuns: 2_000 },
  );
});

test('four of add-backs are all allowed on twelve where a quarter of what they leave is', () => {
  const { allowed, disallowed, adjusted } = allowAddBacks({
    ebitda: decimal(12),
    uncapped: decimal(0),
    capped: decimal(4),
    terms: { cap: decimal('0.25'), basis: 'after' },
  });
  expect([allowed, disallowed, adjusted].map(String)).toEqual(['4', '0', '16']);
  // 56 on 16 is exactly 3.50x.
  const sides = { numerator: decimal(56), denominator: adjusted };
  expect(
    verdictOn(netLeverage, sides, { operator: '<=', level: decimal('3.5'), roundingPlaces: null }).outcome,
  ).toBe('met');
});

test.each(['before', 'after'] as const)(
  'leverage on EBITDA with add-backs capped %s them is met as exact fractions say',
  (basis) => {
    const amounts = fc.bigInt({ min: 0n, max: 10n ** 13n });
    const caps = fc.integer({ min: 1, max: 99 });
    fc.assert(
      fc.property(
        earningsUnits,
        amounts,
        amounts,
        caps,
        levelUnits,
        awayUnits,
        (ebitda, free, capped, cap, level, away) => {
          const share = rational(`0.${String(cap).padStart(2, '0')}`);
          const base = plus(rational(text(ebitda)), rational(text(free)));
          const limit =
            basis === 'before' ? times(base, share) : over(times(base, share), minus(rational('1'), share));
          const adjusted = plus(base, least(rational(text(capped)), limit));
          // Debt in ten-thousandths at the level on those earnings, rounded down, and then away from it.
          const atLevel = times(adjusted, rational(text(level)));
          const debt = (atLevel.numerator * 10_000n) / atLevel.denominator + away;
          fc.pre(debt > 0n);
          const isMet = compared(rational(text(debt)), atLevel) <= 0;
          const taken = allowAddBacks({
            ebitda: decimal(text(ebitda)),
            uncapped: decimal(text(free)),
            capped: decimal(text(capped)),
            terms: { cap: decimal(cap).div(100), basis },
          });
          const sides = { numerator: decimal(text(debt)), denominator: taken.adjusted };
          const terms = { operator: '<=', level: decimal(text(level)), roundingPlaces: null } as const;
          expect(verdictOn(netLeverage, sides, terms).outcome).toBe(isMet ? 'met' : 'not met');
        },
      ),
      { numRuns: 2_000 },
    );
  },
);
