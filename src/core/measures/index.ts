/** The register. To add a measure: one file, one line here, one code in measure.ts, one worked example as a test. */
import { currentRatio } from './currentRatio.ts';
import { interestCover } from './interestCover.ts';
import type { MeasureCode, MeasureUnit } from './measure.ts';
import type { Measure } from './measured.ts';
import { minimumLiquidity } from './minimumLiquidity.ts';
import { netLeverage } from './netLeverage.ts';
import { totalLeverage } from './totalLeverage.ts';

export const MEASURES: Readonly<Record<MeasureCode, Measure>> = {
  'total-leverage': totalLeverage,
  'net-leverage': netLeverage,
  'interest-cover': interestCover,
  'current-ratio': currentRatio,
  'minimum-liquidity': minimumLiquidity,
};

/**
 * Whether a measure comes in times or in money.
 *
 * @example measureUnit('minimum-liquidity') // => 'money'
 */
export const measureUnit = (code: MeasureCode): MeasureUnit => MEASURES[code].unit;
