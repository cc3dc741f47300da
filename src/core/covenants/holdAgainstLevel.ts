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
  earningsMayFall,
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

export interface Verdict {
  /** Unrounded; null where it has no meaning. */
  readonly tested: Decimal | null;
  readonly outcome: Outcome;
  readonly reason: string | null;
  /** The outcome would be another without the agreement's rounding. */
  readonly roundingDecides: boolean;
}

export interface Held extends Verdict {
  readonly headroom: Headroom;
}

export type Shaped = Pick<Measure, 'shape' | 'earningsSide' | 'withoutCharge' | 'words'>;

/**
 * Holds a result against a level: the verdict, and every form of headroom.
 * `knownRatio` is what the sides came to against another level already: it is not divided again.
 *
 * @example holdAgainstLevel(netLeverage, { numerator: decimal(42), denominator: decimal(15) }, { operator: '<=', level: decimal('3.5'), roundingPlaces: null }).headroom.mayFall // => 0.2
 */
export function holdAgainstLevel(
  measure: Shaped,
  sides: Sides,
  terms: Terms,
  knownRatio: Decimal | null = null,
): Held {
  const verdict = verdictOn(measure, sides, terms, knownRatio);
  const { tested } = verdict;
  const forms = tested === null ? NO_HEADROOM : formsOf(measure.shape, sides, tested, terms);
  return { ...verdict, headroom: { ...forms, fallOf: fallOf(measure) } };
}

function formsOf(
  shape: Measure['shape'],
  { numerator, denominator, earnings }: Sides,
  tested: Decimal,
  { level, operator }: Terms,
): Omit<Headroom, 'fallOf'> {
  if (shape === 'amount' || !denominator)
    return amountHeadroom(numerator, level, isMaximum(operator) ? 'most' : 'least');
  if (shape === 'burden') return burdenHeadroom(numerator, denominator, level, tested);
  const forms = coverHeadroom(numerator, denominator, level, tested);
  if (!earnings || !forms.moneyLeft) return forms;
  return { ...forms, mayFall: earningsMayFall({ moneyLeft: forms.moneyLeft, ebitda: earnings }) };
}

/**
 * Whether a result meets a level.
 *
 * A burden with earnings that are not positive is not met, never a negative ratio under a maximum; net cash is met;
 * with neither debt nor earnings, and with no charge and nothing that covers, a person reads the agreement. Compared
 * unrounded unless the agreement rounds. Source: methods.md A4 and A5.
 *
 * @example verdictOn(netLeverage, { numerator: decimal(45), denominator: decimal(12) }, { operator: '<=', level: decimal('3.5'), roundingPlaces: null }).outcome // => 'not met'
 */
export function verdictOn(
  measure: Shaped,
  sides: Sides,
  terms: Terms,
  knownRatio: Decimal | null = null,
): Verdict {
  switch (measure.shape) {
    case 'burden':
      return onBurden(measure, sides, terms, knownRatio);
    case 'cover':
      return onCover(measure, sides, terms, knownRatio);
    case 'amount':
      return compared(sides.numerator, terms);
    default:
      return unreachable(measure.shape);
  }
}

function onBurden(
  { words, withoutCharge }: Shaped,
  { numerator: burden, denominator: carrier }: Sides,
  terms: Terms,
  knownRatio: Decimal | null,
): Verdict {
  if (!carrier || !isMaximum(terms.operator)) return doesNotFit(terms.operator);
  if (carrier.gt(0)) {
    const ratio = knownRatio ?? burden.div(carrier);
    if (burden.gt(0)) return compared(ratio, terms);
    if (withoutCharge === 'met') return { ...compared(ratio, terms), reason: `no ${words.otherSide}` };
    return { ...withoutRatio('met, net cash', 'net cash'), tested: ratio };
  }
  return burden.gt(0)
    ? withoutRatio('not met, ratio has no meaning', `${words.carrier} not positive: ratio has no meaning`)
    : withoutRatio('cannot be tested', `no debt and ${words.carrier} not positive: the agreement decides`);
}

function onCover(
  { words, withoutCharge }: Shaped,
  { numerator: covers, denominator: charge }: Sides,
  terms: Terms,
  knownRatio: Decimal | null,
): Verdict {
  if (!charge || isMaximum(terms.operator)) return doesNotFit(terms.operator);
  if (charge.gt(0)) return compared(knownRatio ?? covers.div(charge), terms);
  const nothing = `no ${words.charge} to cover`;
  return covers.gt(0) || withoutCharge === 'met'
    ? withoutRatio('met, no charge to cover', nothing)
    : withoutRatio('cannot be tested', `${nothing} and numerator not positive`);
}

function compared(tested: Decimal, terms: Terms): Verdict {
  const isSatisfied = satisfies(tested, terms);
  return {
    tested,
    outcome: isSatisfied ? 'met' : 'not met',
    reason: null,
    roundingDecides:
      terms.roundingPlaces !== null && isSatisfied !== satisfies(tested, { ...terms, roundingPlaces: null }),
  };
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

const withoutRatio = (outcome: Outcome, reason: string): Verdict => ({
  tested: null,
  outcome,
  reason,
  roundingDecides: false,
});

const doesNotFit = (operator: Operator): Verdict =>
  withoutRatio('cannot be tested', `the operator ${operator} does not fit this measure: check the covenant`);
