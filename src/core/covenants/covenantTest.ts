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
  'not met, in cure period',
  'cured',
  'above our trigger',
  'below our trigger',
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

/**
 * Whether the result stands on the wrong side of the desk's own trigger, which is no covenant and so never not met.
 *
 * @example isPastOurTrigger('above our trigger') // => true
 */
export const isPastOurTrigger = (outcome: Outcome): boolean =>
  outcome === 'above our trigger' || outcome === 'below our trigger';

/**
 * Whether the borrower's own figures miss the level, whatever stands over it: a waiver, money put in, our own
 * trigger.
 *
 * @example isShort('cured') // => true
 */
export const isShort = (outcome: Outcome): boolean =>
  isNotMet(outcome) || outcome === 'cured' || isPastOurTrigger(outcome);

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

export const COUNTERFACTUAL_KINDS = [
  'without add-backs',
  'without unexplained accruals',
  'without either',
  'on a cash basis',
] as const;
export type CounterfactualKind = (typeof COUNTERFACTUAL_KINDS)[number];

/** A test recomputed under another reading of earnings: methods.md B7 (a) to (d), in the order of the kinds. */
export interface Counterfactual {
  readonly kind: CounterfactualKind;
  readonly earningsTakenOut: Decimal;
  readonly ratio: Decimal | null;
  readonly outcome: Outcome;
  /** Share of the add-backs that the test needs to be met; null where it is met without them or not met with them. */
  readonly breakEvenShare: Decimal | null;
}

/** Drawings against commitments on the test date, where the covenant is tested only above a share of them. */
export interface SpringingStanding {
  readonly drawn: Decimal;
  readonly commitment: Decimal;
  /** A fraction; null where there is no commitment. */
  readonly utilisation: Decimal | null;
  readonly trigger: Decimal;
}

/** Money put in, or that may be put in, for a test that the borrower's own figures do not meet: methods.md A6. */
export interface CureStanding {
  readonly curedBy: 'money' | 'money of an earlier quarter' | 'the next test' | null;
  /** How the agreement counts the money; null where it gives no right of cure. */
  readonly method: 'ebitda' | 'debt' | 'both' | null;
  /** The last day on which money may come in; null where it cannot be told. */
  readonly periodEnds: PlainDate | null;
  /** What it takes to land on the level; null for a way that cannot reach it. */
  readonly needed: {
    readonly ebitda: Decimal | null;
    readonly debt: Decimal | null;
    readonly both: Decimal | null;
  };
  readonly received: Decimal | null;
  readonly receivedOn: PlainDate | null;
  /** The part of it that counts: never more than is needed. */
  readonly counted: Decimal | null;
  /** EBITDA of earlier cures that still counts on this date. */
  readonly carried: Decimal;
  /** The last test date on which money counted as EBITDA counts. */
  readonly countsUntil: PlainDate | null;
  /** The ratio with the money; for covenant purposes only. */
  readonly ratioWith: Decimal | null;
  /** This one included, where the money cured. Limits are null where the agreement gives no right. */
  readonly usedInFour: number;
  readonly mostInFour: number | null;
  readonly usedInLife: number;
  readonly mostInLife: number | null;
}

export interface WaiverStanding {
  readonly grantedOn: PlainDate;
  readonly until: PlainDate | null;
  readonly conditions: string;
}

/** The same test by other accounting rules: shown beside, decides nothing. */
export interface OtherAccounting {
  readonly accounting: 'current' | 'frozen';
  readonly numerator: Decimal;
  readonly denominator: Decimal | null;
  readonly tested: Decimal | null;
  readonly outcome: Outcome;
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
  /** What the borrower's own figures come to, without waiver, cure money or trigger words. */
  readonly underlyingOutcome: Outcome;
  readonly reason: string | null;
  readonly headroom: Headroom;
  /** The tested result against each later level already agreed. */
  readonly againstLaterLevels: readonly {
    readonly from: PlainDate;
    readonly level: Decimal;
    readonly outcome: Outcome;
    readonly mayFall: Decimal | null;
    readonly shareOfLevel: Decimal | null;
    readonly moneyLeft: Decimal | null;
    readonly otherSideMayRise: Decimal | null;
  }[];
  readonly justPassing: boolean;
  /** The money that earnings may fall over the standard deviation of their last eight quarterly changes. */
  readonly roomInDeviations: Decimal | null;
  readonly springing: SpringingStanding | null;
  /** The waiver that stands on the day. */
  readonly waiver: WaiverStanding | null;
  readonly cure: CureStanding | null;
  /** The first test under a level agreed after signing. */
  readonly isFirstUnderReset: boolean;
  readonly bridge: readonly BridgeLine[];
  /** Adjusted EBITDA that one side is or holds, as the covenant defines it; null in a test without earnings. */
  readonly earnings: Decimal | null;
  /** By today's accounting, leases in debt, where the covenant goes by the rules at signing; else null. */
  readonly otherAccounting: OtherAccounting | null;
  readonly counterfactuals: readonly Counterfactual[];
  readonly inputs: readonly InputUsed[];
  readonly missing: readonly MissingLine[];
}
