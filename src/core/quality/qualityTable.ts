/**
 * Every weight, gate and cut-off of the reporting-quality score, in one dated table. Changed by a new table with a
 * new date and a raised METHOD_VERSION, never in passing.
 *
 * Source: methods.md B6. Weights were chosen on simulated books, seeds 1 to 12, and judged on seeds 101 to 130.
 */
export const QUALITY_TABLE = {
  date: '2026-12-01',
  weights: {
    'unexplained accruals': 35,
    'sharpest stretch': 40,
    'cash conversion': 10,
    'published screens': 10,
    'accrual noise': 5,
  },
  /** A percentile alone must not accuse: below these a risk counts no more than the middle. */
  gates: {
    unexplainedShareOfAssets: 0.01,
    daysUp: 0.05,
    capitalisedShareUp: 0.003,
    conversionEnough: 0.9,
    cap: 0.5,
  },
  /** Growth above this, or an acquisition in the year, takes screens and noise out. */
  fastGrowth: 0.25,
  /** Fewer available weights than this: no score. */
  fewestCoverage: 60,
  /** Own rule: what rests on a cash flow derived from the balance sheet is never covered better. */
  mostCoverageDerived: 70,
  peers: {
    fullSectorPeers: 10,
    fewestBookOthers: 10,
    /** Own rule: a median of fewer says little; the whole book's is shown instead. */
    fewestForMedian: 5,
  },
  /** Lower bounds, inclusive. */
  bands: [
    { band: 'well supported', from: 65 },
    { band: 'broadly supported', from: 45 },
    { band: 'needs explanation', from: 30 },
    { band: 'weakly supported', from: 0 },
  ],
  bandHysteresisPoints: 5,
  headlineQuarters: 3,
  historyQuarters: 8,
  /** Quarters that accrual noise may rest on, at most. */
  noiseQuarters: 16,
  explanationLines: 4,
} as const;
