import type { PlainDate } from '../calendar/plainDate.ts';
import type { Decimal } from '../money/decimal.ts';
import type { AddBack, MeasureDefinition } from '../measures/definition.ts';
import type { MeasureCode } from '../measures/measure.ts';
import type { StatementScope } from '../statements/statement.ts';

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
}

/** A lender's decision to give up one failed test. The failure stays underneath. */
export interface Waiver {
  readonly testDate: PlainDate;
  readonly grantedOn: PlainDate;
  readonly until: PlainDate | null;
  readonly conditions: string;
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
  readonly currency: string;
  readonly firstTestOn: PlainDate;
  /** 3, 6 or 12. */
  readonly everyMonths: number;
  readonly definition: MeasureDefinition;
  /** In date order, without gaps that are meant as holidays: a day outside every row has no level in force. */
  readonly levels: readonly CovenantLevel[];
  readonly addBacks: readonly AddBack[];
  readonly waivers: readonly Waiver[];
}
