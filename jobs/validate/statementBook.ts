/** A simulated book: six hundred firms with their accounts of twenty-four quarters. */
import { accountsQuarter, openingAccounts } from './accounts.ts';
import { drawsOf, nextOf, type Draws } from './draws.ts';
import { firmPlans, QUARTERS, type FirmPlan } from './firmPlan.ts';
import { SECTORS } from './sectorProfiles.ts';
import type { QuarterAccounts } from './statements.ts';
import { RUN_IN, startOfTrading, tradingQuarter } from './trading.ts';

export interface Firm {
  readonly plan: FirmPlan;
  /** Oldest first. */
  readonly quarters: readonly QuarterAccounts[];
}

/** Streams of the sectors' cycles lie beyond those of the firms. */
const CYCLES = 10_000;
const FIRMS = 20_000;

export function statementBook(seed: number): readonly Firm[] {
  const cycles = new Map(SECTORS.map(({ name }, place) => [name, cycleOf(drawsOf(seed, CYCLES + place))]));
  return firmPlans(seed).map((plan) => ({
    plan,
    quarters: quartersOf(plan, cycles.get(plan.sector.name)!, drawsOf(seed, FIRMS + plan.borrowerId)),
  }));
}

/** A trade's demand, as a log deviation, from the run-in on. */
function cycleOf(draws: Draws): readonly number[] {
  let demand = draws.normal(0, 0.04);
  return Array.from({ length: RUN_IN + QUARTERS }, () => {
    demand = nextOf(demand, { persistence: 0.75, deviation: 0.04 }, draws);
    return demand;
  });
}

function quartersOf(plan: FirmPlan, cycle: readonly number[], draws: Draws): readonly QuarterAccounts[] {
  let trading = tradingQuarter(plan, -RUN_IN, cycle[0]!, startOfTrading(plan), draws);
  let state = openingAccounts(plan, trading.trading);
  const quarters = cycle.map((demand, place) => {
    const quarter = place - RUN_IN;
    trading = tradingQuarter(plan, quarter, demand, trading.state, draws);
    const reported = accountsQuarter(plan, quarter, trading.trading, state, draws);
    state = reported.state;
    return reported.accounts;
  });
  return quarters.slice(RUN_IN);
}
