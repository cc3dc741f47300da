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
import { leastSquares, type LeastSquares } from '../statistics/leastSquares.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';

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

export interface RealActivities {
  readonly cashFlow: LeastSquares;
  readonly production: LeastSquares;
  readonly discretionary: LeastSquares;
}

/**
 * The three models on one cross-section; residuals are shares of last year's assets. Errors: those of leastSquares.
 *
 * @example realActivities([]).ok // => false
 */
export function realActivities(
  firms: readonly RealActivitiesFirm[],
): Result<RealActivities, StatisticsError> {
  const scaled = (read: (firm: RealActivitiesFirm) => number): number[] =>
    firms.map((firm) => read(firm) / firm.lagAssets);
  const scale = scaled(() => 1);
  const sales = scaled((firm) => firm.sales);
  const change = scaled((firm) => firm.salesChange);
  const fit = (response: readonly number[], ...columns: readonly number[][]) =>
    leastSquares(response, [scale, ...columns], { constant: true });

  const cashFlow = fit(
    scaled((firm) => firm.cashFromOperations),
    sales,
    change,
  );
  if (!cashFlow.ok) return cashFlow;
  const production = fit(
    scaled((firm) => firm.productionCosts),
    sales,
    change,
    scaled((firm) => firm.salesChangePrior),
  );
  if (!production.ok) return production;
  const discretionary = fit(
    scaled((firm) => firm.discretionaryExpenses),
    scaled((firm) => firm.sales - firm.salesChange),
  );
  if (!discretionary.ok) return discretionary;
  return ok({
    cashFlow: cashFlow.value,
    production: production.value,
    discretionary: discretionary.value,
  });
}
