import type { Acquired } from './acquisition.ts';
import type { Balances } from './statements.ts';
import type { Draws } from './draws.ts';
import type { FirmPlan } from './firmPlan.ts';
import type { Lift } from './lifting.ts';
import type { TradingQuarter } from './trading.ts';

export interface FixedAssets {
  readonly depreciation: number;
  readonly amortisation: number;
  readonly impairment: number;
  readonly capex: number;
  readonly capitalisedCosts: number;
  readonly closing: Pick<Balances, 'ppeGross' | 'ppeNet' | 'intangibles' | 'goodwill'>;
}

const AMORTISED_PER_QUARTER = 1 / 16;
/** Chance of a write-down in a quarter, of a sound firm and of one in trouble. */
const WRITE_DOWN = { sound: 0.012, troubled: 0.05 };
/** Chance of a large purchase in a quarter, and how many times the ordinary one it is. */
const LARGE_PURCHASE = { chance: 0.05, times: 3 };

/** Intangibles at which what is spent each quarter equals what is written off. */
export const restingIntangibles = (development: number): number => development / AMORTISED_PER_QUARTER;

/** Plant, intangibles and goodwill of one quarter: worn out, replaced by fits and starts, bought, lifted into. */
export function fixedAssetsQuarter(
  plan: FirmPlan,
  quarter: number,
  trading: TradingQuarter,
  opening: Balances,
  { lift, bought }: { readonly lift: Lift; readonly bought: Acquired },
  draws: Draws,
): FixedAssets {
  const perQuarter = opening.ppeGross / (4 * plan.sector.usefulLifeYears);
  const depreciation = Math.round(Math.min(opening.ppeNet, perQuarter));
  // What is retired has been written off in full.
  const retired = Math.round(Math.min(0.9 * perQuarter, opening.ppeGross - opening.ppeNet));
  const replacing = perQuarter * Math.exp(draws.normal(-0.1, 0.45));
  const purchase = draws.chance(LARGE_PURCHASE.chance) ? LARGE_PURCHASE.times * replacing : replacing;
  const growing = 0.25 * Math.max(0, trading.ppeWanted - opening.ppeGross);
  const capex = Math.round(purchase + growing) + lift.ppe;
  const capitalisedCosts = Math.round(trading.development) + lift.intangibles;
  const amortisation = Math.round(opening.intangibles * AMORTISED_PER_QUARTER);
  const isTroubled = plan.distress !== null && quarter >= plan.distress.from;
  const isWrittenDown = draws.chance(isTroubled ? WRITE_DOWN.troubled : WRITE_DOWN.sound);
  const impairment = isWrittenDown
    ? Math.round(draws.between(0.03, 0.12) * (opening.ppeNet - depreciation))
    : 0;
  return {
    depreciation,
    amortisation,
    impairment,
    capex,
    capitalisedCosts,
    closing: {
      ppeGross: opening.ppeGross + capex + bought.ppe - retired,
      ppeNet: opening.ppeNet + capex + bought.ppe - depreciation - impairment,
      intangibles: opening.intangibles + capitalisedCosts - amortisation,
      goodwill: opening.goodwill + bought.goodwill,
    },
  };
}
