/** Reads the vectors of regressions and ranks into the core's own functions. */
import { z } from 'zod';
import { jonesModel, type JonesModel } from '#core/accruals/jones.ts';
import { binaryResponse } from '#core/statistics/binaryResponse.ts';
import { leastSquares } from '#core/statistics/leastSquares.ts';
import { rankAuc } from '#core/statistics/rankAuc.ts';
import { valueOf, type Topic } from './topic.ts';

const numbers = z.array(z.number());

const JONES_NAMES: Readonly<Record<string, JonesModel>> = {
  jones_1991: 'jones-1991',
  jones_const: 'jones-constant',
  mjones_const: 'modified-constant',
  kothari: 'kothari',
  unexplained: 'with-cash-flow',
  mjones_dss1995: 'modified-1995',
};

const jones: Topic = (inputs) => {
  const given = z
    .object({
      lag_assets: numbers,
      total_accruals: numbers,
      d_revenue: numbers,
      d_receivables: numbers,
      ppe_gross: numbers,
      roa_prior: numbers,
      cfo: numbers,
    })
    .parse(inputs);
  const firms = given.lag_assets.map((lagAssets, k) => ({
    lagAssets,
    totalAccruals: given.total_accruals[k]!,
    revenueChange: given.d_revenue[k]!,
    receivablesChange: given.d_receivables[k]!,
    ppeGross: given.ppe_gross[k]!,
    priorReturnOnAssets: given.roa_prior[k]!,
    cashFromOperations: given.cfo[k]!,
  }));
  return Object.fromEntries(
    Object.entries(JONES_NAMES).map(([name, model]) => {
      const { coefficients, residuals, rSquared } = valueOf(jonesModel(model, firms));
      return [name, { coef: coefficients, r2: rSquared, residuals }];
    }),
  );
};

const regression: Topic = (inputs) => {
  const table = z.object({ columns: z.array(z.string()), rows: z.array(numbers) }).safeParse(inputs);
  if (table.success && table.data.columns.at(-1) === 'grade') return binaryFits(table.data.rows);
  const [response, columns] = regressionSample(inputs);
  const fit = valueOf(leastSquares(response, columns, { constant: true }));
  return {
    coef: fit.coefficients,
    se: fit.standardErrors,
    resid_sd: fit.residualStandardDeviation,
    r2: fit.rSquared,
  };
};

/** The response and one array per regressor, out of the ways in which the file writes a sample. */
function regressionSample(inputs: unknown): [number[], number[][]] {
  const given = z
    .union([
      z.object({ rows: z.array(numbers) }),
      z.object({ invest: numbers, value: numbers, capital: numbers }),
      z.object({ x: z.array(numbers), y: numbers }),
      z.object({ x: numbers, y: numbers }),
    ])
    .parse(inputs);
  if ('rows' in given) {
    const [response = [], ...columns] = transposed(given.rows);
    return [response, columns];
  }
  if ('invest' in given) return [given.invest, [given.value, given.capital]];
  const { x, y } = given;
  if (x.every((row) => typeof row !== 'number')) return [y, transposed(x)];
  const plain = numbers.parse(x);
  // Wampler's sets name only x: y is a polynomial of the fifth degree in it.
  return isWampler(plain)
    ? [y, [1, 2, 3, 4, 5].map((power) => plain.map((value) => value ** power))]
    : [y, [plain]];
}

const isWampler = (x: readonly number[]): boolean => x.length === 21 && x.every((value, k) => value === k);

function binaryFits(rows: readonly (readonly number[])[]): Record<string, unknown> {
  const columns = transposed(rows);
  const isYes = (columns.pop() ?? []).map((value) => value === 1);
  return {
    probit: valueOf(binaryResponse('probit', isYes, columns)).coefficients,
    logit: valueOf(binaryResponse('logit', isYes, columns)).coefficients,
  };
}

const auc: Topic = (inputs) => {
  const given = z.object({ score: numbers, label: numbers }).parse(inputs);
  return {
    auc: valueOf(
      rankAuc(
        given.score,
        given.label.map((label) => label === 1),
      ),
    ).estimate,
  };
};

/** By the names of the vector file. */
export const topics: Record<string, Topic> = { auc, jones, regression };

const transposed = (rows: readonly (readonly number[])[]): number[][] =>
  (rows[0] ?? []).map((_, column) => rows.map((row) => row[column]!));
