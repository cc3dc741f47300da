/** What a fall of earnings, cash that does not come in, and dearer interest do to the two sides of a test. */
import type { Covenant } from '../covenants/covenant.ts';
import type { Sides } from '../covenants/headroom.ts';
import { MEASURES } from '../measures/index.ts';
import type { MeasureCode } from '../measures/measure.ts';
import { Decimal, ZERO } from '../money/decimal.ts';

/** Amounts of the covenant's currency, each nought or above. */
export interface Blow {
  readonly earnings: Decimal;
  readonly cash: Decimal;
  readonly interest: Decimal;
}

/** Where missing cash shows; what is owed grows only by what cash does not cover. */
type CashShows = 'net debt' | 'debt' | 'numerator' | 'net worth below' | null;

interface Reach {
  readonly cash: CashShows;
  readonly interestBelow: boolean;
}

const NOWHERE: Reach = { cash: null, interestBelow: false };

/** Earnings reach the side that the measure says they stand on. */
const REACH: Readonly<Record<MeasureCode, Reach>> = {
  'total-leverage': { cash: 'debt', interestBelow: false },
  'senior-leverage': { cash: 'debt', interestBelow: false },
  'net-leverage': { cash: 'net debt', interestBelow: false },
  'interest-cover': { cash: null, interestBelow: true },
  'debt-service-cover': { cash: 'numerator', interestBelow: true },
  'fixed-charge-cover': { cash: null, interestBelow: true },
  'loan-to-value': NOWHERE,
  'debt-yield': NOWHERE,
  'current-ratio': { cash: 'numerator', interestBelow: false },
  'quick-ratio': { cash: 'numerator', interestBelow: false },
  'tangible-net-worth': { cash: 'numerator', interestBelow: false },
  gearing: { cash: 'net worth below', interestBelow: false },
  'minimum-liquidity': { cash: 'numerator', interestBelow: false },
  'minimum-ebitda': NOWHERE,
  'capital-expenditure': NOWHERE,
};

/** A test as a blow finds it. */
export interface Struck extends Pick<Covenant, 'measure' | 'definition'> {
  readonly sides: Sides;
  /** Cash on the test date; null where it is not known, and then none of the loss is covered by it. */
  readonly cash: Decimal | null;
}

/**
 * Whether any part of a blow reaches the test at all.
 *
 * @example isReached('loan-to-value', { earnings: decimal(1), cash: decimal(1), interest: decimal(1) }) // => false
 */
export function isReached(measure: MeasureCode, blow: Blow): boolean {
  const reach = REACH[measure];
  return (
    (!blow.earnings.isZero() && MEASURES[measure].earningsSide !== null) ||
    (!blow.cash.isZero() && reach.cash !== null) ||
    (!blow.interest.isZero() && reach.interestBelow)
  );
}

/**
 * The sides after a share of a blow. A fall of earnings moves earnings alone: debt, cash and tax stay as they are. Cash
 * that is missing comes off cash first and is drawn after that; a cap on netting lets go what lies above it first.
 * Interest is that of a full year.
 *
 * @example sidesAfter({ ...covenant, sides: { numerator: decimal(39), denominator: decimal(13) }, cash: decimal(6) }, { earnings: decimal(2), cash: decimal(1), interest: decimal(0) }, decimal(1)) // => { numerator: 40, denominator: 11 }
 */
export function sidesAfter(struck: Struck, blow: Blow, share: Decimal): Sides {
  const { measure, sides } = struck;
  const reach = REACH[measure];
  const { earningsSide } = MEASURES[measure];
  const [earnings, cash] = [blow.earnings.times(share), blow.cash.times(share)];
  let { numerator, denominator } = sides;
  if (earningsSide === 'numerator') numerator = numerator.minus(earnings);
  if (earningsSide === 'denominator') denominator = denominator && denominator.minus(earnings);
  if (reach.cash === 'numerator') numerator = numerator.minus(cash);
  if (reach.cash === 'net worth below') denominator = denominator && denominator.minus(cash);
  const free = freeCash(struck);
  if (free) numerator = numerator.plus(Decimal.max(ZERO, cash.minus(free)));
  if (reach.interestBelow) denominator = denominator && denominator.plus(blow.interest.times(share));
  return { numerator, denominator };
}

/** How much cash may go before debt as the test has it rises; null where no debt stands in the test. */
function freeCash({ measure, definition: { cashNettingCap: cap }, cash }: Struck): Decimal | null {
  const shows = REACH[measure].cash;
  if (shows === 'debt') return Decimal.max(ZERO, cash ?? ZERO);
  if (shows !== 'net debt') return null;
  return cap === null ? ZERO : Decimal.max(ZERO, (cash ?? ZERO).minus(cap));
}

/**
 * The shares of a blow at which the sides bend, between nought and one: up to there cash covers it.
 *
 * @example bendsOf({ ...covenant, measure: 'total-leverage', sides: { numerator: decimal(39), denominator: decimal(13) }, cash: decimal(6) }, { earnings: decimal(0), cash: decimal(12), interest: decimal(0) }) // => [0.5]
 */
export function bendsOf(struck: Struck, { cash }: Blow): readonly Decimal[] {
  const free = freeCash(struck);
  return free?.gt(0) && cash.gt(free) ? [free.div(cash)] : [];
}
