import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { AddBack, MeasureDefinition } from '../measures/definition.ts';
import type { MeasureCode } from '../measures/measure.ts';
import type { StatementBasis, StatementScope } from '../statements/statement.ts';

export type { AddBack } from '../measures/definition.ts';

export const OPERATORS = ['<=', '<', '>=', '>'] as const;
export type Operator = (typeof OPERATORS)[number];

/**
 * Whether an operator makes the level the most that is allowed.
 *
 * @example isMaximum('<=') // => true
 */
export const isMaximum = (operator: Operator): boolean => operator === '<=' || operator === '<';

/** One row of the level schedule. `until` is inclusive; null is without end. A null level is a covenant holiday. */
export interface CovenantLevel {
  readonly from: PlainDate;
  readonly until: PlainDate | null;
  readonly level: Decimal | null;
  /** Agreed after signing: a reset. The first test under it is no evidence of anything. */
  readonly isReset: boolean;
}

/** A lender's decision to give up one failed test. The failure stays underneath. */
export interface Waiver {
  readonly testDate: PlainDate;
  readonly grantedOn: PlainDate;
  readonly until: PlainDate | null;
  readonly conditions: string;
}

/** Drawings above this share of commitments on the test date call a springing covenant up. */
export interface Springing {
  readonly trigger: Decimal;
}

/** What the agreement allows owners to put right with money: methods.md A6. */
export interface CureRights {
  readonly method: 'ebitda' | 'debt' | 'both';
  /** Business days after the certificate is due. */
  readonly withinBusinessDays: number;
  readonly mostInFour: number;
  readonly mostInLife: number;
  /** Meeting the next test cures the failure before it. */
  readonly curedByNextTest: boolean;
}

/** Money that came in to cure the test of a quarter end. */
export interface EquityCure {
  readonly quarterEnd: PlainDate;
  readonly method: 'ebitda' | 'debt' | 'both';
  readonly amount: Decimal;
  readonly receivedOn: PlainDate;
}

export interface Covenant {
  readonly id: number;
  readonly facilityId: number;
  readonly name: string;
  readonly clause: string;
  readonly measure: MeasureCode;
  readonly operator: Operator;
  /** Decimal places that the agreement rounds the ratio to before comparing; null compares unrounded. */
  readonly roundingPlaces: number | null;
  readonly scope: StatementScope;
  /** What kind of accounts it is tested on; null is any. */
  readonly basis: StatementBasis | null;
  /** The desk's own trigger, not in the agreement: marked as ours wherever it is shown. */
  readonly isOurs: boolean;
  readonly currency: string;
  readonly firstTestOn: PlainDate;
  /** 3, 6 or 12. */
  readonly everyMonths: number;
  readonly definition: MeasureDefinition;
  /** In date order, without gaps that are meant as holidays: a day outside every row has no level in force. */
  readonly levels: readonly CovenantLevel[];
  readonly addBacks: readonly AddBack[];
  readonly waivers: readonly Waiver[];
  readonly springing: Springing | null;
  readonly cureRights: CureRights | null;
  readonly cures: readonly EquityCure[];
}
