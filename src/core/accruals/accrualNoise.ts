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

/** One value per quarter, oldest first, scaled by average assets; null where a quarter's figure is missing. */
export type QuarterSeries = readonly (number | null)[];

export interface NoiseSeries {
  readonly cashFlow: QuarterSeries;
  readonly workingCapitalChange: QuarterSeries;
  /** Both or neither. */
  readonly controls?: { readonly revenueChange: QuarterSeries; readonly ppe: QuarterSeries };
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
 * The standard deviation of what cash does not explain. A quarter is usable with every term of its own and the cash of
 * the quarter before and after; a gap costs its neighbours too. Errors: those of leastSquares, and `too-few-points`
 * below twelve usable quarters.
 *
 * @example accrualNoise({ cashFlow: [1, 2], workingCapitalChange: [1, 2] }) // => { ok: false, error: { kind: 'too-few-points', needed: 12, given: 0 } }
 */
export function accrualNoise(series: NoiseSeries): Result<AccrualNoise, StatisticsError> {
  const rows = usableQuarters(series);
  if (rows.length < FEWEST_QUARTERS)
    return err({ kind: 'too-few-points', needed: FEWEST_QUARTERS, given: rows.length });
  const column = (place: number): number[] => rows.map((row) => row[place]!);
  const fit = leastSquares(
    column(0),
    rows[0]!.slice(1).map((_, term) => column(term + 1)),
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

/** The change, then the regressors, of each quarter that has them all. */
function usableQuarters({ cashFlow, workingCapitalChange, controls }: NoiseSeries): number[][] {
  return workingCapitalChange.flatMap((change, quarter) => {
    const row = [
      change,
      cashFlow[quarter - 1],
      cashFlow[quarter],
      cashFlow[quarter + 1],
      ...(controls ? [controls.revenueChange[quarter], controls.ppe[quarter]] : []),
    ];
    return row.every((term) => typeof term === 'number') ? [row] : [];
  });
}
