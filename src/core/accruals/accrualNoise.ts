/**
 * How loosely a firm's working-capital accruals follow its cash of the quarter before, the same and the next:
 *
 *   dWC_t = b0 + b1 CFO_t-1 + b2 CFO_t + b3 CFO_t+1 (+ b4 dREV_t + b5 PPE_t) + e
 *
 * Dechow & Dichev (2002), The Accounting Review 77 (supplement); the two terms in brackets are McNichols (2002). It
 * measures noise and cannot tell management from a volatile business; the lead makes it one period late.
 */
import { err, ok, type Result } from '../result.ts';
import { leastSquares } from '../statistics/leastSquares.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';

/** Usable quarters below which nothing is said (methods.md B2). */
const FEWEST_QUARTERS = 12;

/** One value per quarter, oldest first, scaled by average assets. */
export interface NoiseSeries {
  readonly cashFlow: readonly number[];
  readonly workingCapitalChange: readonly number[];
  /** Both or neither. */
  readonly controls?: { readonly revenueChange: readonly number[]; readonly ppe: readonly number[] };
}

export interface AccrualNoise {
  readonly coefficients: readonly number[];
  /** Over the degrees of freedom: the one the score uses. */
  readonly residualStandardDeviation: number;
  /** Over the number of quarters, as the paper has it. */
  readonly residualSpread: number;
  readonly n: number;
}

/**
 * The standard deviation of what cash does not explain. Errors: those of leastSquares, and `too-few-points` below
 * twelve quarters with a quarter before and after.
 *
 * @example accrualNoise({ cashFlow: [1, 2], workingCapitalChange: [1, 2] }) // => { ok: false, error: { kind: 'too-few-points', needed: 12, given: 0 } }
 */
export function accrualNoise(series: NoiseSeries): Result<AccrualNoise, StatisticsError> {
  const { cashFlow, workingCapitalChange, controls } = series;
  const usable = workingCapitalChange.length - 2;
  if (usable < FEWEST_QUARTERS) {
    return err({ kind: 'too-few-points', needed: FEWEST_QUARTERS, given: Math.max(0, usable) });
  }
  const within = (values: readonly number[]): readonly number[] => values.slice(1, -1);
  const fit = leastSquares(
    within(workingCapitalChange),
    [
      cashFlow.slice(0, -2),
      within(cashFlow),
      cashFlow.slice(2),
      ...(controls ? [within(controls.revenueChange), within(controls.ppe)] : []),
    ],
    { constant: true },
  );
  if (!fit.ok) return fit;
  const { coefficients, residualStandardDeviation, degreesOfFreedom, n } = fit.value;
  return ok({
    coefficients,
    residualStandardDeviation,
    residualSpread: residualStandardDeviation * Math.sqrt(degreesOfFreedom / n),
    n,
  });
}
