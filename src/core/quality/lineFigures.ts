/** How each figure that a borrower brings to the comparison is read from its lines. */
import { ifAll, TWO_YEARS_AGO, YEAR_AGO, type AccountsAt } from './accountsAt.ts';
import { cashFlowOf, writtenOff } from './cashFlowOf.ts';
import { dayFlow } from './dayFlows.ts';
import type { PeerFigure } from './peerFigures.ts';
import { workingCapital } from './workingCapital.ts';

/** Computed out of many lines over years: screens and noise have files of their own. */
type ManyLineFigure = 'mScore' | 'fScore' | 'accrualNoise';
/** Needed by published models beside the score alone. */
const BESIDE_FIGURES = [
  'netIncomePrior',
  'revenueBefore',
  'productionCosts',
  'discretionaryExpenses',
] as const;
type BesideFigure = (typeof BESIDE_FIGURES)[number];
export type LineFigure = Exclude<PeerFigure, ManyLineFigure | BesideFigure>;

type Read = (accounts: AccountsAt) => number | undefined;

const READ: Readonly<Record<LineFigure, Read>> = {
  assets: ({ balance }) => balance('total_assets'),
  assetsPrior: ({ balance }) => balance('total_assets', YEAR_AGO),
  netIncome: ({ twelveMonths }) => twelveMonths('net_income'),
  impairmentAfterTax,
  revenue: ({ twelveMonths }) => twelveMonths('revenue'),
  revenuePrior: ({ twelveMonths }) => twelveMonths('revenue', YEAR_AGO),
  ppeGross: ({ balance }) => balance('ppe_gross'),
  ppeNet: ({ balance }) => balance('ppe_net'),
  ebitda: (accounts) => accounts.ebitda(),
  receivables: ({ balance }) => balance('receivables'),
  receivablesPrior: ({ balance }) => balance('receivables', YEAR_AGO),
  inventory: ({ optionalBalance }) => optionalBalance('inventory'),
  inventoryPrior: ({ optionalBalance }) => optionalBalance('inventory', YEAR_AGO),
  nwcPrior: (accounts) => workingCapital(accounts, YEAR_AGO),
  workingCapitalAccruals,
  cfo: (accounts) => cashFlowOf(accounts, 'cfo'),
  capex: (accounts) => cashFlowOf(accounts, 'capex'),
  capitalisedCosts: (accounts) => cashFlowOf(accounts, 'capitalisedCosts'),
  capitalisedCostsPrior: (accounts) => cashFlowOf(accounts, 'capitalisedCostsPrior'),
  interestPaid: (accounts) => cashFlowOf(accounts, 'interestPaid'),
  taxPaid: (accounts) => cashFlowOf(accounts, 'taxPaid'),
  revenueQuarter: (accounts) => dayFlow(accounts, 'revenue', 1),
  revenueQuarterPrior: (accounts) => dayFlow(accounts, 'revenue', 1, YEAR_AGO),
  cogsTwoQuarters: (accounts) => dayFlow(accounts, 'cogs', 2),
  cogsTwoQuartersPrior: (accounts) => dayFlow(accounts, 'cogs', 2, YEAR_AGO),
};

export const LINE_FIGURES = Object.keys(READ) as readonly LineFigure[];

/** Those that two presentations of the cash flow statement do not give alike. */
export const UNDER_ONE_PRESENTATION: readonly LineFigure[] = [
  'cfo',
  'interestPaid',
  'taxPaid',
  'workingCapitalAccruals',
];

const READ_BESIDE: Readonly<Record<BesideFigure, Read>> = {
  netIncomePrior: ({ twelveMonths }) => twelveMonths('net_income', YEAR_AGO),
  revenueBefore: ({ twelveMonths }) => twelveMonths('revenue', TWO_YEARS_AGO),
  productionCosts: ({ twelveMonths, optionalBalance }) =>
    ifAll(
      {
        cogs: twelveMonths('cogs'),
        closing: optionalBalance('inventory'),
        opening: optionalBalance('inventory', YEAR_AGO),
      },
      ({ cogs, closing, opening }) => cogs + closing - opening,
    ),
  discretionaryExpenses: ({ twelveMonths, optionalTwelveMonths }) =>
    ifAll(
      { overheads: twelveMonths('sga'), research: optionalTwelveMonths('research_development') },
      ({ overheads, research }) => overheads + research,
    ),
};

/**
 * The figures that only published models beside the score need; none where they rest on accounts that do not tie.
 *
 * @example figuresBeside(accounts) // => {}
 */
export function figuresBeside(accounts: AccountsAt): Readonly<Partial<Record<BesideFigure, number>>> {
  const read = BESIDE_FIGURES.map((figure) => [figure, READ_BESIDE[figure](accounts)] as const);
  if (accounts.used().some(({ tie }) => tie === 'does-not-tie')) return {};
  return Object.fromEntries(read.filter(([, value]) => value !== undefined));
}

/**
 * One figure, positive where it is paid; undefined where a line is missing or has no meaning.
 *
 * @example readFigure('revenue', accounts) // => 90000000
 */
export const readFigure = (figure: LineFigure, accounts: AccountsAt): number | undefined =>
  READ[figure](accounts);

/** The highest rate of tax that is believed when impairment is taken after tax. */
const HIGHEST_TAX_RATE = 0.5;

/** Own rule: the year's effective rate, none where there is no profit to set it off against. */
function impairmentAfterTax(accounts: AccountsAt): number | undefined {
  const impairment = accounts.optionalTwelveMonths('impairment');
  if (impairment === undefined || impairment === 0) return impairment;
  const profit = accounts.twelveMonths('profit_before_tax');
  const tax = accounts.twelveMonths('income_tax');
  const rate =
    profit !== undefined && tax !== undefined && profit > 0
      ? Math.min(HIGHEST_TAX_RATE, Math.max(0, tax / profit))
      : 0;
  return impairment * (1 - rate);
}

/** What earnings hold beyond cash and what was written off over twelve months; by the cash flow statement. */
function workingCapitalAccruals(accounts: AccountsAt): number | undefined {
  return ifAll(
    {
      netIncome: accounts.twelveMonths('net_income'),
      writtenOff: writtenOff(accounts),
      cfo: cashFlowOf(accounts, 'cfo'),
    },
    (sums) => sums.netIncome + sums.writtenOff - sums.cfo,
  );
}
