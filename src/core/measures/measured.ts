import { ZERO, type Decimal } from '../money/decimal.ts';
import type { Reading } from '../statements/reading.ts';
import type { BridgeLine } from './bridge.ts';
import type { MeasureRequest } from './definition.ts';
import type { MeasureCode, MeasureUnit } from './measure.ts';

/**
 * How the two sides of a measure stand to each other, which decides what is undefined and what headroom means:
 * a burden over what carries it (at most), what covers over a charge (at least), or one amount.
 */
export type MeasureShape = 'burden' | 'cover' | 'amount';

/** Which side the borrower's earnings stand on, if any. */
export type EarningsSide = 'numerator' | 'denominator' | null;

/**
 * What a test comes to where nothing is carried or covered: net cash, plainly met, or a question to the agreement
 * unless what covers is positive. Null for an amount. Source: methods.md A4.
 */
export type WithoutCharge = 'net cash' | 'met' | 'the agreement decides' | null;

/** Words of one measure, as they stand in sentences. */
export interface MeasureWords {
  /** The amount that headroom is told of: 'EBITDA', 'Liquidity'. */
  readonly subject: string;
  /** What stands on the other side: 'debt', 'interest'; null for an amount. */
  readonly otherSide: string | null;
  /** What carries a burden: 'earnings', 'net worth'. */
  readonly carrier: string;
  /** What is covered: 'charge', 'current liabilities'. */
  readonly charge: string;
  /** What the amount that headroom is told of may do, and what it is where it has done more; else 'may fall', 'short'. */
  readonly room?: { readonly may: 'may rise'; readonly past: 'over' };
}

export interface Measured {
  readonly numerator: Reading;
  /** null for an amount. */
  readonly denominator: Reading | null;
  /** The adjusted EBITDA that one side is or holds; null in a test without earnings. */
  readonly earnings: Reading | null;
  /** Add-backs that the earnings side holds. */
  readonly addBacksTaken: Decimal;
  readonly bridge: readonly BridgeLine[];
  /** What has to be said beside the result: annualised, translated. */
  readonly remarks: readonly string[];
}

/** Of a measure that rests on no earnings. */
export const WITHOUT_EARNINGS: Pick<Measured, 'earnings' | 'addBacksTaken' | 'remarks'> = {
  earnings: null,
  addBacksTaken: ZERO,
  remarks: [],
};

export interface Measure {
  readonly code: MeasureCode;
  readonly label: string;
  readonly unit: MeasureUnit;
  readonly shape: MeasureShape;
  readonly earningsSide: EarningsSide;
  readonly withoutCharge: WithoutCharge;
  readonly words: MeasureWords;
  readonly measure: (request: MeasureRequest) => Measured;
}
