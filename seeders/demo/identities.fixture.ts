/** The identities of three statements, written out apart from the generator, to the last thousand. */
import type { DemoQuarter } from './demoLines.ts';

type Lines = DemoQuarter['lines'];

const WITHIN: Readonly<Record<string, (l: Lines) => number>> = {
  'assets = liabilities + equity': (l) => l.total_assets - l.total_liabilities - l.equity,
  'current assets': (l) => l.cash + l.receivables + l.inventory + l.other_current_assets - l.current_assets,
  'total assets': (l) => l.current_assets + l.ppe_net + l.intangibles + l.goodwill - l.total_assets,
  'current liabilities': (l) =>
    l.payables + l.accrued_liabilities + l.tax_payable + l.short_term_debt - l.current_liabilities,
  'total liabilities': (l) =>
    l.current_liabilities + l.senior_debt + l.junior_debt + l.lease_liabilities - l.total_liabilities,
  'gross profit': (l) => l.revenue - l.cogs - l.gross_profit,
  ebit: (l) =>
    l.gross_profit +
    l.other_operating_income -
    l.sga -
    l.research_development -
    l.rent_expense -
    l.other_operating_expense -
    l.depreciation -
    l.amortisation -
    l.ebit,
  'profit before tax': (l) => l.ebit - l.interest_expense + l.interest_income - l.profit_before_tax,
  'net income': (l) => l.profit_before_tax - l.income_tax - l.net_income,
  investing: (l) => l.capex + l.capitalised_costs_paid - l.cfi,
  financing: (l) => l.debt_drawn + l.debt_repaid + l.dividends_paid - l.cff,
  'gross above net': (l) => Math.min(0, l.ppe_gross - l.ppe_net),
  'drawn within commitment': (l) => Math.max(0, l.revolver_drawn - l.revolver_commitment),
};

const debt = (l: Lines): number => l.short_term_debt + l.senior_debt + l.junior_debt + l.lease_liabilities;
const workingCapital = (l: Lines): number =>
  l.receivables + l.inventory + l.other_current_assets - l.payables - l.accrued_liabilities - l.tax_payable;

const ROLLS: Readonly<Record<string, (l: Lines, before: Lines) => number>> = {
  'cash roll': (l, b) => l.cash - b.cash - l.cfo - l.cfi - l.cff,
  'retained earnings roll': (l, b) =>
    l.retained_earnings - b.retained_earnings - l.net_income - l.dividends_paid,
  'capital unchanged': (l, b) => l.equity - l.retained_earnings - (b.equity - b.retained_earnings),
  'debt roll': (l, b) => debt(l) - debt(b) - l.debt_drawn - l.debt_repaid,
  'net plant roll': (l, b) => l.ppe_net - b.ppe_net + l.capex + l.depreciation,
  'intangibles roll': (l, b) => l.intangibles - b.intangibles + l.capitalised_costs_paid + l.amortisation,
  'cash from operations': (l, b) =>
    l.net_income + l.depreciation + l.amortisation - (workingCapital(l) - workingCapital(b)) - l.cfo,
  'tax paid': (l, b) => b.tax_payable + l.income_tax + l.tax_paid - l.tax_payable,
  'interest paid': (l) => l.interest_expense + l.interest_paid,
};

/** "day identity: difference in thousands", empty where everything ties; fractions are faults too. */
export function faultsOf(quarters: readonly DemoQuarter[]): string[] {
  return quarters.flatMap(({ quarterEnd, lines }, index) => {
    const before = quarters[index - 1]?.lines;
    const differences = [
      ...Object.entries(WITHIN).map(([name, difference]) => [name, difference(lines)] as const),
      ...(before ? Object.entries(ROLLS) : []).map(
        ([name, difference]) => [name, difference(lines, before ?? lines)] as const,
      ),
      ...Object.entries(lines).map(([name, amount]) => [name, amount - Math.trunc(amount)] as const),
    ];
    return differences.flatMap(([name, difference]) =>
      difference === 0 ? [] : [`${quarterEnd} ${name}: ${difference}`],
    );
  });
}
