import { describe, expect, test } from 'vitest';
import { currentRatio } from './currentRatio.ts';
import { gearing } from './gearing.ts';
import { minimumLiquidity } from './minimumLiquidity.ts';
import { quickRatio } from './quickRatio.ts';
import { requestOf, sheetOf, sidesOf, yearOf } from './request.fixture.ts';
import { tangibleNetWorth } from './tangibleNetWorth.ts';
import { totalLeverage } from './totalLeverage.ts';

describe('liquid assets', () => {
  // cov-053
  test('the current ratio reads both subtotals', () => {
    const sheet = sheetOf({ current_assets: 30, current_liabilities: 20 });
    expect(sidesOf(currentRatio.measure(requestOf([sheet])))).toEqual(['30', '20']);
  });

  // cov-055
  test('the quick ratio is cash and trade receivables over current liabilities', () => {
    const sheet = sheetOf({ cash: 4, receivables: 14, inventory: 8, current_liabilities: 20 });
    expect(sidesOf(quickRatio.measure(requestOf([sheet])))).toEqual(['18', '20']);
  });

  // cov-056, with 1 of the commitment under letters of credit.
  test('liquidity counts undrawn commitments only where the definition does', () => {
    const sheet = sheetOf({ cash: 4, revolver_commitment: 10, revolver_drawn: 6, letters_of_credit: 1 });
    const liquidity = (undrawnCountsAsLiquidity: boolean) =>
      sidesOf(minimumLiquidity.measure(requestOf([sheet], { definition: { undrawnCountsAsLiquidity } })));
    expect([liquidity(false), liquidity(true)]).toEqual([['4'], ['7']]);
  });

  test('a commitment that is overdrawn takes nothing from cash', () => {
    const sheet = sheetOf({ cash: 4, revolver_commitment: 10, revolver_drawn: 12 });
    expect(
      sidesOf(
        minimumLiquidity.measure(requestOf([sheet], { definition: { undrawnCountsAsLiquidity: true } })),
      ),
    ).toEqual(['4']);
  });
});

describe('net worth', () => {
  const sheet = sheetOf({
    equity: 50,
    goodwill: 18,
    intangibles: 6,
    deferred_tax_asset: 2,
    shareholder_loans: 5,
    senior_debt: 40,
  });
  const worth = (definition: Parameters<typeof requestOf>[1]) =>
    sidesOf(tangibleNetWorth.measure(requestOf([sheet], definition)));

  // cov-058: 50 - 18 - 6 + 5.
  test('is equity less goodwill and intangibles, with subordinated shareholder loans where they count', () => {
    expect(worth({ definition: { shareholderLoansInNetWorth: true } })).toEqual(['31']);
    expect(worth({})).toEqual(['26']);
  });

  // Own arithmetic: the same less a deferred tax asset of 2.
  test('leaves out a deferred tax asset where the agreement does', () => {
    expect(worth({ definition: { deferredTaxInNetWorth: false } })).toEqual(['24']);
  });

  // cov-060: 40 over 31; as a share of capital 40 over 71, own arithmetic.
  test('carries debt in gearing, by itself or together with debt as the agreement names it', () => {
    const of = (definition: 'debt to net worth' | 'debt to capital') =>
      sidesOf(
        gearing.measure(
          requestOf([sheet], { definition: { gearing: definition, shareholderLoansInNetWorth: true } }),
        ),
      );
    expect(of('debt to net worth')).toEqual(['40', '31']);
    expect(of('debt to capital')).toEqual(['40', '71']);
  });
});

describe('debt', () => {
  test('is missing where no debt line is there', () => {
    expect(sidesOf(totalLeverage.measure(requestOf([yearOf(), sheetOf({ cash: 4 })])))[0]).toBe(
      'missing senior_debt',
    );
  });
});
