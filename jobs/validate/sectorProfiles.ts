/** Twelve invented sectors, from ninety firms to eight. Ratios are ordinary for such trades; no source. */
export interface SectorProfile {
  readonly name: string;
  readonly firms: number;
  /** Share of revenue left after cost of sales. */
  readonly grossMargin: number;
  /** Overheads, share of revenue. */
  readonly overheads: number;
  readonly receivableDays: number;
  /** Nought in trades that hold no stock. */
  readonly inventoryDays: number;
  readonly payableDays: number;
  /** Gross property, plant and equipment over a year's revenue. */
  readonly ppe: number;
  readonly usefulLifeYears: number;
  /** Contract assets and prepayments over a year's revenue. */
  readonly otherAssets: number;
  /** Share of the firms that capitalise development, and how much of revenue those do. */
  readonly capitalising: number;
  readonly development: number;
  /** Swing of the best quarter over the mean. */
  readonly season: number;
  /** Long-run relative deviation of days outstanding. */
  readonly looseness: number;
}

const profile = (
  name: string,
  firms: number,
  [grossMargin, overheads]: readonly [number, number],
  [receivableDays, inventoryDays, payableDays]: readonly [number, number, number],
  [ppe, usefulLifeYears, otherAssets]: readonly [number, number, number],
  [capitalising, development]: readonly [number, number],
  [season, looseness]: readonly [number, number],
): SectorProfile => ({
  name,
  firms,
  grossMargin,
  overheads,
  receivableDays,
  inventoryDays,
  payableDays,
  ppe,
  usefulLifeYears,
  otherAssets,
  capitalising,
  development,
  season,
  looseness,
});

export const SECTORS: readonly SectorProfile[] = [
  profile('metal goods', 90, [0.32, 0.19], [58, 75, 45], [0.8, 11, 0.03], [0.3, 0.012], [0.05, 0.07]),
  profile('food', 80, [0.26, 0.15], [40, 45, 42], [0.7, 12, 0.02], [0.15, 0.006], [0.1, 0.06]),
  profile('wholesale', 75, [0.2, 0.125], [45, 55, 40], [0.22, 8, 0.02], [0.15, 0.005], [0.08, 0.07]),
  profile('business services', 70, [0.38, 0.25], [62, 0, 25], [0.18, 6, 0.04], [0.35, 0.012], [0.04, 0.08]),
  profile('construction', 65, [0.19, 0.09], [70, 40, 55], [0.28, 8, 0.1], [0.05, 0.004], [0.14, 0.14]),
  profile('software', 55, [0.7, 0.5], [60, 0, 20], [0.12, 4, 0.04], [0.9, 0.07], [0.06, 0.09]),
  profile('logistics', 45, [0.24, 0.13], [48, 0, 35], [0.85, 9, 0.03], [0.1, 0.005], [0.06, 0.06]),
  profile('chemicals', 40, [0.33, 0.18], [55, 65, 50], [1, 13, 0.03], [0.45, 0.012], [0.05, 0.06]),
  profile('consumer goods', 30, [0.42, 0.3], [50, 90, 45], [0.35, 8, 0.03], [0.25, 0.008], [0.2, 0.09]),
  profile('medical devices', 24, [0.52, 0.36], [65, 110, 40], [0.42, 8, 0.03], [0.7, 0.03], [0.03, 0.08]),
  profile('packaging', 18, [0.3, 0.165], [55, 40, 42], [0.85, 11, 0.02], [0.15, 0.006], [0.06, 0.06]),
  profile('marine equipment', 8, [0.29, 0.17], [75, 95, 50], [0.5, 10, 0.06], [0.4, 0.014], [0.08, 0.12]),
];
