/** What each story does to a borrower's course, and the reading that its debt is sized to. */
import type { DemoQuarter } from './demoLines.ts';
import type { Scenario } from './borrowerTable.ts';
import { interestCover, netLeverage } from './ratios.ts';
import { ORDINARY, type QuarterShape, type TradingPlan } from './tradingPlan.ts';
import { tradingYears } from './tradingYears.ts';

/** A reading that rises with debt, about in a straight line. */
interface SizedTo {
  readonly reading: (quarters: readonly DemoQuarter[], index: number) => number | null;
  readonly target: number;
}

interface ScenarioPlan {
  readonly changes: Partial<Omit<TradingPlan, 'termDebt'>> & {
    /** Term loan as a multiple of a quarter's revenue, where no reading sizes it. */
    readonly debtToRevenue?: number;
  };
  /** 'ordinary' is the leverage that the borrower would have without a story; null leaves the plan's debt. */
  readonly sizedTo: SizedTo | 'ordinary' | null;
}

const toNetLeverage = (target: number): SizedTo => ({ reading: netLeverage, target });

const toInterestCover = (target: number): SizedTo => ({
  reading: (quarters, index) => 1 / (interestCover(quarters, index) ?? Number.POSITIVE_INFINITY),
  target: 1 / target,
});

/** Falls from 0 to 1 over so many quarters up to the latest. */
const lately = (before: number, quarters: number): number => Math.max(0, 1 - before / quarters);

const SCENARIO_PLANS: Readonly<Record<Scenario, ScenarioPlan>> = {
  healthy: { changes: {}, sizedTo: 'ordinary' },
  'thin headroom': { changes: { growthPerYear: 0.01 }, sizedTo: toNetLeverage(3.31) },
  'just passing on add-backs': {
    changes: {
      growthPerYear: 0.03,
      dividendShare: 0.8,
      shape: (before): QuarterShape => ({
        extraCostShare: 0.024 * lately(before, 6),
        receivableDays: 1 + 0.42 * lately(before, 6),
      }),
    },
    sizedTo: toNetLeverage(3.9),
  },
  'met only with add-backs': {
    changes: {
      growthPerYear: 0.01,
      shape: (before): QuarterShape => ({ extraCostShare: 0.006 * lately(before, 6) }),
    },
    sizedTo: toNetLeverage(3.66),
  },
  'growing fast': { changes: { growthPerYear: 0.38, dividendShare: 0 }, sizedTo: toNetLeverage(1.5) },
  seasonal: { changes: { growthPerYear: 0.03 }, sizedTo: toNetLeverage(1.9) },
  'not met and waived': {
    changes: {
      growthPerYear: 0,
      shape: (before): QuarterShape => ({ extraCostShare: before === 0 ? 0.09 : 0 }),
    },
    sizedTo: toNetLeverage(3.84),
  },
  'interest cover not met': {
    changes: {
      growthPerYear: 0,
      interestRate: 0.105,
      shape: (before): QuarterShape => ({ extraCostShare: before === 0 ? 0.075 : 0 }),
    },
    sizedTo: toInterestCover(2.36),
  },
  restated: { changes: { growthPerYear: 0.02 }, sizedTo: toNetLeverage(2.4) },
  'ratio without meaning': {
    changes: {
      growthPerYear: -0.02,
      dividendShare: 0,
      debtToRevenue: 1,
      // Slipping for two quarters, then a contract that cost far more than it brought.
      shape: (before): QuarterShape =>
        [
          { revenue: 0.65, extraCostShare: 0.55 },
          { revenue: 0.85, extraCostShare: 0.16 },
          { revenue: 0.92, extraCostShare: 0.1 },
        ][before] ?? {},
    },
    sizedTo: null,
  },
  'net cash': { changes: { openingCashShare: 0.24, dividendShare: 0.2 }, sizedTo: null },
  'quality fell': {
    changes: {
      growthPerYear: 0.05,
      shape: (before): QuarterShape => ({
        receivableDays: [1.55, 1.22][before] ?? 1,
        extraCostShare: before < 2 ? -0.02 : 0,
      }),
    },
    sizedTo: toNetLeverage(2.3),
  },
  'step-down ahead': { changes: { growthPerYear: 0.01 }, sizedTo: toNetLeverage(3.08) },
  'step-down later': { changes: { growthPerYear: 0.01 }, sizedTo: toNetLeverage(3.1) },
  late: { changes: {}, sizedTo: toNetLeverage(2.6) },
  'late within grace': { changes: {}, sizedTo: toNetLeverage(2.1) },
  'thin current ratio': { changes: {}, sizedTo: toNetLeverage(2.3) },
  'thin liquidity': { changes: {}, sizedTo: toNetLeverage(2.2) },
  'covenant holiday': { changes: {}, sizedTo: toNetLeverage(2.5) },
  'in cure period': { changes: {}, sizedTo: 'ordinary' },
  'cured by its owners': { changes: {}, sizedTo: 'ordinary' },
  'cured by the next test': { changes: {}, sizedTo: 'ordinary' },
  'springing revolver': { changes: {}, sizedTo: 'ordinary' },
  'our own triggers': { changes: {}, sizedTo: 'ordinary' },
};

/** Seasons of a business that packs a summer's fruit for the winter. */
const HARVEST: readonly [number, number, number, number] = [0.78, 0.7, 0.96, 1.56];

/** The plan with its story in it and its debt sized to the story's reading. */
export function plannedFor(
  scenario: Scenario,
  ordinary: TradingPlan,
  ordinaryNetLeverage: number,
): TradingPlan {
  const { changes, sizedTo } = SCENARIO_PLANS[scenario];
  const { debtToRevenue = 0, ...changed } = changes;
  const packsHarvest = scenario === 'seasonal' && ordinary.profile.code === '10';
  const profile = packsHarvest ? { ...ordinary.profile, seasons: HARVEST } : ordinary.profile;
  const termDebt = Math.round(ordinary.revenue * debtToRevenue);
  const plan: TradingPlan = { ...ordinary, profile, shape: ORDINARY, termDebt, ...changed };
  if (sizedTo === null) return plan;
  return withDebtSizedTo(plan, sizedTo === 'ordinary' ? toNetLeverage(ordinaryNetLeverage) : sizedTo);
}

/** By false position (Illinois form); throws where no debt gives the reading. */
function withDebtSizedTo(plan: TradingPlan, { reading, target }: SizedTo): TradingPlan {
  const missBy = (termDebt: number): number => {
    const quarters = tradingYears({ ...plan, termDebt });
    return ((reading(quarters, quarters.length - 1) ?? Number.NaN) - target) / target;
  };
  let low = { debt: 0, miss: missBy(0) };
  let high = { debt: plan.revenue * 8, miss: missBy(plan.revenue * 8) };
  for (let step = 0; step < MOST_STEPS; step += 1) {
    const debt = Math.round(low.debt + ((high.debt - low.debt) * low.miss) / (low.miss - high.miss));
    const miss = missBy(debt);
    if (Math.abs(miss) < NEAR_ENOUGH) return { ...plan, termDebt: debt };
    if (miss < 0) {
      low = { debt, miss };
      high = { ...high, miss: high.miss / 2 };
    } else {
      high = { debt, miss };
      low = { ...low, miss: low.miss / 2 };
    }
  }
  throw new Error(`${plan.seed}: no debt gives ${target}`);
}

const MOST_STEPS = 40;
const NEAR_ENOUGH = 0.001;
