/** A test in words, the same on screens, in mail and in sheets. */
import { MEASURES } from '../measures/index.ts';
import type { MeasureCode } from '../measures/measure.ts';
import { figureInUnit, levelInUnit } from '../measures/printUnit.ts';
import type { Decimal } from '../money/decimal.ts';
import type { Covenant, Operator } from './covenant.ts';
import {
  isMet,
  isNotMet,
  isPastOurTrigger,
  type CounterfactualKind,
  type CovenantTest,
  type Outcome,
} from './covenantTest.ts';

export const OPERATOR_WORDS: Readonly<Record<Operator, string>> = {
  '<=': 'at most',
  '<': 'less than',
  '>=': 'at least',
  '>': 'more than',
};

/**
 * A tested ratio or amount in its unit, with the digits that show the side of the level that it is on.
 *
 * @example testedInWords('net-leverage', decimal('3.4512'), decimal('3.5')) // => '3.45x'
 */
export const testedInWords = (measure: MeasureCode, tested: Decimal, level: Decimal | null): string =>
  figureInUnit(MEASURES[measure].unit, tested, { beside: level });

/**
 * A level in its measure's unit, with every digit that a ratio's level has.
 *
 * @example levelInWords('minimum-liquidity', decimal(5_250_000)) // => '5.25m'
 */
export const levelInWords = (measure: MeasureCode, level: Decimal): string =>
  levelInUnit(MEASURES[measure].unit, level);

/**
 * A test with its level: 'Net leverage 3.45x, at most 3.50x'.
 *
 * @example testInWords(test) // => 'Net leverage 3.00x, at most 3.50x'
 */
export function testInWords({
  measure,
  tested,
  level,
  operator,
}: Pick<CovenantTest, 'measure' | 'tested' | 'level' | 'operator'>): string {
  const label = MEASURES[measure].label;
  const result = tested ? `${label} ${testedInWords(measure, tested, level)}` : `${label} has no meaning`;
  return level ? `${result}, ${OPERATOR_WORDS[operator]} ${levelInWords(measure, level)}` : result;
}

/** The mark of the desk's own trigger, wherever a test is shown. */
export const OURS = 'ours, not in the agreement';
export const OUR_TRIGGER = 'Our trigger, not in the agreement';

/**
 * A test as a sentence about a covenant begins; the desk's own trigger says that it is ours.
 *
 * @example saidOf({ isOurs: true }, test) // => 'Our trigger, not in the agreement: Net leverage 3.00x, at most 3.50x'
 */
export const saidOf = (
  { isOurs }: Pick<Covenant, 'isOurs'>,
  test: Pick<CovenantTest, 'measure' | 'tested' | 'level' | 'operator'>,
): string => (isOurs ? `${OUR_TRIGGER}: ${testInWords(test)}` : testInWords(test));

/**
 * A covenant by name and clause; the desk's own trigger has no clause.
 *
 * @example covenantInWords(covenant) // => 'Net leverage, clause 20.2(a)'
 */
export const covenantInWords = ({
  name,
  clause,
  isOurs,
}: Pick<Covenant, 'name' | 'clause' | 'isOurs'>): string =>
  isOurs ? `${name}, ${OURS}` : `${name}, clause ${clause}`;

/** What was taken out of earnings, in words: methods.md B7. */
export const COUNTERFACTUAL_WORDS: Readonly<Record<CounterfactualKind, string>> = {
  'without add-backs': 'Without add-backs',
  'without unexplained accruals': 'Without accruals the peers do not show',
  'without either': 'Without either',
  'on a cash basis': 'On a cash basis',
};

/**
 * The outcome of a reading that nobody reported: it decides nothing, so its words stay conditional.
 *
 * @example wouldHaveBeen('not met') // => 'would not have been met'
 * @example wouldHaveBeen('above our trigger') // => 'would have been above our trigger'
 */
export function wouldHaveBeen(outcome: Outcome): string {
  if (isMet(outcome)) return 'would have been met';
  if (isNotMet(outcome)) return 'would not have been met';
  return isPastOurTrigger(outcome) ? `would have been ${outcome}` : outcome;
}
