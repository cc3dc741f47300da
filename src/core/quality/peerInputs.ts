/** From a borrower's statements to what it brings to the comparison at one quarter end. */
import { NEVER_SCORED, type BorrowerInputs } from '../borrowerInputs.ts';
import { fiscalPosition } from '../calendar/fiscalYear.ts';
import type { PlainDate } from '../calendar/plainDate.ts';
import { ebitdaOfTwelveMonths } from '../measures/ebitda.ts';
import type { Statement, Tie } from '../statements/statement.ts';
import { openBooks, type Books, type StatementBook } from '../statements/statementBook.ts';
import { accountsAt, ifAll, NOW, QUARTER_AGO, YEAR_AGO, YEAR_AND_QUARTER_AGO } from './accountsAt.ts';
import type { AccountsAt, Back } from './accountsAt.ts';
import { cashFlowOf } from './cashFlowOf.ts';
import type { PeerFigure, PeerInputs } from './peerFigures.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import { workingCapital } from './workingCapital.ts';

/** The highest rate of tax that is believed when impairment is taken after tax. */
const HIGHEST_TAX_RATE = 0.5;

/**
 * One borrower at one quarter end, amounts in its own currency units, paid items positive. Null for legal forms that
 * are never scored and where no balance sheet of that day is known by `asOf`.
 *
 * A figure that cannot be read is left out; nothing is filled in but a cash flow derived from the balance sheet,
 * which is marked. Source: methods.md B2 and B6.
 *
 * @example peerInputs(inputs, '2026-09-30', '2026-11-30')?.basis // => 'management'
 * @example peerInputs({ ...inputs, legalForm: 'bank' }, '2026-09-30', '2026-11-30') // => null
 */
export function peerInputs(
  inputs: BorrowerInputs,
  quarterEnd: PlainDate,
  asOf: PlainDate,
): PeerInputs | null {
  if (NEVER_SCORED.includes(inputs.legalForm)) return null;
  return atQuarterEnd(inputs, scoredBook(openBooks(inputs, asOf)), quarterEnd);
}

/**
 * The last quarter ends that have a balance sheet, oldest first: eight at most.
 *
 * @example peerInputsOfQuarters(inputs, '2026-11-30').length // => 8
 */
export const peerInputsOfQuarters = (inputs: BorrowerInputs, asOf: PlainDate): readonly PeerInputs[] =>
  peerInputsFrom(inputs, openBooks(inputs, asOf));

/**
 * The same out of books that are open already.
 *
 * @example peerInputsFrom(inputs, openBooks(inputs, '2026-11-30')).length // => 8
 */
export function peerInputsFrom(inputs: BorrowerInputs, books: Books): readonly PeerInputs[] {
  if (NEVER_SCORED.includes(inputs.legalForm)) return [];
  const book = scoredBook(books);
  return quarterEndsOf(book)
    .slice(-QUALITY_TABLE.historyQuarters)
    .flatMap((quarterEnd) => atQuarterEnd(inputs, book, quarterEnd) ?? []);
}

/** Fiscal quarter ends with a balance sheet, oldest first. Months between quarter ends are left out. */
const quarterEndsOf = (book: StatementBook): readonly PlainDate[] =>
  book.current
    .filter(
      ({ months, periodEnd }) =>
        months === 0 && fiscalPosition(periodEnd, book.fiscalYearEndMonth).monthsIntoYear % 3 === 0,
    )
    .map(({ periodEnd }) => periodEnd);

/** Group accounts where the borrower gives any. */
const scoredBook = (books: Books): StatementBook =>
  books.group.statements.length > 0 ? books.group : books['stand-alone'];

function atQuarterEnd(inputs: BorrowerInputs, book: StatementBook, quarterEnd: PlainDate): PeerInputs | null {
  const balanceSheet = book.statementOf(quarterEnd, 0);
  if (!balanceSheet) return null;
  const accounts = accountsAt(book, quarterEnd);
  const ebitda = accounts.sample(ebitdaOfTwelveMonths(book, quarterEnd).ebitda);
  const acquisition = acquisitionsOf(accounts);
  const cashFlow = cashFlowOf(accounts, acquisition.inYear);
  const days = dayFlows(accounts);
  const figures = given({
    assets: accounts.balance('total_assets'),
    assetsPrior: accounts.balance('total_assets', YEAR_AGO),
    netIncome: accounts.twelveMonths('net_income'),
    impairmentAfterTax: impairmentAfterTax(accounts),
    revenue: accounts.twelveMonths('revenue'),
    revenuePrior: accounts.twelveMonths('revenue', YEAR_AGO),
    ppeGross: accounts.balance('ppe_gross'),
    ppeNet: accounts.balance('ppe_net'),
    ebitda,
    receivables: accounts.balance('receivables'),
    receivablesPrior: accounts.balance('receivables', YEAR_AGO),
    inventory: accounts.optionalBalance('inventory'),
    inventoryPrior: accounts.optionalBalance('inventory', YEAR_AGO),
    nwcPrior: workingCapital(accounts, YEAR_AGO),
    ...cashFlow.figures,
    ...days.figures,
  });
  const used = accounts.used();
  const tie = worstTie(used);
  return {
    borrowerId: inputs.borrowerId,
    sector: inputs.sector,
    quarterEnd,
    ties: tie !== 'does-not-tie',
    tie,
    basis: balanceSheet.basis,
    derivedCashFlow: cashFlow.isDerived,
    cashFlowPresentationChanged: mixesPresentations(used),
    daysOnYear: days.onYear,
    figures,
    acquisitionInYear: acquisition.inYear,
    acquisitionThisQuarter: acquisition.thisQuarter,
  };
}

const given = (
  figures: Readonly<Partial<Record<PeerFigure, number | undefined>>>,
): Readonly<Partial<Record<PeerFigure, number>>> =>
  Object.fromEntries(Object.entries(figures).filter(([, value]) => value !== undefined));

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

/** Own rule: acquisitions paid, or goodwill risen, by at least 1 % of assets a year before. */
const MATERIAL_ACQUISITION = 0.01;

function acquisitionsOf(accounts: AccountsAt): { readonly inYear: boolean; readonly thisQuarter: boolean } {
  const assets = accounts.balance('total_assets', YEAR_AGO) ?? accounts.balance('total_assets') ?? 0;
  const isMaterial = (paid: number | undefined, back: Back): boolean => {
    const goodwillRise = ifAll(
      { closing: accounts.optionalBalance('goodwill'), opening: accounts.optionalBalance('goodwill', back) },
      ({ closing, opening }) => closing - opening,
    );
    return Math.max(-(paid ?? 0), goodwillRise ?? 0) > MATERIAL_ACQUISITION * assets;
  };
  const inYear = isMaterial(accounts.optionalTwelveMonths('acquisitions_paid'), YEAR_AGO);
  const quarter = accounts.optionalQuarter('acquisitions_paid');
  // Where the quarter cannot be told from the year, the year's acquisition may have closed in it.
  return { inYear, thisQuarter: inYear && (quarter === undefined || isMaterial(quarter, QUARTER_AGO)) };
}

/** The flows that days are counted on; the year's share where there are no quarterly income statements. */
function dayFlows(accounts: AccountsAt): {
  readonly figures: Readonly<Partial<Record<PeerFigure, number | undefined>>>;
  readonly onYear: boolean;
} {
  const revenueQuarter = accounts.quarter('revenue');
  const revenueQuarterPrior = accounts.quarter('revenue', YEAR_AGO);
  const twoQuarters = (latest: Back, before: Back): number | undefined =>
    ifAll(
      { latest: accounts.quarter('cogs', latest), before: accounts.quarter('cogs', before) },
      (costs) => costs.latest + costs.before,
    );
  if (revenueQuarter !== undefined && revenueQuarterPrior !== undefined) {
    return {
      figures: {
        revenueQuarter,
        revenueQuarterPrior,
        cogsTwoQuarters: twoQuarters(NOW, QUARTER_AGO),
        cogsTwoQuartersPrior: twoQuarters(YEAR_AGO, YEAR_AND_QUARTER_AGO),
      },
      onYear: false,
    };
  }
  const shareOfYear = (line: 'revenue' | 'cogs', back: Back, quarters: number): number | undefined =>
    ifAll({ year: accounts.twelveMonths(line, back) }, ({ year }) => (year * quarters) / 4);
  return {
    figures: {
      revenueQuarter: shareOfYear('revenue', NOW, 1),
      revenueQuarterPrior: shareOfYear('revenue', YEAR_AGO, 1),
      cogsTwoQuarters: shareOfYear('cogs', NOW, 2),
      cogsTwoQuartersPrior: shareOfYear('cogs', YEAR_AGO, 2),
    },
    onYear: true,
  };
}

/** From best to worst as a comparison sees it: what was not checked is taken as it is. */
const TIE_ORDER: readonly Tie[] = ['ties', 'not-checked', 'warning', 'does-not-tie'];

const worstTie = (statements: readonly Statement[]): Tie =>
  statements.reduce<Tie>(
    (worst, { tie }) => (TIE_ORDER.indexOf(tie) > TIE_ORDER.indexOf(worst) ? tie : worst),
    'ties',
  );

/** IFRS 18 moves interest and dividends out of cash from operations; two years are comparable within one rule only. */
function mixesPresentations(statements: readonly Statement[]): boolean {
  const flows = statements.filter(({ months }) => months > 0);
  const underNewRule = flows.filter(({ framework }) => /IFRS\s*18/i.test(framework)).length;
  return underNewRule > 0 && underNewRule < flows.length;
}
