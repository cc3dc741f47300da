/** Measures of one borrower over many quarters: methods.md B1 items 5 and 9. */
import { accrualNoise } from '../accruals/accrualNoise.ts';
import { smoothing } from '../accruals/smoothing.ts';
import { monthsBefore } from '../calendar/fiscalYear.ts';
import type { Statement } from '../statements/statement.ts';
import { accountsAt, ifAll, YEAR_AGO } from './accountsAt.ts';
import { mixesPresentations } from './cashFlowPresentation.ts';
import { noiseSeriesOf } from './noiseSeries.ts';
import type { PublishedContext } from './publishedContext.ts';
import type { Given, Measures } from './publishedMeasure.ts';
import { QUALITY_TABLE } from './qualityTable.ts';

/** Own rule: quarter ends below which nothing is described. */
const FEWEST_QUARTER_ENDS = 8;

/**
 * Accrual noise, plain and with controls, and smoothing.
 *
 * @example 'missing' in seriesMeasures({ book, quarterEnd: '2026-09-30' }).mcnichols // => true
 */
export function seriesMeasures(context: Pick<PublishedContext, 'book' | 'quarterEnd'>): Measures {
  const series = noiseSeriesOf(context.book)(context.quarterEnd);
  const { cashFlow, workingCapitalChange } = series;
  return {
    'dechow-dichev': noiseOf({ cashFlow, workingCapitalChange }),
    mcnichols: noiseOf(series),
    ...smoothingMeasures(context),
  };
}

function noiseOf(series: Parameters<typeof accrualNoise>[0]): Given {
  const noise = accrualNoise(series);
  if (noise.ok)
    return {
      value: noise.value.residualStandardDeviation,
      remarks: [`over ${noise.value.n} quarters, each against the same quarter a year before`],
    };
  return { missing: noNoise(noise.error) };
}

/**
 * Why noise cannot be given.
 *
 * @example noNoise({ kind: 'too-few-points', needed: 12, given: 10 }) // => '10 usable quarters, 12 are needed'
 */
export const noNoise = (error: Extract<ReturnType<typeof accrualNoise>, { ok: false }>['error']): string =>
  error.kind === 'too-few-points'
    ? `${error.given} usable quarters, ${error.needed} are needed`
    : 'the quarters hardly differ, so nothing can be fitted';

/** Twelve months at each quarter end over assets a year before: seasons cancel, and growth does not count as spread. */
function smoothingMeasures({ book, quarterEnd }: Pick<PublishedContext, 'book' | 'quarterEnd'>): Measures {
  const used: Statement[] = [];
  const points = Array.from({ length: QUALITY_TABLE.noiseQuarters }, (_, k) =>
    monthsBefore(quarterEnd, 3 * (QUALITY_TABLE.noiseQuarters - 1 - k)),
  ).flatMap((date) => {
    const accounts = accountsAt(book, date);
    const assets = accounts.balance('total_assets', YEAR_AGO);
    const point = {
      income: ifAll({ ebit: accounts.twelveMonths('ebit'), assets }, (sums) => sums.ebit / sums.assets),
      cash: ifAll({ cfo: accounts.twelveMonths('cfo'), assets }, (sums) => sums.cfo / sums.assets),
    };
    const statements = accounts.used();
    if (point.income === undefined || point.cash === undefined || assets === undefined || assets <= 0)
      return [];
    if (statements.some(({ tie }) => tie === 'does-not-tie')) return [];
    used.push(...statements);
    return [{ income: point.income, cash: point.cash }];
  });
  const smooth =
    points.length < FEWEST_QUARTER_ENDS || mixesPresentations(used)
      ? null
      : smoothing(
          points.map(({ income }) => income),
          points.map(({ cash }) => cash),
        );
  if (!smooth?.ok) {
    const missing = mixesPresentations(used)
      ? 'the presentation of cash flows changed within the quarters looked at'
      : smooth
        ? 'cash from operations hardly moves'
        : `${points.length} quarter ends with operating profit and cash from operations, ${FEWEST_QUARTER_ENDS} are needed`;
    return {
      'smoothing-spread': { missing },
      'smoothing-correlation': { missing },
      'smoothing-size': { missing },
    };
  }
  const remarks = [`over ${smooth.value.n} quarter ends, twelve months each`];
  return {
    'smoothing-spread': { value: smooth.value.spreadRatio, remarks },
    'smoothing-correlation': { value: smooth.value.changeCorrelation, remarks },
    'smoothing-size': { value: smooth.value.medianSizeRatio, remarks },
  };
}
