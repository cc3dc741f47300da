/** Headroom in all its forms: methods.md A5. */
import { decimal, type Decimal } from '../money/decimal.ts';
import type { Measure } from '../measures/measured.ts';
import type { Headroom } from './covenantTest.ts';

/**
 * What stands on the two sides of a test; `denominator` is null for an amount. `earnings` are the EBITDA inside what
 * covers, where it holds other cash items too.
 */
export interface Sides {
  readonly numerator: Decimal;
  readonly denominator: Decimal | null;
  readonly earnings?: Decimal;
}

/** Whether the level is the most or the least that the agreement allows. */
export type Bound = 'most' | 'least';

type Forms = Omit<Headroom, 'fallOf'>;

const ONE = decimal(1);

export const NO_HEADROOM: Forms = {
  absolute: null,
  shareOfLevel: null,
  mayFall: null,
  moneyLeft: null,
  otherSideMayRise: null,
  otherSideShare: null,
};

/**
 * What may fall: earnings where the measure has any, else the tested amount itself.
 *
 * @example fallOf({ earningsSide: null }) // => 'tested amount'
 */
export const fallOf = ({ earningsSide }: Pick<Measure, 'earningsSide'>): Headroom['fallOf'] =>
  earningsSide === null ? 'tested amount' : 'earnings';

/**
 * A burden (debt) over what carries it (earnings, net worth, value), at most the level. What carries may fall by
 * 1 - N / (T E), which is the headroom as a share of the level; the burden may rise by T E - N.
 *
 * With no burden left (net cash) what carries may fall to nought. What carries must be positive.
 * Source: methods.md A5.
 *
 * @example burdenHeadroom(decimal(42), decimal(15), decimal('3.5')).mayFall // => 0.2
 */
export function burdenHeadroom(
  burden: Decimal,
  carrier: Decimal,
  level: Decimal,
  ratio = burden.div(carrier),
): Forms {
  const absolute = level.minus(ratio);
  const capacity = level.times(carrier).minus(burden);
  if (burden.lte(0))
    return { ...NO_HEADROOM, absolute, mayFall: ONE, moneyLeft: carrier, otherSideMayRise: capacity };
  const shareOfLevel = shareOf(absolute, level);
  return {
    absolute,
    shareOfLevel,
    mayFall: shareOfLevel,
    moneyLeft: level.isZero() ? null : carrier.minus(burden.div(level)),
    otherSideMayRise: capacity,
    otherSideShare: capacity.div(burden),
  };
}

/**
 * What covers (earnings, current assets) over a charge, at least the level. What covers may fall by 1 - T C / N,
 * which is always less than the headroom as a share of the level, by which the charge may rise.
 *
 * The charge must be positive. Where what covers is not positive it has no share that it may fall by.
 * Source: methods.md A5.
 *
 * @example coverHeadroom(decimal(10), decimal(4), decimal(2)) // => { absolute: 0.5, shareOfLevel: 0.25, mayFall: 0.2, moneyLeft: 2, otherSideMayRise: 1, otherSideShare: 0.25 }
 */
export function coverHeadroom(
  covers: Decimal,
  charge: Decimal,
  level: Decimal,
  ratio = covers.div(charge),
): Forms {
  const absolute = ratio.minus(level);
  const needed = level.times(charge);
  const shareOfLevel = shareOf(absolute, level);
  return {
    absolute,
    shareOfLevel,
    mayFall: covers.gt(0) ? ONE.minus(needed.div(covers)) : null,
    moneyLeft: covers.minus(needed),
    otherSideMayRise: level.isZero() ? null : covers.div(level).minus(charge),
    otherSideShare: shareOfLevel,
  };
}

/**
 * An amount against its minimum or limit: as a share of the level for the just-passing band; a minimum's amount
 * may fall by (A - min) / A, a limit's may rise by (limit - A) / limit. Source: methods.md A5.
 *
 * @example amountHeadroom(decimal(10), decimal(8), 'least').mayFall // => 0.2
 */
export function amountHeadroom(amount: Decimal, level: Decimal, bound: Bound): Forms {
  const absolute = bound === 'least' ? amount.minus(level) : level.minus(amount);
  const shareOfLevel = shareOf(absolute, level);
  const mayMove = bound === 'most' ? shareOfLevel : amount.gt(0) ? absolute.div(amount) : null;
  return { ...NO_HEADROOM, absolute, shareOfLevel, mayFall: mayMove, moneyLeft: absolute };
}

/**
 * The same money over EBITDA: how far EBITDA may fall where what covers is EBITDA less other cash items.
 * Source: methods.md A5.
 *
 * @example earningsMayFall({ moneyLeft: decimal('0.75'), ebitda: decimal(12) }) // => 0.0625
 */
export const earningsMayFall = ({
  moneyLeft,
  ebitda,
}: {
  readonly moneyLeft: Decimal;
  readonly ebitda: Decimal;
}): Decimal | null => (ebitda.gt(0) ? moneyLeft.div(ebitda) : null);

/**
 * The earnings (or the tested amount) at which a test stands exactly at its level, the other side unchanged:
 * N / T for a burden, T C for a cover, T for an amount. Null where a burden has no level to be divided by.
 *
 * @example amountAtLevel('burden', { numerator: decimal(42), denominator: decimal(11) }, decimal('3.5')) // => 12
 */
export function amountAtLevel(shape: Measure['shape'], sides: Sides, level: Decimal): Decimal | null {
  if (shape === 'burden') return level.gt(0) ? sides.numerator.div(level) : null;
  return shape === 'cover' && sides.denominator ? level.times(sides.denominator) : level;
}

const shareOf = (absolute: Decimal, level: Decimal): Decimal | null =>
  level.isZero() ? null : absolute.div(level.abs());
