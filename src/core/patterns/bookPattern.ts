import { ok, type Result } from '../result.ts';
import { approximateSignTest, type SignTest } from '../statistics/approximateSignTest.ts';
import { clusterBootstrap, type BootstrapInterval } from '../statistics/clusterBootstrap.ts';
import { densityBreak, type DensityBreak, type DensityBreakError } from '../statistics/densityBreak.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import type { StatisticsError } from '../statistics/statisticsError.ts';
import { coarseRatios, type CoarseRatios } from './coarseRatios.ts';
import { headroomHistogram, type HeadroomHistogram } from './headroomHistogram.ts';
import { removedRows, type HeadroomRow, type Removal } from './headroomRow.ts';
import { borrowersOf, keptRows, type KeptRows, type TooFewNearLimit } from './nearLimit.ts';
import { onSecondScale } from './secondScale.ts';
import { sidesOfLimit, type SidesOfLimit } from './sidesOfLimit.ts';
import { splitBy, splitByRun, type RunSplit, type SplitPart } from './splits.ts';
import { binOf } from './windows.ts';

/** Below this many tests nothing has power against moderate lifting. Source: methods.md Part C 3.5. */
export const LOW_POWER_BELOW = 1_000;
/** Level of the one-sided tests. */
export const SIGNIFICANCE = 0.05;

export interface BookPatternSettings {
  /** Bin widths as shares of the level, the headline first. */
  readonly widths: readonly [number, ...number[]];
  /** Cut-offs at which nothing should show. */
  readonly placeboPoints: readonly number[];
  readonly draws: number;
  readonly seed: number;
}

/** Recommended: methods.md Part C 3.5 and 1.5. The seed is the caller's. */
export const BOOK_PATTERN_SETTINGS: Omit<BookPatternSettings, 'seed'> = {
  widths: [0.02, 0.01, 0.03],
  placeboPoints: [0.06, 0.1, 0.14, 0.2],
  draws: 500,
};

export interface BookPattern {
  readonly n: number;
  readonly borrowers: number;
  /** First and last test date among them. */
  readonly from: PlainDate;
  readonly until: PlainDate;
  readonly nearLimit: number;
  /** Tests whose ratio has no meaning or that have net cash: counted in n, outside every window. */
  readonly withoutHeadroom: number;
  readonly removed: Readonly<Record<Removal, number>>;
  /** One a width, in the order of the settings. */
  readonly histograms: readonly HeadroomHistogram[];
  readonly headline: SidesOfLimit;
  readonly otherWidths: readonly SidesOfLimit[];
  readonly secondScale: SidesOfLimit;
  /** The right side's sign or significance differs between the scales. */
  readonly isScaleDependent: boolean;
  readonly placebos: readonly SidesOfLimit[];
  /** Tests just inside the limit beyond what the neighbours imply, with its interval over borrowers. */
  readonly excess: Result<BootstrapInterval, StatisticsError>;
  readonly densityBreak: {
    readonly defaultBandwidth: Result<DensityBreak, DensityBreakError>;
    readonly halfBandwidth: Result<DensityBreak, DensityBreakError>;
  };
  readonly signTest: Result<SignTest, StatisticsError>;
  readonly hasLowPower: boolean;
  /** Null where no agreement rounds its ratio. */
  readonly discrete: CoarseRatios | null;
  readonly byMeasure: readonly SplitPart[];
  readonly bySector: readonly SplitPart[];
  readonly byRun: RunSplit;
}

/**
 * Whether more tests of the book end just inside their limits than a smooth pattern implies. It speaks of the book,
 * never of a borrower, and never of intent.
 *
 * Refused below 100 tests within 10 % of the limit. Source: methods.md C0, C1 and C3.
 *
 * @example bookPattern([], { ...BOOK_PATTERN_SETTINGS, seed: 1 }).error.given // => 0
 */
export function bookPattern(
  rows: readonly HeadroomRow[],
  settings: BookPatternSettings,
): Result<BookPattern, TooFewNearLimit> {
  const kept = keptRows(rows);
  if (!kept.ok) return kept;
  const { headrooms, n, nearLimit } = kept.value;
  const [width, ...otherWidths] = settings.widths;
  const headline = sidesOfLimit(headrooms, n, width, 0);
  const secondScale = sidesOfLimit(onSecondScale(kept.value.rows), n, width, 0);
  return ok({
    n,
    borrowers: borrowersOf(rows),
    ...spanOf(kept.value.rows),
    nearLimit,
    withoutHeadroom: n - headrooms.length,
    removed: removedRows(rows),
    histograms: settings.widths.map((each) => headroomHistogram(headrooms, each)),
    headline,
    otherWidths: otherWidths.map((each) => sidesOfLimit(headrooms, n, each, 0)),
    secondScale,
    isScaleDependent: isOtherwise(headline, secondScale),
    placebos: settings.placeboPoints.map((point) => sidesOfLimit(headrooms, n, width, point)),
    excess: excessOverBorrowers(kept.value, width, settings),
    densityBreak: densityBreaks(headrooms),
    signTest: approximateSignTest(headrooms, 0, SIGNIFICANCE, 'one-sided'),
    hasLowPower: n < LOW_POWER_BELOW,
    discrete: coarseRatios(kept.value.rows),
    byMeasure: splitBy(rows, ({ measure }) => measure, width),
    bySector: splitBy(rows, ({ sector }) => sector, width),
    byRun: splitByRun(rows, width),
  });
}

function spanOf(rows: readonly HeadroomRow[]): Pick<BookPattern, 'from' | 'until'> {
  let [from, until] = [rows[0]!.testDate, rows[0]!.testDate];
  for (const { testDate } of rows) {
    if (testDate < from) from = testDate;
    if (testDate > until) until = testDate;
  }
  return { from, until };
}

const isSignificant = ({ pRight }: SidesOfLimit): boolean => pRight !== null && pRight <= SIGNIFICANCE;

const isOtherwise = (first: SidesOfLimit, second: SidesOfLimit): boolean =>
  isSignificant(first) !== isSignificant(second) ||
  Math.sign(first.right.zMultinomial ?? 0) !== Math.sign(second.right.zMultinomial ?? 0);

/** Each borrower's own share of the excess is drawn with all of its tests, whatever their covenants. */
function excessOverBorrowers(
  { rows }: KeptRows,
  width: number,
  { draws, seed }: BookPatternSettings,
): Result<BootstrapInterval, StatisticsError> {
  const shares = new Map<number, number>();
  for (const { borrowerId, headroom } of rows) {
    const bin = headroom === null ? null : binOf(headroom, width);
    const share = bin === 0 ? 1 : bin === -1 || bin === 1 ? -1 / 2 : 0;
    shares.set(borrowerId, (shares.get(borrowerId) ?? 0) + share);
  }
  return clusterBootstrap([...shares.values()], (drawn) => drawn.reduce((sum, share) => sum + share, 0), {
    draws,
    seed,
  });
}

/** Beyond one whole level either side EBITDA is near nought, and a few such ratios would set the width of the bins. */
const DENSITY_WITHIN = 1;

function densityBreaks(headrooms: readonly number[]): BookPattern['densityBreak'] {
  const within = headrooms.filter((headroom) => Math.abs(headroom) < DENSITY_WITHIN);
  const defaultBandwidth = densityBreak(within, 0);
  if (!defaultBandwidth.ok) return { defaultBandwidth, halfBandwidth: defaultBandwidth };
  const bandwidth = defaultBandwidth.value.bandwidth / 2;
  return { defaultBandwidth, halfBandwidth: densityBreak(within, 0, { bandwidth }) };
}
