/** Equity put in to cure a test that is not met: methods.md A6. */
import { isSamePeriodEnd, monthsBefore } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { unreachable } from '../result.ts';
import type { Decimal } from '../money/decimal.ts';
import { amountAtLevel, type Sides } from './headroom.ts';
import type { Shaped } from './holdAgainstLevel.ts';

/** Whether the money counts as EBITDA, repays debt, or both. */
export type CureMethod = 'ebitda' | 'debt' | 'both';

/**
 * What it takes to bring leverage to its level: N / T - E as EBITDA, N - T E as debt, (N - T E) / (1 + T) as both.
 *
 * Currency units of the sides. Negative where nothing needs curing. The level must be positive.
 *
 * @example cureAmount({ debt: decimal(45), ebitda: decimal(12), level: decimal('3.5'), method: 'debt' }) // => 3
 */
export function cureAmount({
  debt,
  ebitda,
  level,
  method,
}: {
  readonly debt: Decimal;
  readonly ebitda: Decimal;
  readonly level: Decimal;
  readonly method: CureMethod;
}): Decimal {
  const short = debt.minus(level.times(ebitda));
  switch (method) {
    case 'ebitda':
      return debt.div(level).minus(ebitda);
    case 'debt':
      return short;
    case 'both':
      return short.div(level.plus(1));
    default:
      return unreachable(method);
  }
}

/** What it takes to land on the level, by the way in which the money counts; null for a way that cannot reach it. */
type CureNeeded = Readonly<Record<CureMethod, Decimal | null>>;

/**
 * What it takes to bring any test to its level. As EBITDA where earnings stand in the test; as debt where debt is the
 * burden and something positive carries it; as both only in leverage. Interest that repaid debt would save is left
 * out, so a cover is cured by EBITDA alone.
 *
 * Currency units of the sides; negative where nothing needs curing. Source: methods.md A6, cover and amount by the
 * same algebra.
 *
 * @example cureNeeded(netLeverage, { numerator: decimal(45), denominator: decimal(12) }, decimal('3.5')).debt // => 3
 */
export function cureNeeded(measure: Shaped, sides: Sides, level: Decimal): CureNeeded {
  const { numerator, denominator } = sides;
  if (measure.shape === 'burden' && denominator && level.gt(0)) {
    const by = (method: CureMethod) => cureAmount({ debt: numerator, ebitda: denominator, level, method });
    const debt = denominator.gt(0) ? by('debt') : null;
    return measure.earningsSide === 'denominator'
      ? { ebitda: by('ebitda'), debt, both: by('both') }
      : { ebitda: null, debt, both: null };
  }
  const atLevel = amountAtLevel(measure.shape, sides, level);
  const ebitda = measure.earningsSide === 'numerator' && atLevel ? atLevel.minus(numerator) : null;
  return { ebitda, debt: null, both: null };
}

/**
 * The sides with money put in: as EBITDA it adds to earnings, as debt it repays the burden.
 *
 * @example sidesWithCure(netLeverage, { numerator: decimal(45), denominator: decimal(12) }, decimal(1), 'both') // => { numerator: 44, denominator: 13 }
 */
export function sidesWithCure(measure: Shaped, sides: Sides, money: Decimal, method: CureMethod): Sides {
  const added = method === 'debt' ? sides : withEarnings(measure, sides, money);
  return method === 'ebitda' || measure.shape !== 'burden'
    ? added
    : { ...added, numerator: added.numerator.minus(money) };
}

/**
 * The sides with something added to the earnings that stand in the test; unchanged where none do.
 *
 * @example withEarnings(netLeverage, { numerator: decimal(42), denominator: decimal(13) }, decimal(-2)).denominator // => 11
 */
export function withEarnings(
  { earningsSide }: Pick<Shaped, 'earningsSide'>,
  sides: Sides,
  added: Decimal,
): Sides {
  if (earningsSide === 'numerator') return { ...sides, numerator: sides.numerator.plus(added) };
  if (earningsSide === 'denominator' && sides.denominator)
    return { ...sides, denominator: sides.denominator.plus(added) };
  return sides;
}

export interface CuresUsed {
  readonly usedInFour: number;
  readonly usedInLife: number;
  readonly available: boolean;
}

/**
 * How many cures were used in the four quarters up to the test date and over the life, and whether one is left.
 *
 * @example curesUsed({ curedQuarters: ['2026-03-31'], testDate: '2026-09-30', mostInFour: 2, mostInLife: 5 }) // => { usedInFour: 1, usedInLife: 1, available: true }
 */
export function curesUsed({
  curedQuarters,
  testDate,
  mostInFour,
  mostInLife,
}: {
  readonly curedQuarters: readonly PlainDate[];
  readonly testDate: PlainDate;
  readonly mostInFour: number;
  readonly mostInLife: number;
}): CuresUsed {
  const usedInFour = curedQuarters.filter((quarter) => countsOn(quarter, testDate)).length;
  const usedInLife = curedQuarters.length;
  return { usedInFour, usedInLife, available: usedInFour < mostInFour && usedInLife < mostInLife };
}

/**
 * Reported EBITDA with cure money that counts for its quarter and the next three, for covenant purposes only.
 *
 * @example ebitdaWithCure(decimal(12), '2026-09-30', { quarter: '2026-03-31', amount: decimal(1) }) // => 13
 */
export const ebitdaWithCure = (
  reported: Decimal,
  testDate: PlainDate,
  cure: { readonly quarter: PlainDate; readonly amount: Decimal },
): Decimal => (countsOn(cure.quarter, testDate) ? reported.plus(cure.amount) : reported);

/**
 * Whether cure money of a quarter counts on a test date: in its own quarter and the next three.
 *
 * @example countsOn('2025-03-31', '2025-12-31') // => true
 * @example countsOn('2025-03-31', '2026-03-31') // => false
 */
export const countsOn = (quarter: PlainDate, testDate: PlainDate): boolean =>
  [0, 3, 6, 9].some((months) => isSamePeriodEnd(quarter, monthsBefore(testDate, months)));
