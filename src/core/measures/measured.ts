import type { Decimal } from '../money/decimal.ts';
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
}

export interface Measured {
  readonly numerator: Reading;
  /** null for an amount. */
  readonly denominator: Reading | null;
  /** Add-backs that the earnings side holds. */
  readonly addBacksTaken: Decimal;
  readonly bridge: readonly BridgeLine[];
}

export interface Measure {
  readonly code: MeasureCode;
  readonly label: string;
  readonly unit: MeasureUnit;
  readonly shape: MeasureShape;
  readonly earningsSide: EarningsSide;
  readonly words: MeasureWords;
  readonly measure: (request: MeasureRequest) => Measured;
}
