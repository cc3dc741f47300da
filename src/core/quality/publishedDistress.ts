/** Distress scores, which stand beside the score and never inside: methods.md B1 items 11 to 13. Nothing is filled in. */
import { altmanZ, ohlsonO, zmijewskiX } from '../accruals/distressScores.ts';
import { YEAR_AGO } from './accountsAt.ts';
import { figureReader } from './figureReader.ts';
import type { PublishedContext } from './publishedContext.ts';
import type { Given, Measures } from './publishedMeasure.ts';

/** Of US prices over 1968 = 100, from memory; a tenth more or less moves O by 0.04. */
const PRICE_LEVEL = 680;

/** Currencies taken for dollars in the size of assets: none is further off than moves O by a quarter. */
const NEAR_DOLLARS: readonly string[] = ['USD', 'EUR', 'GBP', 'CHF', 'CAD', 'AUD', 'NZD', 'SGD'];

/**
 * Z′, Z″, O and X out of twelve months and the closing balance sheet.
 *
 * @example 'missing' in distressMeasures({ accounts: () => accounts, currency: 'EUR' }).ohlson // => true
 */
export function distressMeasures({
  accounts,
  currency,
}: Pick<PublishedContext, 'accounts' | 'currency'>): Measures {
  return {
    ...altman(accounts()),
    ohlson: ohlson(accounts(), currency),
    zmijewski: zmijewski(accounts()),
  };
}

type Accounts = ReturnType<PublishedContext['accounts']>;

function altman(accounts: Accounts): Measures {
  const figures = figureReader(accounts);
  const assets = figures.balance('total_assets');
  const liabilities = figures.balance('total_liabilities');
  const equity = figures.balance('equity');
  const ratios = {
    workingCapitalOverAssets:
      (figures.balance('current_assets') - figures.balance('current_liabilities')) / assets,
    retainedEarningsOverAssets: figures.balance('retained_earnings') / assets,
    ebitOverAssets: figures.flow('ebit') / assets,
    equityOverLiabilities: equity / liabilities,
    salesOverAssets: figures.flow('revenue') / assets,
  };
  const gap = figures.gap() ?? notPositive({ 'total assets': assets, 'total liabilities': liabilities });
  if (gap !== null) return { 'altman-private': { missing: gap }, 'altman-any-trade': { missing: gap } };
  const remarks = equity < 0 ? ['equity is negative, which alone draws it down'] : [];
  return {
    'altman-private': { value: altmanZ('private', ratios).z, remarks },
    'altman-any-trade': { value: altmanZ('anyTrade', ratios).z, remarks },
  };
}

function ohlson(accounts: Accounts, currency: string): Given {
  const figures = figureReader(accounts);
  const [netIncome, netIncomePrior] = [figures.flow('net_income'), figures.flow('net_income', YEAR_AGO)];
  const sums = {
    ...sheetTotals(figures),
    netIncome,
    netIncomePrior,
    fundsFromOperations:
      netIncome + figures.flow('depreciation_and_amortisation') + figures.optionalFlow('impairment'),
    hasTwoLosses: netIncome < 0 && netIncomePrior < 0,
  };
  const gap = figures.gap() ?? notPositive(positiveIn(sums, 'current assets', sums.currentAssets));
  if (gap !== null) return { missing: gap };
  if (!NEAR_DOLLARS.includes(currency))
    return { missing: `the size of assets is in ${currency}, the model wants dollars` };
  const { score } = ohlsonO({ ...sums, realAssets: sums.totalAssets / PRICE_LEVEL });
  return {
    value: score,
    remarks: currency === 'USD' ? [] : [`${currency} taken for dollars in the size of assets`],
  };
}

function zmijewski(accounts: Accounts): Given {
  const figures = figureReader(accounts);
  const sums = { ...sheetTotals(figures), netIncome: figures.flow('net_income') };
  const gap = figures.gap() ?? notPositive(positiveIn(sums, 'current liabilities', sums.currentLiabilities));
  return gap === null ? { value: zmijewskiX(sums).score } : { missing: gap };
}

const sheetTotals = (figures: ReturnType<typeof figureReader>) => ({
  totalAssets: figures.balance('total_assets'),
  totalLiabilities: figures.balance('total_liabilities'),
  currentAssets: figures.balance('current_assets'),
  currentLiabilities: figures.balance('current_liabilities'),
});

const positiveIn = (
  { totalAssets, totalLiabilities }: { readonly totalAssets: number; readonly totalLiabilities: number },
  name: string,
  value: number,
): Readonly<Record<string, number>> => ({
  'total assets': totalAssets,
  'total liabilities': totalLiabilities,
  [name]: value,
});

/** There is no ratio on a denominator that is not positive. */
function notPositive(denominators: Readonly<Record<string, number>>): string | null {
  const names = Object.entries(denominators).flatMap(([name, value]) => (value > 0 ? [] : [name]));
  return names.length === 0 ? null : `not positive: ${names.join(', ')}`;
}
