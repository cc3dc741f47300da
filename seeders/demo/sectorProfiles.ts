/**
 * Eight sectors and how a business in each trades. Codes are divisions of NACE Rev. 2.1, wording shortened (from
 * memory). The figures are invented, chosen so that sectors differ where real ones do.
 */
export interface SectorProfile {
  readonly code: string;
  readonly label: string;
  /** Shares of revenue. */
  readonly cogsShare: number;
  readonly sgaShare: number;
  readonly researchShare: number;
  readonly rentShare: number;
  readonly otherCostShare: number;
  /** Days of the quarter's sales or cost of sales. */
  readonly receivableDays: number;
  readonly inventoryDays: number;
  readonly payableDays: number;
  /** Shares of a year's revenue. */
  readonly ppeShare: number;
  readonly goodwillShare: number;
  readonly capitalisedShare: number;
  readonly depreciationRate: number;
  readonly leaseShare: number;
  /** Its sheets print an EBITDA of its own. */
  readonly statesEbitda?: true;
  /** Weight of the quarters that end in March, June, September, December; averages 1. */
  readonly seasons: readonly [number, number, number, number];
}

export const SECTOR_SCHEME = 'NACE Rev. 2.1';

/** prettier-ignore keeps the table a table. */
// prettier-ignore
export const SECTOR_PROFILES = {
  food: { code: '10', label: 'Manufacture of food products', cogsShare: 0.66, sgaShare: 0.15, researchShare: 0.005, rentShare: 0.012, otherCostShare: 0.035, receivableDays: 42, inventoryDays: 48, payableDays: 50, ppeShare: 0.42, goodwillShare: 0.06, capitalisedShare: 0.002, depreciationRate: 0.085, leaseShare: 0, seasons: [0.95, 0.98, 1.0, 1.07] },
  metal: { code: '25', label: 'Manufacture of fabricated metal products', cogsShare: 0.64, sgaShare: 0.14, researchShare: 0.012, rentShare: 0.015, otherCostShare: 0.04, receivableDays: 58, inventoryDays: 72, payableDays: 48, ppeShare: 0.5, goodwillShare: 0.05, capitalisedShare: 0.004, depreciationRate: 0.08, leaseShare: 0, seasons: [0.99, 1.03, 0.97, 1.01] },
  machinery: { code: '28', label: 'Manufacture of machinery and equipment', cogsShare: 0.62, sgaShare: 0.15, researchShare: 0.035, rentShare: 0.012, otherCostShare: 0.035, receivableDays: 64, inventoryDays: 88, payableDays: 52, ppeShare: 0.36, goodwillShare: 0.1, capitalisedShare: 0.012, depreciationRate: 0.085, leaseShare: 0, seasons: [0.94, 1.0, 0.98, 1.08] },
  construction: { code: '43', label: 'Specialised construction activities', cogsShare: 0.74, sgaShare: 0.1, researchShare: 0, rentShare: 0.015, otherCostShare: 0.03, receivableDays: 70, inventoryDays: 22, payableDays: 54, ppeShare: 0.22, goodwillShare: 0.05, capitalisedShare: 0, depreciationRate: 0.1, leaseShare: 0.03, seasons: [0.88, 1.04, 1.08, 1.0] },
  wholesale: { code: '46', label: 'Wholesale trade', cogsShare: 0.76, sgaShare: 0.11, researchShare: 0, rentShare: 0.02, otherCostShare: 0.03, receivableDays: 46, inventoryDays: 54, payableDays: 46, ppeShare: 0.14, goodwillShare: 0.06, capitalisedShare: 0.002, depreciationRate: 0.1, leaseShare: 0.05, seasons: [0.96, 1.0, 0.99, 1.05] },
  transport: { code: '49', label: 'Land transport', cogsShare: 0.7, sgaShare: 0.08, researchShare: 0, rentShare: 0.02, otherCostShare: 0.04, receivableDays: 44, inventoryDays: 6, payableDays: 34, ppeShare: 0.62, goodwillShare: 0.03, capitalisedShare: 0, depreciationRate: 0.11, leaseShare: 0.08, seasons: [0.97, 1.0, 0.99, 1.04] },
  hotels: { code: '55', label: 'Accommodation', cogsShare: 0.42, sgaShare: 0.22, researchShare: 0, rentShare: 0.04, otherCostShare: 0.1, receivableDays: 14, inventoryDays: 12, payableDays: 40, ppeShare: 1.5, goodwillShare: 0.04, capitalisedShare: 0, depreciationRate: 0.045, leaseShare: 0.1, seasons: [0.66, 1.05, 1.42, 0.87] },
  software: { code: '62', label: 'Computer programming and consultancy', cogsShare: 0.38, sgaShare: 0.28, researchShare: 0.12, rentShare: 0.02, otherCostShare: 0.03, receivableDays: 60, inventoryDays: 0, payableDays: 40, ppeShare: 0.1, goodwillShare: 0.35, capitalisedShare: 0.03, depreciationRate: 0.22, leaseShare: 0, statesEbitda: true, seasons: [0.97, 0.99, 0.98, 1.06] },
} as const satisfies Record<string, SectorProfile>;

export type SectorName = keyof typeof SECTOR_PROFILES;
