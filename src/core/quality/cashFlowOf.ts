/** The cash flow figures of twelve months, from the cash flow statement or, marked, from two balance sheets. */
import { ifAll, NOW, YEAR_AGO, type AccountsAt, type Back } from './accountsAt.ts';
import type { PeerFigure } from './peerFigures.ts';
import { workingCapital } from './workingCapital.ts';

export interface CashFlowFigures {
  readonly isDerived: boolean;
  readonly figures: Readonly<Partial<Record<PeerFigure, number | undefined>>>;
}

/**
 * Cash from operations, capital expenditure, capitalised costs, interest and tax paid; positive outflows.
 *
 * Without a cash flow statement they are derived from the balance sheets, but not in a year with an acquisition, which
 * the balance sheets cannot tell from accruals. Source: methods.md B2.
 *
 * @example cashFlowOf(accounts, false).isDerived // => false
 */
export function cashFlowOf(accounts: AccountsAt, isAcquirer: boolean): CashFlowFigures {
  const cfo = accounts.twelveMonths('cfo');
  if (accounts.isMissing('cfo') && !isAcquirer) {
    const derived = derivedCashFlow(accounts);
    if (derived) return { isDerived: true, figures: derived };
  }
  return {
    isDerived: false,
    figures: {
      cfo,
      capex: outflow(accounts.twelveMonths('capex')),
      capitalisedCosts: capitalisedCosts(accounts, NOW),
      capitalisedCostsPrior: capitalisedCosts(accounts, YEAR_AGO),
      interestPaid: outflow(accounts.twelveMonths('interest_paid')),
      taxPaid: outflow(accounts.twelveMonths('tax_paid')),
    },
  };
}

const outflow = (signed: number | undefined): number | undefined =>
  signed === undefined ? undefined : signed === 0 ? 0 : -signed;

/** What was paid for, else what the income statement shows as own work capitalised. */
function capitalisedCosts(accounts: AccountsAt, back: Back): number | undefined {
  const paid = outflow(accounts.optionalTwelveMonths('capitalised_costs_paid', back));
  return paid === 0 ? accounts.optionalTwelveMonths('capitalised_costs', back) : paid;
}

/**
 * Net income with depreciation, amortisation and impairment added back, less what working capital took; spending on
 * fixed assets is their rise plus what was written off. Interest and tax are those of the income statement, since
 * the changes in what is owed for them stand in working capital.
 */
function derivedCashFlow(accounts: AccountsAt): CashFlowFigures['figures'] | null {
  const writtenOff = ifAll(
    {
      depreciation: accounts.twelveMonths('depreciation_and_amortisation'),
      impairment: accounts.optionalTwelveMonths('impairment'),
    },
    ({ depreciation, impairment }) => depreciation + impairment,
  );
  const cfo = ifAll(
    {
      netIncome: accounts.twelveMonths('net_income'),
      writtenOff,
      closing: workingCapital(accounts, NOW),
      opening: workingCapital(accounts, YEAR_AGO),
    },
    (sums) => sums.netIncome + sums.writtenOff - (sums.closing - sums.opening),
  );
  if (cfo === undefined) return null;
  return {
    cfo,
    capex: ifAll(
      { closing: fixedAssets(accounts, NOW), opening: fixedAssets(accounts, YEAR_AGO), writtenOff },
      (sums) => sums.closing - sums.opening + sums.writtenOff,
    ),
    capitalisedCosts: 0,
    capitalisedCostsPrior: 0,
    interestPaid: accounts.twelveMonths('interest_expense'),
    taxPaid: accounts.twelveMonths('income_tax'),
  };
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
