import type { DemoLine } from './demoLines.ts';
import type { Position } from './openingPosition.ts';
import type { CalendarQuarter, TradingPlan } from './tradingPlan.ts';

/** Chance of one quarter, each between -1 and 1. */
export interface QuarterDraw {
  readonly revenue: number;
  readonly cost: number;
  readonly receivableDays: number;
  readonly inventoryDays: number;
  readonly payableDays: number;
  readonly capex: number;
}

interface QuarterAt {
  readonly index: number;
  readonly before: number;
  readonly quarter: CalendarQuarter;
  readonly draw: QuarterDraw;
}

interface Traded {
  readonly lines: Record<DemoLine, number>;
  readonly closing: Position;
}

const TAX_RATE = 0.25;
const LEASE_RATE = 0.045;
const CASH_RATE = 0.012;
/** Of the term loan as it stands, a quarter. */
const REPAID_A_QUARTER = 0.0125;
const LEASES_REPAID_A_QUARTER = 0.03;
/** Below this share of a year's revenue the revolver is drawn. */
const LEAST_CASH_SHARE = 0.03;

type Income = ReturnType<typeof earn>;
type WorkingCapital = ReturnType<typeof tieUp>;

/** One quarter from one position to the next. */
export function tradeQuarter(plan: TradingPlan, opening: Position, at: QuarterAt): Traded {
  const income = earn(plan, opening, at);
  const working = tieUp(plan, income, at);
  const money = move(plan, opening, at, income, working);
  return {
    lines: { ...income, ...linesOf(money.closing, money.flows), ...money.flows },
    closing: money.closing,
  };
}

function earn(plan: TradingPlan, opening: Position, { index, before, quarter, draw }: QuarterAt) {
  const { profile } = plan;
  const shape = plan.shape(before);
  const season = profile.seasons[quarter.month / 3 - 1] ?? 1;
  const grown = plan.revenue * (1 + plan.growthPerYear) ** (index / 4);
  const revenue = Math.round(grown * season * (1 + 0.02 * draw.revenue) * (shape.revenue ?? 1));
  const cogs = Math.round(revenue * (profile.cogsShare + 0.008 * draw.cost + (shape.extraCostShare ?? 0)));
  const gross_profit = revenue - cogs;
  const other_operating_income = Math.round(revenue * 0.004);
  // Overheads follow the trend, not the season: that is what makes a seasonal business thin out of season.
  const sga = Math.round(grown * profile.sgaShare);
  const research_development = Math.round(grown * profile.researchShare);
  const rent_expense = Math.round(grown * profile.rentShare);
  const other_operating_expense = Math.round(revenue * profile.otherCostShare);
  const depreciation = Math.round((opening.ppeGross * profile.depreciationRate) / 4);
  const amortisation = Math.round(opening.intangibles / 20);
  // What a software house calls EBITDA leaves out a quarter of its research.
  const ebitda_reported = profile.statesEbitda
    ? gross_profit +
      other_operating_income -
      sga -
      Math.round(research_development * 0.75) -
      rent_expense -
      other_operating_expense
    : 0;
  const ebit =
    gross_profit +
    other_operating_income -
    sga -
    research_development -
    rent_expense -
    other_operating_expense -
    depreciation -
    amortisation;
  const borrowed = opening.termLoan + opening.junior * 1.4 + opening.revolver;
  const interest_expense = Math.round((borrowed * plan.interestRate + opening.leases * LEASE_RATE) / 4);
  const interest_income = Math.round((opening.cash * CASH_RATE) / 4);
  const profit_before_tax = ebit - interest_expense + interest_income;
  const income_tax = Math.max(0, Math.round(profit_before_tax * TAX_RATE));
  return {
    revenue,
    cogs,
    gross_profit,
    other_operating_income,
    sga,
    research_development,
    rent_expense,
    other_operating_expense,
    ebitda_reported,
    depreciation,
    amortisation,
    ebit,
    interest_expense,
    interest_income,
    profit_before_tax,
    income_tax,
    net_income: profit_before_tax - income_tax,
  };
}

/** What customers owe, what lies in store, what suppliers wait for. */
function tieUp(plan: TradingPlan, income: Income, { before, quarter, draw }: QuarterAt) {
  const { profile } = plan;
  const shape = plan.shape(before);
  const standing = (amount: number, daysOutstanding: number): number =>
    Math.round((amount * daysOutstanding) / quarter.days);
  return {
    receivables: standing(
      income.revenue,
      profile.receivableDays * (1 + 0.035 * draw.receivableDays) * (shape.receivableDays ?? 1),
    ),
    inventory: standing(
      income.cogs,
      profile.inventoryDays * (1 + 0.035 * draw.inventoryDays) * (shape.inventoryDays ?? 1),
    ),
    otherCurrentAssets: Math.round(income.revenue * 0.06),
    payables: standing(income.cogs, profile.payableDays * (1 + 0.035 * draw.payableDays)),
    accruedLiabilities: Math.round(income.revenue * 0.12),
    taxPayable: income.income_tax,
  };
}

function move(
  plan: TradingPlan,
  opening: Position,
  { quarter, draw }: QuarterAt,
  income: Income,
  working: WorkingCapital,
) {
  const rise =
    working.receivables -
    opening.receivables +
    working.inventory -
    opening.inventory +
    working.otherCurrentAssets -
    opening.otherCurrentAssets -
    (working.payables - opening.payables) -
    (working.accruedLiabilities - opening.accruedLiabilities) -
    (working.taxPayable - opening.taxPayable);
  const cfo = income.net_income + income.depreciation + income.amortisation - rise;
  const capex = Math.round(income.depreciation * (1.04 + 0.25 * draw.capex));
  const capitalised = Math.round(income.revenue * plan.profile.capitalisedShare);

  const isFirstOfYear = (quarter.month - plan.fiscalYearEndMonth + 12) % 12 === 3;
  const lastYear = isFirstOfYear ? opening.incomeOfYear : opening.incomeOfLastYear;
  const scheduled = Math.round(opening.termLoan * REPAID_A_QUARTER);
  const leasesRepaid = Math.round(opening.leases * LEASES_REPAID_A_QUARTER);
  const least = Math.round(income.revenue * 4 * LEAST_CASH_SHARE);
  const beforeChoice = opening.cash + cfo - capex - capitalised - scheduled - leasesRepaid;
  const dividends = isFirstOfYear
    ? Math.max(0, Math.min(Math.round(lastYear * plan.dividendShare), beforeChoice - least))
    : 0;
  const left = beforeChoice - dividends;
  const drawn = Math.max(0, least - left);
  const swept = Math.min(opening.revolver, Math.max(0, left - least));

  const closing: Position = {
    ...working,
    cash: left + drawn - swept,
    // Worn-out assets leave gross and accumulated depreciation alike, so that net is untouched.
    ppeGross: opening.ppeGross + capex - Math.round(income.depreciation * 0.6),
    ppeNet: opening.ppeNet + capex - income.depreciation,
    intangibles: opening.intangibles + capitalised - income.amortisation,
    goodwill: opening.goodwill,
    revolver: opening.revolver + drawn - swept,
    termLoan: opening.termLoan - scheduled,
    junior: opening.junior,
    leases: opening.leases - leasesRepaid,
    capital: opening.capital,
    retainedEarnings: opening.retainedEarnings + income.net_income - dividends,
    incomeOfYear: isFirstOfYear ? income.net_income : opening.incomeOfYear + income.net_income,
    incomeOfLastYear: lastYear,
  };
  const repaid = scheduled + leasesRepaid + swept;
  const flows = {
    cfo,
    capex: 0 - capex,
    capitalised_costs_paid: 0 - capitalised,
    cfi: 0 - capex - capitalised,
    debt_drawn: drawn,
    debt_repaid: 0 - repaid,
    dividends_paid: 0 - dividends,
    cff: drawn - repaid - dividends,
    interest_paid: 0 - income.interest_expense,
    tax_paid: working.taxPayable - opening.taxPayable - income.income_tax,
    rent_paid: 0 - leasesRepaid - Math.round((opening.leases * LEASE_RATE) / 4),
    scheduled_principal: scheduled,
    noi: 0,
  };
  return { flows, closing };
}

function linesOf(closing: Position, flows: { readonly scheduled_principal: number }) {
  const current_assets = closing.cash + closing.receivables + closing.inventory + closing.otherCurrentAssets;
  const withinYear = Math.min(closing.termLoan, flows.scheduled_principal * 4);
  const short_term_debt = closing.revolver + withinYear;
  const current_liabilities =
    closing.payables + closing.accruedLiabilities + closing.taxPayable + short_term_debt;
  const senior_debt = closing.termLoan - withinYear;
  return {
    cash: closing.cash,
    receivables: closing.receivables,
    inventory: closing.inventory,
    other_current_assets: closing.otherCurrentAssets,
    current_assets,
    ppe_gross: closing.ppeGross,
    ppe_net: closing.ppeNet,
    intangibles: closing.intangibles,
    goodwill: closing.goodwill,
    total_assets: current_assets + closing.ppeNet + closing.intangibles + closing.goodwill,
    payables: closing.payables,
    accrued_liabilities: closing.accruedLiabilities,
    tax_payable: closing.taxPayable,
    short_term_debt,
    current_liabilities,
    senior_debt,
    junior_debt: closing.junior,
    lease_liabilities: closing.leases,
    total_liabilities: current_liabilities + senior_debt + closing.junior + closing.leases,
    retained_earnings: closing.retainedEarnings,
    equity: closing.capital + closing.retainedEarnings,
    revolver_drawn: closing.revolver,
    revolver_commitment: 0,
    collateral_value: 0,
  };
}
