/** Accruals and cash conversion as they were published: methods.md B1 items 1 to 3 and 10. */
import { balanceSheetAccruals } from '../accruals/balanceSheetAccruals.ts';
import { cashFlowAccruals } from '../accruals/cashFlowAccruals.ts';
import { totalAccruals } from '../accruals/netOperatingAssets.ts';
import { NOW, YEAR_AGO } from './accountsAt.ts';
import { operatingBalances, operatingSheet } from './balanceSheets.ts';
import { conversionOf, figuresOf } from './comparedFigures.ts';
import { figureReader } from './figureReader.ts';
import { brokenSeries, missingFigures } from './missingFigures.ts';
import type { PeerInputs } from './peerFigures.ts';
import type { PublishedContext } from './publishedContext.ts';
import type { Given, Measures } from './publishedMeasure.ts';

const NO_AVERAGE = { missing: 'average assets are not positive' };

/**
 * Accruals out of two balance sheets: Sloan's, and total accruals and net operating assets of Richardson et al.
 *
 * @example 'missing' in balanceSheetMeasures({ peer, accounts: () => accounts }).sloan // => true
 */
export function balanceSheetMeasures({
  peer,
  accounts,
}: Pick<PublishedContext, 'peer' | 'accounts'>): Measures {
  const remarks = peer.acquisitionInYear
    ? ['an acquisition in the year moves the balance sheets as well']
    : [];
  return { sloan: sloan(accounts(), remarks), ...richardson(accounts(), remarks) };
}

function sloan(accounts: ReturnType<PublishedContext['accounts']>, remarks: readonly string[]): Given {
  const figures = figureReader(accounts);
  const [opening, closing] = [operatingBalances(figures, YEAR_AGO), operatingBalances(figures, NOW)];
  const depreciation = figures.flow('depreciation_and_amortisation');
  const gap = figures.gap();
  if (gap !== null) return { missing: gap };
  const { scaled } = balanceSheetAccruals(opening, closing, depreciation);
  return scaled === null ? NO_AVERAGE : { value: scaled, remarks };
}

function richardson(
  accounts: ReturnType<PublishedContext['accounts']>,
  remarks: readonly string[],
): Measures {
  const figures = figureReader(accounts);
  const [opening, closing] = [operatingSheet(figures, YEAR_AGO), operatingSheet(figures, NOW)];
  const average = (opening.totalAssets + closing.totalAssets) / 2;
  const gap = figures.gap() ?? (average > 0 ? null : NO_AVERAGE.missing);
  if (gap !== null) return { 'total-accruals': { missing: gap }, 'net-operating-assets': { missing: gap } };
  const accruals = totalAccruals(opening, closing);
  return {
    'total-accruals': { value: accruals.scaled!, remarks },
    'net-operating-assets': { value: accruals.netOperatingAssetsChange / average, remarks },
  };
}

/**
 * Accruals by the cash flow statement, plain and over the size of net income, and cash conversion; from a derived
 * cash flow where there is no statement and no acquisition, which is said.
 *
 * @example 'value' in cashFlowMeasures({ peer })['cash-flow-accruals'] // => true
 */
export function cashFlowMeasures({ peer }: Pick<PublishedContext, 'peer'>): Measures {
  const remarks = peer.derivedCashFlow ? ['cash from operations is derived from the balance sheets'] : [];
  return { ...cashAccruals(peer, remarks), ...conversions(peer, remarks) };
}

function cashAccruals(peer: PeerInputs, remarks: readonly string[]): Measures {
  const given = figuresOf(peer.figures, ['netIncome', 'cfo', 'assets', 'assetsPrior']);
  if (!given) {
    const missing =
      brokenSeries(peer) ?? missingFigures(peer, ['netIncome', 'cfo', 'assets', 'assetsPrior']) ?? '';
    return { 'cash-flow-accruals': { missing }, 'percent-accruals': { missing } };
  }
  const accruals = cashFlowAccruals({
    netIncome: given.netIncome,
    cashFromOperations: given.cfo,
    openingAssets: given.assetsPrior,
    closingAssets: given.assets,
  });
  return {
    'cash-flow-accruals':
      accruals.scaledAverage === null ? NO_AVERAGE : { value: accruals.scaledAverage, remarks },
    'percent-accruals':
      accruals.percent === null ? { missing: 'net income is nought' } : { value: accruals.percent, remarks },
  };
}

function conversions(peer: PeerInputs, remarks: readonly string[]): Measures {
  const conversion = conversionOf(peer.figures);
  if (!conversion) {
    const missing = withoutConversion(peer);
    return { 'cash-conversion': { missing }, 'growth-neutral-conversion': { missing } };
  }
  return {
    'cash-conversion': { value: conversion.conversion, remarks },
    'growth-neutral-conversion': { value: conversion.growthNeutral, remarks },
  };
}

/**
 * Why there is no cash conversion, where there is none.
 *
 * @example withoutConversion(peer) // => 'EBITDA is not above 1\u00a0% of revenue'
 */
export const withoutConversion = (peer: PeerInputs): string =>
  brokenSeries(peer) ??
  missingFigures(peer, ['ebitda', 'cfo', 'interestPaid', 'taxPaid', 'nwcPrior', 'revenue', 'revenuePrior']) ??
  (peer.figures.revenuePrior! > 0
    ? 'EBITDA is not above 1\u00a0% of revenue'
    : 'revenue of the year before is not positive');
