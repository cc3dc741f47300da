import type { PlainDate } from '../calendar/plainDate.ts';
import type { BridgeLine } from '../measures/bridge.ts';
import type { Decimal } from '../money/decimal.ts';
import type { InputUsed, MeasureCode, MissingLine } from '../measures/measure.ts';
import type { Operator } from './covenant.ts';

export type { BridgeLine } from '../measures/bridge.ts';

/** What a test came to, in the words of the screen. */
export const OUTCOMES = [
  'met',
  'met, thin',
  'met, net cash',
  'met, no charge to cover',
  'not met',
  'not met, ratio has no meaning',
  'not met, waived',
  'cannot be tested',
  'not tested',
  'awaiting figures',
] as const;
export type Outcome = (typeof OUTCOMES)[number];

/**
 * Met, in whichever form. Only met is met.
 *
 * @example isMet('met, thin') // => true
 */
export const isMet = (outcome: Outcome): boolean => outcome.startsWith('met');
/**
 * Not met, in whichever form; a waiver does not make it met.
 *
 * @example isNotMet('not met, waived') // => true
 * @example isNotMet('cannot be tested') // => false
 */
export const isNotMet = (outcome: Outcome): boolean => outcome.startsWith('not met');

/** Every form of headroom; null where it has no meaning. Shares are fractions (0.05 is 5 %). */
export interface Headroom {
  /** Distance to the level in the measure's own unit; negative on the failing side. */
  readonly absolute: Decimal | null;
  /** `absolute` as a share of the level: the scale of the just-passing band. */
  readonly shareOfLevel: Decimal | null;
  /** The share by which earnings (or the tested amount, see `fallOf`) may fall before the test is not met. */
  readonly mayFall: Decimal | null;
  readonly fallOf: 'earnings' | 'tested amount';
  /** What may be lost in money: EBITDA - debt/level, EBITDA - level x interest, cash - minimum. */
  readonly moneyLeft: Decimal | null;
  /** By how much debt, interest or current liabilities may rise, in money and as a share. */
  readonly otherSideMayRise: Decimal | null;
  readonly otherSideShare: Decimal | null;
}

/** A test recomputed under another reading of earnings. */
export interface Counterfactual {
  readonly kind: 'without add-backs';
  readonly earningsTakenOut: Decimal;
  readonly ratio: Decimal | null;
  readonly outcome: Outcome;
  /** Share of the add-backs that the test needs to be met; null where it is met without them or not met with them. */
  readonly breakEvenShare: Decimal | null;
}

export interface CovenantTest {
  readonly covenantId: number;
  readonly measure: MeasureCode;
  readonly testDate: PlainDate;
  readonly operator: Operator;
  readonly level: Decimal | null;
  readonly nextLevel: { readonly from: PlainDate; readonly level: Decimal | null } | null;
  /** The tested ratio or amount, unrounded; null where it has no meaning or is not known. */
  readonly tested: Decimal | null;
  /** Numerator and denominator, or the tested amount with denominator null. */
  readonly numerator: Decimal | null;
  readonly denominator: Decimal | null;
  readonly outcome: Outcome;
  /** The outcome without the waiver; equals `outcome` where there is none. */
  readonly underlyingOutcome: Outcome;
  readonly reason: string | null;
  readonly headroom: Headroom;
  /** The tested result against each later level already agreed. */
  readonly againstLaterLevels: readonly {
    readonly from: PlainDate;
    readonly level: Decimal;
    readonly outcome: Outcome;
    readonly mayFall: Decimal | null;
  }[];
  readonly justPassing: boolean;
  readonly bridge: readonly BridgeLine[];
  readonly counterfactuals: readonly Counterfactual[];
  readonly inputs: readonly InputUsed[];
  readonly missing: readonly MissingLine[];
}
