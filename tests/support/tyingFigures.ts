/** Invented accounts of one quarter that tie: every line is a share of revenue. */
import type { WorkbookPeriod } from './workbooks.ts';

/** In whole currency units. The balance sheet is its own: only its cash follows from `openingCash` and the flows. */
export function tyingPeriod(end: string, revenue: number, openingCash: number): WorkbookPeriod {
  const part = (share: number) => Math.round(revenue * share);
  const income = incomeOf(revenue, part);
  const cash = cashOf(income.net_income, income.depreciation + income.amortisation, part, openingCash);
  return { end, months: 3, amounts: { ...income, ...cash, ...balanceOf(cash.closing_cash, part) } };
}

function incomeOf(revenue: number, part: (share: number) => number) {
  const [cogs, sga, depreciation, amortisation, interest_expense] = [0.62, 0.2, 0.03, 0.01, 0.012].map(
    part,
  ) as [number, number, number, number, number];
  const ebitda_reported = revenue - cogs - sga;
  const ebit = ebitda_reported - depreciation - amortisation;
  const profit_before_tax = ebit - interest_expense;
  const income_tax = Math.round(profit_before_tax * 0.25);
  return {
    revenue,
    cogs,
    sga,
    depreciation,
    amortisation,
    interest_expense,
    ebitda_reported,
    ebit,
    profit_before_tax,
    income_tax,
    gross_profit: revenue - cogs,
    net_income: profit_before_tax - income_tax,
  };
}

function cashOf(
  net_income: number,
  depreciation_and_amortisation: number,
  part: (share: number) => number,
  opening_cash: number,
) {
  const working_capital_change = -part(0.01);
  const cfo = net_income + depreciation_and_amortisation + working_capital_change;
  const [capex, debt_repaid] = [-part(0.035), -part(0.02)];
  const net_change_in_cash = cfo + capex + debt_repaid;
  return {
    net_income,
    depreciation_and_amortisation,
    working_capital_change,
    cfo,
    capex,
    debt_repaid,
    opening_cash,
    net_change_in_cash,
    cfi: capex,
    cff: debt_repaid,
    closing_cash: opening_cash + net_change_in_cash,
  };
}

function balanceOf(cash: number, part: (share: number) => number) {
  const [ppe_net, goodwill, inventory, receivables] = [0.9, 0.35, 0.4, 0.55].map(part) as [
    number,
    number,
    number,
    number,
  ];
  const [senior_debt, short_term_debt, payables, accrued_liabilities] = [0.6, 0.1, 0.3, 0.18].map(part) as [
    number,
    number,
    number,
    number,
  ];
  const share_capital = part(0.1);
  const current_assets = inventory + receivables + cash;
  const total_assets = ppe_net + goodwill + current_assets;
  const current_liabilities = short_term_debt + payables + accrued_liabilities;
  const total_liabilities = senior_debt + current_liabilities;
  const equity = total_assets - total_liabilities;
  return {
    ppe_net,
    goodwill,
    inventory,
    receivables,
    cash,
    current_assets,
    total_assets,
    share_capital,
    equity,
    senior_debt,
    short_term_debt,
    payables,
    accrued_liabilities,
    current_liabilities,
    total_liabilities,
    retained_earnings: equity - share_capital,
    total_non_current_assets: ppe_net + goodwill,
    total_non_current_liabilities: senior_debt,
    total_equity_and_liabilities: total_assets,
  };
}
