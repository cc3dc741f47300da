/** A simulated firm as the product keeps a borrower: statements with decimals, checked as an import checks them. */
import type { BorrowerInputs } from '#core/borrowerInputs.ts';
import { addDays, addMonthsToMonthEnd, plainDate, type PlainDate } from '#core/calendar/plainDate.ts';
import { decimal } from '#core/money/decimal.ts';
import { balanceIdentity, cashIdentity, retainedEarningsIdentity } from '#core/statements/identities.ts';
import type { LineItemCode } from '#core/statements/lineItems.ts';
import type { Amounts, Statement, Tie } from '#core/statements/statement.ts';
import {
  currentAssetsOf,
  currentLiabilitiesOf,
  equityOf,
  totalAssetsOf,
  totalLiabilitiesOf,
  type Balances,
  type Flows,
  type QuarterAccounts,
} from './statements.ts';
import { LAST } from './firmPlan.ts';
import type { Firm } from './statementBook.ts';

const LAST_QUARTER_END = plainDate('2025-12-31');
export const AS_OF = plainDate('2026-02-28');

export const quarterEndAt = (quarter: number): PlainDate =>
  addMonthsToMonthEnd(LAST_QUARTER_END, 3 * (quarter - LAST));

export const borrowerInputs = ({ plan, quarters }: Firm): BorrowerInputs => ({
  borrowerId: plan.borrowerId,
  name: `Firm ${plan.borrowerId}`,
  legalForm: 'company',
  sector: plan.sector.name,
  currency: 'EUR',
  fiscalYearEndMonth: 12,
  inputVersion: 1,
  statements: quarters.flatMap((accounts, quarter) =>
    twoStatements(plan.borrowerId, quarter, accounts, quarters[quarter - 1]?.balances),
  ),
  covenants: [],
  undertakings: [],
  rates: [],
  previous: null,
});

function twoStatements(
  borrowerId: number,
  quarter: number,
  { flows, balances }: QuarterAccounts,
  opening: Balances | undefined,
): readonly Statement[] {
  const periodEnd = quarterEndAt(quarter);
  const common = {
    periodEnd,
    basis: 'management',
    scope: 'group',
    framework: 'IFRS',
    currency: 'EUR',
    roundingUnit: ONE,
    tie: tieOf(flows, balances, opening),
    version: 1,
    receivedOn: addDays(periodEnd, 40),
    importId: null,
  } as const;
  const id = (borrowerId * 100 + quarter) * 2;
  const periodStart = addDays(addMonthsToMonthEnd(periodEnd, -3), 1);
  return [
    { ...common, id, periodStart: periodEnd, months: 0, amounts: amountsOf(balanceLines(balances)) },
    { ...common, id: id + 1, periodStart, months: 3, amounts: amountsOf(flowLines(flows)) },
  ];
}

const ONE = decimal(1);

const amountsOf = (lines: Readonly<Partial<Record<LineItemCode, number>>>): Amounts =>
  Object.fromEntries(Object.entries(lines).map(([line, value]) => [line, decimal(value)]));

/** The product's own identities; the first quarter has no opening balances to hold its flows against. */
function tieOf(flows: Flows, balances: Balances, opening: Balances | undefined): Tie {
  const totalAssets = decimal(totalAssetsOf(balances));
  const held = [
    balanceIdentity({
      totalAssets,
      totalLiabilities: decimal(totalLiabilitiesOf(balances)),
      equity: decimal(equityOf(balances)),
      roundingUnit: ONE,
    }),
  ];
  if (opening)
    held.push(
      cashIdentity({
        opening: decimal(opening.cash),
        flows: [flows.cfo, investing(flows), financing(flows)].map(decimal),
        closing: decimal(balances.cash),
        totalAssets,
        roundingUnit: ONE,
      }),
      retainedEarningsIdentity({
        opening: decimal(opening.retainedEarnings),
        netIncome: decimal(flows.netIncome),
        dividends: decimal(flows.dividends),
        namedEntries: decimal(0),
        closing: decimal(balances.retainedEarnings),
        totalAssets,
        roundingUnit: ONE,
      }),
    );
  return held.every(({ outcome }) => outcome === 'ties') ? 'ties' : 'does-not-tie';
}

const investing = (flows: Flows): number => -(flows.capex + flows.capitalisedCosts + flows.acquisitionsPaid);
const financing = (flows: Flows): number =>
  flows.debtDrawn - flows.debtRepaid - flows.dividends + flows.equityIssued;

const balanceLines = (at: Balances): Partial<Record<LineItemCode, number>> => ({
  cash: at.cash,
  receivables: at.receivables,
  inventory: at.inventory,
  other_current_assets: at.otherAssets,
  current_assets: currentAssetsOf(at),
  ppe_gross: at.ppeGross,
  ppe_net: at.ppeNet,
  intangibles: at.intangibles,
  goodwill: at.goodwill,
  total_assets: totalAssetsOf(at),
  payables: at.payables,
  accrued_liabilities: at.accrued,
  tax_payable: at.taxPayable,
  short_term_debt: at.shortTermDebt,
  current_liabilities: currentLiabilitiesOf(at),
  senior_debt: at.seniorDebt,
  total_liabilities: totalLiabilitiesOf(at),
  retained_earnings: at.retainedEarnings,
  equity: equityOf(at),
});

function flowLines(flows: Flows): Partial<Record<LineItemCode, number>> {
  const ebit =
    flows.revenue -
    flows.costOfSales -
    flows.overheads -
    flows.depreciation -
    flows.amortisation -
    flows.impairment;
  return {
    revenue: flows.revenue,
    cogs: flows.costOfSales,
    gross_profit: flows.revenue - flows.costOfSales,
    sga: flows.overheads,
    depreciation: flows.depreciation,
    amortisation: flows.amortisation,
    impairment: flows.impairment,
    ebit,
    interest_expense: flows.interest,
    profit_before_tax: ebit - flows.interest,
    income_tax: flows.tax,
    net_income: flows.netIncome,
    cfo: flows.cfo,
    capex: -flows.capex,
    capitalised_costs_paid: -flows.capitalisedCosts,
    acquisitions_paid: -flows.acquisitionsPaid,
    cfi: investing(flows),
    debt_drawn: flows.debtDrawn,
    debt_repaid: -flows.debtRepaid,
    dividends_paid: -flows.dividends,
    equity_issued: flows.equityIssued,
    cff: financing(flows),
    interest_paid: -flows.interest,
    tax_paid: -flows.taxPaid,
  };
}
