/** One measured result against one level: the outcome, and every case that has no ratio. */
import { unreachable } from '../result.ts';
import type { Measure } from '../measures/measured.ts';
import type { Decimal } from '../money/decimal.ts';
import { isMaximum, type Operator } from './covenant.ts';
import type { Headroom, Outcome } from './covenantTest.ts';
import {
  amountHeadroom,
  burdenHeadroom,
  coverHeadroom,
  fallOf,
  NO_HEADROOM,
  type Sides,
} from './headroom.ts';

export interface Terms {
  readonly operator: Operator;
  readonly level: Decimal;
  /** Decimal places the agreement rounds to before comparing; null compares unrounded. */
  readonly roundingPlaces: number | null;
}

export interface Held {
  /** Unrounded; null where it has no meaning. */
  readonly tested: Decimal | null;
  readonly outcome: Outcome;
  readonly reason: string | null;
  /** The outcome would be another without the agreement's rounding. */
  readonly roundingDecides: boolean;
  readonly headroom: Headroom;
}

export type Shaped = Pick<Measure, 'shape' | 'earningsSide' | 'words'>;

/**
 * Holds a result against a level.
 *
 * A burden with earnings that are not positive is not met, never a negative ratio under a maximum; net cash is met;
 * with neither debt nor earnings, and with no charge and nothing that covers, a person reads the agreement. Compared
 * unrounded unless the agreement rounds. Source: methods.md A4 and A5.
 *
 * @example holdAgainstLevel(netLeverage, { numerator: decimal(45), denominator: decimal(12) }, { operator: '<=', level: decimal('3.5'), roundingPlaces: null }).outcome // => 'not met'
 */
export function holdAgainstLevel(measure: Shaped, sides: Sides, terms: Terms): Held {
  switch (measure.shape) {
    case 'burden':
      return holdBurden(measure, sides, terms);
    case 'cover':
      return holdCover(measure, sides, terms);
    case 'amount':
      return compared(measure, sides.numerator, terms, (level) =>
        amountHeadroom(sides.numerator, level, isMaximum(terms.operator) ? 'most' : 'least'),
      );
    default:
      return unreachable(measure.shape);
  }
}

/** Whether a result satisfies the operator, at the agreement's rounding. */
function satisfies(tested: Decimal, { operator, level, roundingPlaces }: Terms): boolean {
  const value = roundingPlaces === null ? tested : tested.toDecimalPlaces(roundingPlaces);
  switch (operator) {
    case '<=':
      return value.lte(level);
    case '<':
      return value.lt(level);
    case '>=':
      return value.gte(level);
    case '>':
      return value.gt(level);
    default:
      return unreachable(operator);
  }
}

function holdBurden(measure: Shaped, { numerator: burden, denominator }: Sides, terms: Terms): Held {
  const { carrier: word } = measure.words;
  if (!denominator || !isMaximum(terms.operator)) return doesNotFit(measure, terms.operator);
  if (denominator.gt(0) && burden.gt(0))
    return compared(measure, burden.div(denominator), terms, (level) =>
      burdenHeadroom(burden, denominator, level),
    );
  if (denominator.gt(0)) {
    const headroom = { ...burdenHeadroom(burden, denominator, terms.level), fallOf: fallOf(measure) };
    return {
      ...withoutRatio(measure, 'met, net cash', 'net cash'),
      tested: burden.div(denominator),
      headroom,
    };
  }
  return burden.gt(0)
    ? withoutRatio(measure, 'not met, ratio has no meaning', `${word} not positive: ratio has no meaning`)
    : withoutRatio(measure, 'cannot be tested', `no debt and ${word} not positive: the agreement decides`);
}

function holdCover(measure: Shaped, { numerator: covers, denominator: charge }: Sides, terms: Terms): Held {
  if (!charge || isMaximum(terms.operator)) return doesNotFit(measure, terms.operator);
  if (charge.gt(0))
    return compared(measure, covers.div(charge), terms, (level) => coverHeadroom(covers, charge, level));
  const nothing = `no ${measure.words.charge} to cover`;
  return covers.gt(0)
    ? withoutRatio(measure, 'met, no charge to cover', nothing)
    : withoutRatio(measure, 'cannot be tested', `${nothing} and numerator not positive`);
}

function compared(
  measure: Shaped,
  tested: Decimal,
  terms: Terms,
  forms: (level: Decimal) => Omit<Headroom, 'fallOf'>,
): Held {
  const isSatisfied = satisfies(tested, terms);
  return {
    tested,
    outcome: isSatisfied ? 'met' : 'not met',
    reason: null,
    roundingDecides: isSatisfied !== satisfies(tested, { ...terms, roundingPlaces: null }),
    headroom: { ...forms(terms.level), fallOf: fallOf(measure) },
  };
}

const withoutRatio = (measure: Shaped, outcome: Outcome, reason: string): Held => ({
  tested: null,
  outcome,
  reason,
  roundingDecides: false,
  headroom: { ...NO_HEADROOM, fallOf: fallOf(measure) },
});

const doesNotFit = (measure: Shaped, operator: Operator): Held =>
  withoutRatio(
    measure,
    'cannot be tested',
    `the operator ${operator} does not fit this measure: check the covenant`,
  );
