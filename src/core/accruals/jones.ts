/**
 * The Jones family: total accruals that revenue and property, plant and equipment do not explain.
 *
 *   TA/A = c + a1 (1/A) + a2 (dREV/A) + a3 (PPE/A) + e,   A = assets a year before
 *
 * Jones (1991) has no constant c; Kothari, Leone & Wasley (2005) add one and last year's return on assets. In the
 * modified model (Dechow, Sloan & Sweeney 1995) receivables are taken out of the revenue change: in the original
 * only when the residual is taken, by many users of cross-sections in both steps.
 *
 * What it cannot show: growth and unusual performance leave residuals too, and a residual is not evidence of intent.
 */
import { err, ok, type Result } from '../result.ts';
import { leastSquares, type LeastSquares } from '../statistics/leastSquares.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';

/** One firm's amounts over twelve months, all in one unit. */
export interface JonesFirm {
  readonly lagAssets: number;
  readonly totalAccruals: number;
  readonly revenueChange: number;
  readonly receivablesChange: number;
  readonly ppeGross: number;
  readonly priorReturnOnAssets: number;
  readonly cashFromOperations: number;
}

export const JONES_MODELS = [
  'jones-1991',
  'jones-constant',
  'modified-constant',
  'kothari',
  'with-cash-flow',
  'modified-1995',
] as const;
export type JonesModel = (typeof JONES_MODELS)[number];

type JonesFit = Pick<LeastSquares, 'coefficients' | 'residuals' | 'rSquared' | 'n'>;

/**
 * One of the family fitted on a cross-section of firms. Residuals are shares of last year's assets.
 *
 * Errors: those of leastSquares; a firm whose lagged assets are not positive has to be left out by the caller.
 *
 * @example jonesModel('jones-1991', []).ok // => false
 */
export function jonesModel(
  model: JonesModel,
  firms: readonly JonesFirm[],
): Result<JonesFit, StatisticsError> {
  const revenue = firms.map((firm) => firm.revenueChange / firm.lagAssets);
  const cashRevenue = firms.map((firm) => (firm.revenueChange - firm.receivablesChange) / firm.lagAssets);
  const scale = firms.map((firm) => 1 / firm.lagAssets);
  const ppe = firms.map((firm) => firm.ppeGross / firm.lagAssets);
  const accruals = firms.map((firm) => firm.totalAccruals / firm.lagAssets);
  const fit = (constant: boolean, ...columns: number[][]) => leastSquares(accruals, columns, { constant });
  switch (model) {
    case 'jones-1991':
      return fit(false, scale, revenue, ppe);
    case 'jones-constant':
      return fit(true, scale, revenue, ppe);
    case 'modified-constant':
      return fit(true, scale, cashRevenue, ppe);
    case 'kothari':
      return fit(
        true,
        scale,
        cashRevenue,
        ppe,
        firms.map((firm) => firm.priorReturnOnAssets),
      );
    case 'with-cash-flow':
      return fit(
        true,
        scale,
        revenue,
        ppe,
        firms.map((firm) => firm.cashFromOperations / firm.lagAssets),
      );
    case 'modified-1995': {
      const fitted = fit(false, scale, revenue, ppe);
      if (!fitted.ok) return err(fitted.error);
      const [onScale, onRevenue, onPpe] = fitted.value.coefficients as [number, number, number];
      const residuals = accruals.map(
        (value, k) => value - onScale * scale[k]! - onRevenue * cashRevenue[k]! - onPpe * ppe[k]!,
      );
      return ok({ coefficients: fitted.value.coefficients, residuals, rSquared: null, n: firms.length });
    }
  }
}
