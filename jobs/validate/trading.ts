/** A firm's business by quarter, before anything is lifted: what it sells, what it costs, what it has outstanding. */
import { nextOf, type Draws } from './draws.ts';
import type { FirmPlan } from './firmPlan.ts';

/** Quarters before the first that is reported, so that nobody starts in a state of rest. */
export const RUN_IN = 8;
const DAYS_IN_QUARTER = 365 / 4;

export interface TradingQuarter {
  readonly revenue: number;
  readonly costOfSales: number;
  readonly overheads: number;
  readonly development: number;
  readonly receivables: number;
  readonly inventory: number;
  readonly otherAssets: number;
  readonly payables: number;
  readonly accrued: number;
  /** Gross property, plant and equipment that this much business needs. */
  readonly ppeWanted: number;
  /** What a quarter of this business earns when nothing is the matter. */
  readonly ordinaryEbitda: number;
}

/** What moves about its mean from quarter to quarter. */
const MOVING = [
  'demand',
  'margin',
  'receivables',
  'inventory',
  'payables',
  'otherAssets',
  'accrued',
] as const;
type Moving = Record<(typeof MOVING)[number], number>;

export interface TradingState {
  readonly moving: Moving;
  /** Smoothed revenue without seasons: overheads follow it, not the quarter. */
  readonly trend: number;
}

export const startOfTrading = (plan: FirmPlan): TradingState => ({
  moving: { demand: 0, margin: 0, receivables: 0, inventory: 0, payables: 0, otherAssets: 0, accrued: 0 },
  trend: businessOf(plan, -RUN_IN),
});

/** One quarter of trading. `sectorDemand` is the trade's own cycle, the same for all its firms. */
export function tradingQuarter(
  plan: FirmPlan,
  quarter: number,
  sectorDemand: number,
  before: TradingState,
  draws: Draws,
): { readonly trading: TradingQuarter; readonly state: TradingState } {
  const moving = moved(plan, before.moving, draws);
  const demand = Math.exp(sectorDemand + moving.demand);
  const business = businessOf(plan, quarter) * lossOfTrade(plan, quarter) * demand;
  const revenue = business * seasonOf(plan, quarter);
  const trend = 0.6 * before.trend + 0.4 * business;
  const costShare = 1 - (plan.grossMargin + moving.margin - lossOfMargin(plan, quarter));
  const next = business * seasonOf(plan, quarter + 1) * costShare;
  const costOfSales = revenue * costShare;
  return {
    state: { moving, trend },
    trading: {
      revenue,
      costOfSales,
      overheads: plan.overheads * (0.7 * trend + 0.3 * revenue) * (1 + draws.normal(0, 0.015)),
      development: revenue * (plan.development * Math.exp(draws.normal(0, 0.15)) + burstShare(plan, quarter)),
      receivables: outstanding(revenue, plan.receivableDays * latePayment(plan, quarter), moving.receivables),
      inventory: outstanding((costOfSales + next) / 2, plan.inventoryDays, moving.inventory),
      otherAssets: 4 * trend * plan.sector.otherAssets * Math.exp(moving.otherAssets),
      payables: outstanding(
        0.85 * costOfSales,
        plan.payableDays * laterPaying(plan, quarter),
        moving.payables,
      ),
      accrued: 4 * trend * 0.045 * Math.exp(moving.accrued),
      ppeWanted: 4 * trend * plan.ppe,
      ordinaryEbitda: businessOf(plan, quarter) * (plan.grossMargin - plan.overheads),
    },
  };
}

const outstanding = (flow: number, days: number, movement: number): number =>
  (flow * days * Math.exp(movement)) / DAYS_IN_QUARTER;

function moved(plan: FirmPlan, before: Moving, draws: Draws): Moving {
  const { looseness } = plan.sector;
  const deviations: Moving = {
    demand: 0.06,
    margin: 0.1 * plan.grossMargin * (1 - plan.grossMargin),
    receivables: looseness,
    inventory: looseness,
    payables: looseness,
    otherAssets: 0.18,
    accrued: 0.15,
  };
  return Object.fromEntries(
    MOVING.map((name) => [
      name,
      nextOf(before[name], { persistence: 0.65, deviation: deviations[name] }, draws),
    ]),
  ) as Moving;
}

/** A quarter's revenue of the business as it stands, without seasons, cycles and troubles. */
function businessOf(
  { yearlyRevenue, yearlyGrowth, fastGrowth, acquisition }: FirmPlan,
  quarter: number,
): number {
  const fastQuarters = fastGrowth ? Math.max(0, quarter - fastGrowth.from) : 0;
  const growth = (1 + yearlyGrowth) ** ((quarter - fastQuarters) / 4);
  const fast = (1 + (fastGrowth?.yearly ?? 0)) ** (fastQuarters / 4);
  const bought = acquisition && quarter >= acquisition.quarter ? 1 + acquisition.size : 1;
  return (yearlyRevenue / 4) * growth * fast * bought;
}

const seasonOf = ({ season, peakQuarter }: FirmPlan, quarter: number): number =>
  1 + season * Math.cos((Math.PI / 2) * (quarter - peakQuarter));

/** Trouble goes on for two years and a half, then stays. */
const LONGEST_TROUBLE = 10;
const troubledQuarters = ({ distress }: FirmPlan, quarter: number): number =>
  distress ? Math.min(LONGEST_TROUBLE, Math.max(0, quarter - distress.from + 1)) : 0;
const lossOfTrade = (plan: FirmPlan, quarter: number): number =>
  (1 - (plan.distress?.revenue ?? 0)) ** troubledQuarters(plan, quarter);
const lossOfMargin = (plan: FirmPlan, quarter: number): number =>
  (plan.distress?.margin ?? 0) * troubledQuarters(plan, quarter);
/** Who is short of cash pays suppliers later. */
const laterPaying = (plan: FirmPlan, quarter: number): number => 1 + 0.025 * troubledQuarters(plan, quarter);

const latePayment = ({ latePayment: late }: FirmPlan, quarter: number): number =>
  late && quarter >= late.from ? 1 + late.up : 1;
const burstShare = ({ developmentBurst: burst }: FirmPlan, quarter: number): number =>
  burst && quarter >= burst.from && quarter < burst.until ? burst.share : 0;
