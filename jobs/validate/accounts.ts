/** The three statements of a quarter. Whole currency units, so that they tie to the last one. */
import { acquiredIn } from './acquisition.ts';
import type { Draws } from './draws.ts';
import type { FirmPlan } from './firmPlan.ts';
import { financeQuarter } from './finance.ts';
import { fixedAssetsQuarter, restingIntangibles, type FixedAssets } from './fixedAssets.ts';
import { addedTo, NOTHING_LIFTED, quarterlyLift, type Lift, type Lifted } from './lifting.ts';
import {
  totalAssetsOf,
  totalLiabilitiesOf,
  workingCapitalOf,
  type Balances,
  type Flows,
  type QuarterAccounts,
} from './statements.ts';
import type { TradingQuarter } from './trading.ts';

/** What goes on from quarter to quarter beside the balances. */
export interface AccountsState {
  readonly balances: Balances;
  readonly lifted: Lifted;
  /** Losses that future profits are set off against. */
  readonly taxLosses: number;
}

const TAX_RATE = 0.25;
const INTEREST_PER_QUARTER = 0.016;

/** A firm at rest, before its first quarter: equity is what is left. */
export function openingAccounts(plan: FirmPlan, trading: TradingQuarter): AccountsState {
  const balances = {
    cash: Math.round(0.2 * trading.revenue),
    receivables: Math.round(trading.receivables),
    inventory: Math.round(trading.inventory),
    otherAssets: Math.round(trading.otherAssets),
    ppeGross: Math.round(trading.ppeWanted),
    ppeNet: Math.round(0.5 * trading.ppeWanted),
    intangibles: Math.round(restingIntangibles(trading.development)),
    goodwill: Math.round(4 * plan.goodwill * trading.revenue),
    payables: Math.round(trading.payables),
    accrued: Math.round(trading.accrued),
    taxPayable: 0,
    shortTermDebt: 0,
    seniorDebt: Math.round(plan.leverage * 4 * trading.ordinaryEbitda),
    paidInCapital: 0,
    retainedEarnings: 0,
  };
  const equity = totalAssetsOf(balances) - totalLiabilitiesOf(balances);
  const paidInCapital = Math.round(0.3 * Math.abs(equity));
  return {
    balances: { ...balances, paidInCapital, retainedEarnings: equity - paidInCapital },
    lifted: NOTHING_LIFTED,
    taxLosses: 0,
  };
}

/** One quarter's accounts as they are reported. */
export function accountsQuarter(
  plan: FirmPlan,
  quarter: number,
  trading: TradingQuarter,
  before: AccountsState,
  draws: Draws,
): { readonly accounts: QuarterAccounts; readonly state: AccountsState } {
  const opening = before.balances;
  const lift = quarterlyLift(plan, quarter, trading.ordinaryEbitda);
  const lifted = addedTo(before.lifted, lift);
  const bought = acquiredIn(plan, quarter, trading, opening.ppeNet);
  const fixed = fixedAssetsQuarter(plan, quarter, trading, opening, { lift, bought }, draws);
  const { income, taxLosses } = incomeOf(trading, lift, fixed, opening, before.taxLosses);
  const working = {
    receivables: Math.round(trading.receivables) + lifted.receivables,
    inventory: Math.round(trading.inventory) + lifted.inventory,
    otherAssets: Math.round(trading.otherAssets),
    payables: Math.round(trading.payables),
    accrued: Math.round(trading.accrued),
    taxPayable: income.tax,
  };
  const absorbed = workingCapitalOf(working) - workingCapitalOf(opening) - workingCapitalOf(bought);
  const writtenOff = fixed.depreciation + fixed.amortisation + fixed.impairment;
  const cfo = income.netIncome + writtenOff - absorbed;
  const invested = fixed.capex + fixed.capitalisedCosts + bought.price;
  const { cash, shortTermDebt, seniorDebt, ...paid } = financeQuarter(opening, trading, {
    cash: opening.cash + cfo - invested,
    price: bought.price,
  });
  const { closing, ...fixedFlows } = fixed;
  const balances: Balances = {
    ...working,
    ...closing,
    cash,
    shortTermDebt,
    seniorDebt,
    paidInCapital: opening.paidInCapital + paid.equityIssued,
    retainedEarnings: opening.retainedEarnings + income.netIncome - paid.dividends,
  };
  const flows = {
    ...income,
    ...fixedFlows,
    ...paid,
    cfo,
    taxPaid: opening.taxPayable,
    acquisitionsPaid: bought.price,
  };
  return { accounts: { balances, flows }, state: { balances, lifted, taxLosses } };
}

type Income = Pick<Flows, 'revenue' | 'costOfSales' | 'overheads' | 'interest' | 'tax' | 'netIncome'>;

/** Tax is due on profit after earlier losses, and paid a quarter later. */
function incomeOf(
  trading: TradingQuarter,
  lift: Lift,
  fixed: FixedAssets,
  opening: Balances,
  lossesBefore: number,
): { readonly income: Income; readonly taxLosses: number } {
  const revenue = Math.round(trading.revenue) + lift.receivables;
  const costOfSales = Math.round(trading.costOfSales) - lift.inventory;
  const overheads = Math.round(trading.overheads) - lift.intangibles - lift.ppe;
  const interest = Math.round(INTEREST_PER_QUARTER * (opening.shortTermDebt + opening.seniorDebt));
  const writtenOff = fixed.depreciation + fixed.amortisation + fixed.impairment;
  const profit = revenue - costOfSales - overheads - writtenOff - interest;
  const taxable = Math.max(0, profit - lossesBefore);
  const tax = Math.round(TAX_RATE * taxable);
  return {
    income: { revenue, costOfSales, overheads, interest, tax, netIncome: profit - tax },
    taxLosses: Math.max(0, lossesBefore - profit),
  };
}
