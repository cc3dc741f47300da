/**
 * The desk's own settings: levels at which alerts are raised, bands, weights. Version 1 is desk practice, no
 * source; a later version is proposed by one person and confirmed by another.
 */
import { decimal, type Decimal } from './money/decimal.ts';

export interface Policy {
  readonly version: number;
  /** Share of the level on the passing side that counts as just passing. */
  readonly justPassingBand: Decimal;
  readonly thinBelow: Decimal;
  readonly repeated: { readonly atLeast: number; readonly ofLast: number; readonly weakBelow: number };
  readonly stepDown: { readonly soonDays: number; readonly noteDays: number };
  readonly restatedBy: Decimal;
  readonly qualityFell: { readonly points: number };
  readonly qualityWeakBelow: number;
}

export const POLICY_VERSION_1: Policy = {
  version: 1,
  justPassingBand: decimal('0.02'),
  thinBelow: decimal('0.10'),
  repeated: { atLeast: 3, ofLast: 6, weakBelow: 45 },
  stepDown: { soonDays: 90, noteDays: 180 },
  restatedBy: decimal('0.02'),
  qualityFell: { points: 10 },
  qualityWeakBelow: 30,
};

/** Raised with every change of a formula, so that an old result says what computed it. */
export const METHOD_VERSION = '1.0';
