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
  /** Days before a waiver or a cure period ends. */
  readonly runningOut: { readonly soonDays: number; readonly urgentDays: number };
  readonly restatedBy: Decimal;
  readonly qualityFell: { readonly points: number };
  readonly qualityWeakBelow: number;
  readonly outlook: OutlookPolicy;
}

/** What the sensitivity of a borrower assumes, and the sizes of the two named scenarios. Shares of one. */
export interface OutlookPolicy {
  /** Share of every unit of sales that goes with it in variable cost. */
  readonly variableCostShare: Decimal;
  /** Share of the debt on the balance sheet whose interest moves with rates. */
  readonly floatingDebtShare: Decimal;
  readonly slowerSales: ScenarioSizes;
  readonly dearerMoney: ScenarioSizes;
}

export interface ScenarioSizes {
  readonly salesFall: Decimal;
  /** Share of receivables and stocks that does not turn into cash. */
  readonly workingCapitalLoss: Decimal;
  /** Of floating debt, a year. */
  readonly rateRise: Decimal;
}

export const POLICY_VERSION_1: Policy = {
  version: 1,
  justPassingBand: decimal('0.02'),
  thinBelow: decimal('0.10'),
  repeated: { atLeast: 3, ofLast: 6, weakBelow: 45 },
  stepDown: { soonDays: 90, noteDays: 180 },
  runningOut: { soonDays: 30, urgentDays: 10 },
  restatedBy: decimal('0.02'),
  qualityFell: { points: 10 },
  qualityWeakBelow: 30,
  outlook: {
    variableCostShare: decimal('0.65'),
    floatingDebtShare: decimal(1),
    slowerSales: {
      salesFall: decimal('0.10'),
      workingCapitalLoss: decimal('0.05'),
      rateRise: decimal(0),
    },
    dearerMoney: {
      salesFall: decimal('0.03'),
      workingCapitalLoss: decimal(0),
      rateRise: decimal('0.02'),
    },
  },
};

/** Raised with every change of a formula, so that an old result says what computed it. */
export const METHOD_VERSION = '2.0';
