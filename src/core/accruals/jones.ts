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
import { ok, type Result } from '../result.ts';
import type { LeastSquares } from '../statistics/leastSquares.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';
import { fitForm, formResidual, type LinearForm, type Terms } from './linearForm.ts';

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

/** Over last year's assets, but for the reciprocal of those and the return, which is a share already. */
export type JonesTerm =
  | 'accruals'
  | 'reciprocalAssets'
  | 'revenueChange'
  | 'cashRevenueChange'
  | 'ppe'
  | 'priorReturnOnAssets'
  | 'cashFlow';

const PLAIN = { response: 'accruals', regressors: ['reciprocalAssets', 'revenueChange', 'ppe'] } as const;
const CASH_REVENUE = ['reciprocalAssets', 'cashRevenueChange', 'ppe'] as const;

export const JONES_FORMS = {
  'jones-1991': { ...PLAIN, constant: false },
  'jones-constant': { ...PLAIN, constant: true },
  'modified-constant': { ...PLAIN, regressors: CASH_REVENUE, constant: true },
  kothari: { ...PLAIN, regressors: [...CASH_REVENUE, 'priorReturnOnAssets'], constant: true },
  'with-cash-flow': { ...PLAIN, regressors: [...PLAIN.regressors, 'cashFlow'], constant: true },
  'modified-1995': { ...PLAIN, predictors: CASH_REVENUE, constant: false },
} as const satisfies Record<string, LinearForm<JonesTerm>>;
export type JonesModel = keyof typeof JONES_FORMS;
export const JONES_MODELS = Object.keys(JONES_FORMS) as readonly JonesModel[];

type JonesFit = Pick<LeastSquares, 'coefficients' | 'residuals' | 'rSquared' | 'n'>;

/**
 * The terms of one firm. Lagged assets have to be positive: the caller leaves out a firm that has none.
 *
 * @example jonesTerms({ lagAssets: 50, totalAccruals: 2, revenueChange: 5, receivablesChange: 1, ppeGross: 30, priorReturnOnAssets: 0.04, cashFromOperations: 6 }).cashRevenueChange // => 0.08
 */
export const jonesTerms = (firm: JonesFirm): Terms<JonesTerm> => ({
  accruals: firm.totalAccruals / firm.lagAssets,
  reciprocalAssets: 1 / firm.lagAssets,
  revenueChange: firm.revenueChange / firm.lagAssets,
  cashRevenueChange: (firm.revenueChange - firm.receivablesChange) / firm.lagAssets,
  ppe: firm.ppeGross / firm.lagAssets,
  priorReturnOnAssets: firm.priorReturnOnAssets,
  cashFlow: firm.cashFromOperations / firm.lagAssets,
});

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
  const form: LinearForm<JonesTerm> = JONES_FORMS[model];
  const rows = firms.map(jonesTerms);
  const fit = fitForm(form, rows);
  if (!fit.ok || form.predictors === undefined) return fit;
  const { coefficients } = fit.value;
  return ok({
    coefficients,
    residuals: rows.map((row) => formResidual(form, coefficients, row.accruals, row)),
    rSquared: null,
    n: firms.length,
  });
}
