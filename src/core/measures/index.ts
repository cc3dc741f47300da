/** The register. To add a measure: one file, one line here, one code in measure.ts, one worked example as a test. */
import { capitalExpenditure } from './capitalExpenditure.ts';
import { currentRatio } from './currentRatio.ts';
import { debtServiceCover } from './debtServiceCover.ts';
import { debtYield } from './debtYield.ts';
import { fixedChargeCover } from './fixedChargeCover.ts';
import { gearing } from './gearing.ts';
import { interestCover } from './interestCover.ts';
import { loanToValue } from './loanToValue.ts';
import type { MeasureCode, MeasureUnit } from './measure.ts';
import type { Measure } from './measured.ts';
import { minimumEbitda } from './minimumEbitda.ts';
import { minimumLiquidity } from './minimumLiquidity.ts';
import { netLeverage } from './netLeverage.ts';
import { quickRatio } from './quickRatio.ts';
import { seniorLeverage } from './seniorLeverage.ts';
import { tangibleNetWorth } from './tangibleNetWorth.ts';
import { totalLeverage } from './totalLeverage.ts';

export const MEASURES: Readonly<Record<MeasureCode, Measure>> = {
  'total-leverage': totalLeverage,
  'senior-leverage': seniorLeverage,
  'net-leverage': netLeverage,
  'interest-cover': interestCover,
  'debt-service-cover': debtServiceCover,
  'fixed-charge-cover': fixedChargeCover,
  'loan-to-value': loanToValue,
  'debt-yield': debtYield,
  'current-ratio': currentRatio,
  'quick-ratio': quickRatio,
  'tangible-net-worth': tangibleNetWorth,
  gearing,
  'minimum-liquidity': minimumLiquidity,
  'minimum-ebitda': minimumEbitda,
  'capital-expenditure': capitalExpenditure,
};

/**
 * Whether a measure comes in times, as a share or in money.
 *
 * @example measureUnit('minimum-liquidity') // => 'money'
 */
export const measureUnit = (code: MeasureCode): MeasureUnit => MEASURES[code].unit;
