/** The cash flow figures of twelve months, from the cash flow statement or, marked, from two balance sheets. */
import { ifAll, NOW, YEAR_AGO, type AccountsAt, type Back } from './accountsAt.ts';
import { acquisitionsOf } from './acquisitions.ts';
import { workingCapital } from './workingCapital.ts';

export type CashFlowFigure =
  'cfo' | 'capex' | 'capitalisedCosts' | 'capitalisedCostsPrior' | 'interestPaid' | 'taxPaid';
type Reads = Readonly<Record<CashFlowFigure, (accounts: AccountsAt) => number | undefined>>;

/**
 * Whether cash from operations has to be derived from the balance sheets and can be: there is no cash flow statement,
 * and no acquisition in the year, which the balance sheets could not tell from accruals. Source: methods.md B2.
 *
 * @example isDerivedCashFlow(accounts) // => false
 */
export const isDerivedCashFlow = (accounts: AccountsAt): boolean =>
  accounts.isMissing('cfo') && !acquisitionsOf(accounts).inYear && derivedCash(accounts) !== undefined;

/**
 * Cash from operations, capital expenditure, capitalised costs, interest and tax paid; positive outflows.
 *
 * @example cashFlowOf(accounts, 'cfo') // => undefined
 */
export const cashFlowOf = (accounts: AccountsAt, figure: CashFlowFigure): number | undefined =>
  (isDerivedCashFlow(accounts) ? DERIVED : STATED)[figure](accounts);

const STATED: Reads = {
  cfo: ({ twelveMonths }) => twelveMonths('cfo'),
  capex: ({ twelveMonths }) => outflow(twelveMonths('capex')),
  capitalisedCosts: (accounts) => capitalisedCosts(accounts, NOW),
  capitalisedCostsPrior: (accounts) => capitalisedCosts(accounts, YEAR_AGO),
  interestPaid: ({ twelveMonths }) => outflow(twelveMonths('interest_paid')),
  taxPaid: ({ twelveMonths }) => outflow(twelveMonths('tax_paid')),
};

const outflow = (signed: number | undefined): number | undefined =>
  signed === undefined ? undefined : signed === 0 ? 0 : -signed;

/** What was paid for, else what the income statement shows as own work capitalised. */
function capitalisedCosts(accounts: AccountsAt, back: Back): number | undefined {
  const paid = outflow(accounts.optionalTwelveMonths('capitalised_costs_paid', back));
  return paid === 0 ? accounts.optionalTwelveMonths('capitalised_costs', back) : paid;
}

/**
 * Depreciation, amortisation and impairment of twelve months.
 *
 * @example writtenOff(accounts) // => 3700000
 */
export const writtenOff = (accounts: AccountsAt): number | undefined =>
  ifAll(
    {
      depreciation: accounts.twelveMonths('depreciation_and_amortisation'),
      impairment: accounts.optionalTwelveMonths('impairment'),
    },
    ({ depreciation, impairment }) => depreciation + impairment,
  );

/** Net income with what was written off added back, less what working capital took. */
function derivedCash(accounts: AccountsAt): number | undefined {
  return ifAll(
    {
      netIncome: accounts.twelveMonths('net_income'),
      writtenOff: writtenOff(accounts),
      closing: workingCapital(accounts, NOW),
      opening: workingCapital(accounts, YEAR_AGO),
    },
    (sums) => sums.netIncome + sums.writtenOff - (sums.closing - sums.opening),
  );
}

const fixedAssets = (accounts: AccountsAt, back: Back): number | undefined =>
  ifAll(
    {
      ppe: accounts.balance('ppe_net', back),
      intangibles: accounts.optionalBalance('intangibles', back),
      goodwill: accounts.optionalBalance('goodwill', back),
    },
    (parts) => parts.ppe + parts.intangibles + parts.goodwill,
  );

/**
 * Spending on fixed assets is their rise plus what was written off. Interest and tax are those of the income
 * statement, since the changes in what is owed for them stand in working capital.
 */
const DERIVED: Reads = {
  cfo: derivedCash,
  capex: (accounts) =>
    ifAll(
      {
        closing: fixedAssets(accounts, NOW),
        opening: fixedAssets(accounts, YEAR_AGO),
        writtenOff: writtenOff(accounts),
      },
      (sums) => sums.closing - sums.opening + sums.writtenOff,
    ),
  capitalisedCosts: () => 0,
  capitalisedCostsPrior: () => 0,
  interestPaid: ({ twelveMonths }) => twelveMonths('interest_expense'),
  taxPaid: ({ twelveMonths }) => twelveMonths('income_tax'),
};
