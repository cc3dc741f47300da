/** The two published screens out of a borrower's statements: Beneish's M and the F of Dechow et al. */
import {
  beneishIndices,
  mScore,
  type BeneishFigures,
  type BeneishIndex,
  type BeneishIndices,
} from '../accruals/beneish.ts';
import { fScore, type FScore } from '../accruals/fScore.ts';
import { totalAccruals } from '../accruals/netOperatingAssets.ts';
import { NOW, TWO_YEARS_AGO, YEAR_AGO, type AccountsAt, type Back } from './accountsAt.ts';
import { allCash, longTermDebt, operatingSheet } from './balanceSheets.ts';
import { figureReader, type FigureReader } from './figureReader.ts';

/** A screen that can be given, or why it cannot. */
export type Screened<Score> = Score | { readonly missing: string };

export interface MScreen {
  readonly score: number;
  /** Five variables where there is no cash flow statement. */
  readonly form: 'M8' | 'M5';
  readonly indices: BeneishIndices;
  /** Indices that stand at one because they are missing. */
  readonly filled: readonly BeneishIndex[];
}

const M8_NEEDS: readonly BeneishIndex[] = ['dsri', 'gmi', 'sgi', 'lvgi', 'tata'];
const M5_NEEDS: readonly BeneishIndex[] = ['dsri', 'gmi', 'sgi'];

const INDEX_NAMES: Readonly<Record<BeneishIndex, string>> = {
  dsri: 'receivables over sales',
  gmi: 'gross margin',
  aqi: 'asset quality',
  sgi: 'sales growth',
  depi: 'depreciation rate',
  sgai: 'overheads over sales',
  lvgi: 'leverage',
  tata: 'accruals over assets',
};

/**
 * The M-score of twelve months against the twelve before: eight variables, or five where `hasCashFlow` is false.
 *
 * Depreciation, overheads and asset quality may stand at one. Income from continuing operations is net income, since
 * our lines know no discontinued ones. Source: methods.md B1 item 6 and B2.
 *
 * @example 'missing' in mScreen(accounts, true) // => true
 */
export function mScreen(accounts: AccountsAt, hasCashFlow: boolean): Screened<MScreen> {
  const indices = beneishIndices(
    beneishYear(accounts, NOW, hasCashFlow),
    beneishYear(accounts, YEAR_AGO, hasCashFlow),
  );
  const form = hasCashFlow ? 'M8' : 'M5';
  const gaps = (hasCashFlow ? M8_NEEDS : M5_NEEDS).filter((name) => indices[name] === null);
  if (gaps.length > 0)
    return {
      missing: `no index of ${gaps.map((name) => INDEX_NAMES[name]).join(', ')} against the year before`,
    };
  const gap = figureReader(accounts).gap();
  if (gap !== null) return { missing: gap };
  const { m8, m5, filled } = mScore(indices);
  const score = form === 'M8' ? m8 : m5;
  if (score === null) throw new Error(`${form} is missing though its indices are there`);
  return { score, form, indices, filled };
}

function beneishYear(accounts: AccountsAt, back: Back, hasCashFlow: boolean): BeneishFigures {
  const debt = longTermDebt(figureReader(accounts), back);
  return present({
    receivables: accounts.balance('receivables', back),
    currentAssets: accounts.balance('current_assets', back),
    ppeNet: accounts.balance('ppe_net', back),
    // Not a number rather than left out, which would be none: once carried a blank is missing, and with it the index.
    longTermSecurities: accounts.optionalBalance('investments', back) ?? NaN,
    totalAssets: accounts.balance('total_assets', back),
    currentLiabilities: accounts.balance('current_liabilities', back),
    longTermDebt: Number.isNaN(debt) ? undefined : debt,
    sales: accounts.twelveMonths('revenue', back),
    costOfSales: accounts.twelveMonths('cogs', back),
    sellingAndAdministrative: accounts.twelveMonths('sga', back),
    incomeFromContinuingOperations: accounts.twelveMonths('net_income', back),
    cashFromOperations: hasCashFlow ? accounts.twelveMonths('cfo', back) : undefined,
    depreciation: accounts.twelveMonths('depreciation', back),
  });
}

const present = <Name extends string>(
  figures: Readonly<Record<Name, number | undefined>>,
): Readonly<Partial<Record<Name, number>>> =>
  Object.fromEntries(Object.entries(figures).filter(([, value]) => value !== undefined)) as Partial<
    Record<Name, number>
  >;

export interface FScreen extends FScore {
  /** Whether debt or equity was issued was read off balance sheets. */
  readonly issueDerived: boolean;
}

/**
 * The F-score of twelve months: it looks two years back, for the growth of cash sales and the change of return on
 * assets. No inventory is nought. Source: methods.md B1 item 7 and B2.
 *
 * @example 'missing' in fScreen(accounts) // => true
 */
export function fScreen(accounts: AccountsAt): Screened<FScreen> {
  const figures = figureReader(accounts);
  const [opening, closing] = [operatingSheet(figures, YEAR_AGO), operatingSheet(figures, NOW)];
  const average = (opening.totalAssets + closing.totalAssets) / 2;
  const averageBefore = (figures.balance('total_assets', TWO_YEARS_AGO) + opening.totalAssets) / 2;
  const change = (line: 'receivables' | 'inventory', read: FigureReader['balance'], back: Back): number =>
    read(line, back) - read(line, { months: back.months + 12 });
  const receivablesChange = change('receivables', figures.balance, NOW);
  const cashSales = figures.flow('revenue') - receivablesChange;
  const cashSalesBefore =
    figures.flow('revenue', YEAR_AGO) - change('receivables', figures.balance, YEAR_AGO);
  const inventoryChange = change('inventory', figures.optionalBalance, NOW);
  const soft = closing.totalAssets - figures.balance('ppe_net') - allCash(figures, NOW);
  const [income, incomeBefore] = [figures.flow('net_income'), figures.flow('net_income', YEAR_AGO)];
  const issue = issued(accounts);
  const gap = figures.gap() ?? ('missing' in issue ? issue.missing : null);
  if (gap !== null || 'missing' in issue) return { missing: gap ?? '' };
  const { scaled } = totalAccruals(opening, closing);
  if (scaled === null || averageBefore <= 0 || closing.totalAssets <= 0)
    return { missing: 'average assets are not positive' };
  if (cashSalesBefore <= 0)
    return { missing: 'sales less the rise of receivables were not positive a year ago' };
  const score = fScore({
    totalAccruals: scaled,
    receivablesChange: receivablesChange / average,
    inventoryChange: inventoryChange / average,
    softAssets: soft / closing.totalAssets,
    cashSalesGrowth: cashSales / cashSalesBefore - 1,
    returnOnAssetsChange: income / average - incomeBefore / averageBefore,
    hasIssued: issue.hasIssued,
  });
  return { ...score, issueDerived: issue.isDerived };
}

/** Own rule: equity that rose by more than this share of assets beyond what was earned and kept was issued. */
const ISSUED_SHARE = 0.001;

/** Money raised, by the cash flow statement; what that does not say is read off two balance sheets. */
function issued(
  accounts: AccountsAt,
): { readonly hasIssued: boolean; readonly isDerived: boolean } | { readonly missing: string } {
  const [drawn, raised] = [accounts.twelveMonths('debt_drawn'), accounts.twelveMonths('equity_issued')];
  if ((drawn ?? 0) > 0 || (raised ?? 0) > 0) return { hasIssued: true, isDerived: false };
  if (drawn !== undefined && raised !== undefined) return { hasIssued: false, isDerived: false };
  const figures = figureReader(accounts);
  const debt = (back: Back): number =>
    longTermDebt(figures, back) + figures.optionalBalance('short_term_debt', back);
  if (drawn === undefined && debt(NOW) > debt(YEAR_AGO)) return { hasIssued: true, isDerived: true };
  const kept = figures.flow('net_income') + figures.optionalFlow('dividends_paid');
  const equityRise = figures.balance('equity') - figures.balance('equity', YEAR_AGO) - kept;
  const hasIssued =
    raised === undefined && equityRise > ISSUED_SHARE * figures.balance('total_assets', YEAR_AGO);
  const gap = figures.gap();
  return gap === null ? { hasIssued, isDerived: true } : { missing: gap };
}
