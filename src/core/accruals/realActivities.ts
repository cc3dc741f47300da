/**
 * Earnings managed by doing things: selling on easy terms, producing more, spending less.
 *
 *   CFO/A  = c + 1/A + S/A + dS/A                 (low: sales pulled forward)
 *   PROD/A = c + 1/A + S/A + dS/A + dS_t-1/A      (high: overproduction; cost of sales and the change of inventory)
 *   DISX/A = c + 1/A + S_t-1/A                    (low: spending cut)
 *
 * Roychowdhury (2006), Journal of Accounting and Economics 42, a constant included. In our simulation it told little
 * (methods.md B5), so it is shown and never scored.
 */
import { ok, type Result } from '../result.ts';
import type { LeastSquares } from '../statistics/leastSquares.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';
import { fitForm, type LinearForm, type Terms } from './linearForm.ts';

/** One firm's amounts over twelve months, one unit. */
export interface RealActivitiesFirm {
  readonly lagAssets: number;
  readonly sales: number;
  readonly salesChange: number;
  readonly salesChangePrior: number;
  readonly cashFromOperations: number;
  readonly productionCosts: number;
  readonly discretionaryExpenses: number;
}

export type RealActivityTerm =
  | 'reciprocalAssets'
  | 'sales'
  | 'salesChange'
  | 'salesChangePrior'
  | 'salesPrior'
  | 'cashFlow'
  | 'production'
  | 'discretionary';

export const REAL_ACTIVITY_FORMS = {
  cashFlow: {
    response: 'cashFlow',
    regressors: ['reciprocalAssets', 'sales', 'salesChange'],
    constant: true,
  },
  production: {
    response: 'production',
    regressors: ['reciprocalAssets', 'sales', 'salesChange', 'salesChangePrior'],
    constant: true,
  },
  discretionary: {
    response: 'discretionary',
    regressors: ['reciprocalAssets', 'salesPrior'],
    constant: true,
  },
} as const satisfies Record<string, LinearForm<RealActivityTerm>>;
export type RealActivityModel = keyof typeof REAL_ACTIVITY_FORMS;

export type RealActivities = Readonly<Record<RealActivityModel, LeastSquares>>;

/**
 * The terms of one firm, over last year's assets, which have to be positive.
 *
 * @example realActivityTerms({ lagAssets: 50, sales: 60, salesChange: 10, salesChangePrior: 5, cashFromOperations: 4, productionCosts: 40, discretionaryExpenses: 8 }).salesPrior // => 1
 */
export function realActivityTerms(firm: RealActivitiesFirm): Terms<RealActivityTerm> {
  const over = (value: number): number => value / firm.lagAssets;
  return {
    reciprocalAssets: over(1),
    sales: over(firm.sales),
    salesChange: over(firm.salesChange),
    salesChangePrior: over(firm.salesChangePrior),
    salesPrior: over(firm.sales - firm.salesChange),
    cashFlow: over(firm.cashFromOperations),
    production: over(firm.productionCosts),
    discretionary: over(firm.discretionaryExpenses),
  };
}

/**
 * One number out of the three: less cash than sales explain, more production, less discretionary spending.
 *
 * @example aggregateRealActivities({ cashFlow: -0.02, production: 0.03, discretionary: -0.01 }) // => 0.06
 */
export const aggregateRealActivities = (abnormal: Readonly<Record<RealActivityModel, number>>): number =>
  -abnormal.cashFlow + abnormal.production - abnormal.discretionary;

/**
 * The three models on one cross-section; residuals are shares of last year's assets. Errors: those of leastSquares.
 *
 * @example realActivities([]).ok // => false
 */
export function realActivities(
  firms: readonly RealActivitiesFirm[],
): Result<RealActivities, StatisticsError> {
  const rows = firms.map(realActivityTerms);
  const cashFlow = fitForm(REAL_ACTIVITY_FORMS.cashFlow, rows);
  if (!cashFlow.ok) return cashFlow;
  const production = fitForm(REAL_ACTIVITY_FORMS.production, rows);
  if (!production.ok) return production;
  const discretionary = fitForm(REAL_ACTIVITY_FORMS.discretionary, rows);
  if (!discretionary.ok) return discretionary;
  return ok({ cashFlow: cashFlow.value, production: production.value, discretionary: discretionary.value });
}
