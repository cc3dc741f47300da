import { expect, test } from 'vitest';
import { balanceSheetAccruals } from './balanceSheetAccruals.ts';
import { cashConversion, type CashConversionInputs } from './cashConversion.ts';
import { cashFlowAccruals } from './cashFlowAccruals.ts';
import { daysOutstanding } from './daysOutstanding.ts';
import { accrualTerms } from './unexplainedAccruals.ts';

// One invented firm, two balance sheets; expected values worked by hand and in Python.
const prior = {
  currentAssets: 46,
  cash: 8,
  currentLiabilities: 26,
  shortTermDebt: 5,
  taxPayable: 1,
  totalAssets: 96,
};
const closing = {
  currentAssets: 56.5,
  cash: 7,
  currentLiabilities: 28.7,
  shortTermDebt: 6,
  taxPayable: 1.2,
  totalAssets: 110,
};

test('accruals out of balance sheets: (dCA - dCash) - (dCL - dSTD - dTP) - depreciation over average assets', () => {
  const { accruals, scaled } = balanceSheetAccruals(prior, closing, 6);
  expect(accruals).toBeCloseTo(4, 12);
  expect(scaled).toBeCloseTo(4 / 103, 12);
  expect(balanceSheetAccruals({ ...prior, totalAssets: -110 }, closing, 6).scaled).toBeNull();
});

test('accruals by the cash flow statement: net income less cash from operations', () => {
  const year = { netIncome: 5.5, cashFromOperations: 1.7, openingAssets: 96, closingAssets: 110 };
  expect(cashFlowAccruals(year).accruals).toBeCloseTo(3.8, 12);
  expect(cashFlowAccruals(year).scaledAverage).toBeCloseTo(3.8 / 103, 12);
  expect(cashFlowAccruals(year).scaledOpening).toBeCloseTo(3.8 / 96, 12);
  expect(cashFlowAccruals({ ...year, netIncome: -5.5 }).percent).toBeCloseTo(-7.2 / 5.5, 12);
  expect(cashFlowAccruals({ ...year, netIncome: 0 }).percent).toBeNull();
});

const year: CashConversionInputs = {
  ebitda: 14,
  cashFromOperations: 1.7,
  interestPaid: 2.6,
  taxPaid: 1.6,
  openingWorkingCapital: 17,
  revenue: 132,
  priorRevenue: 118,
};

test('cash conversion allows for the working capital that growth takes', () => {
  const conversion = cashConversion(year);
  expect(conversion?.conversion).toBeCloseTo(5.9 / 14, 12);
  expect(conversion?.growthAbsorption).toBeCloseTo((17 * 14) / 118, 12);
  expect(conversion?.growthNeutral).toBeCloseTo(0.565496368039, 11);
});

test('conversion has no meaning where EBITDA is not above 1 % of revenue', () => {
  expect(cashConversion({ ...year, ebitda: 1.33 })).not.toBeNull();
  expect(cashConversion({ ...year, ebitda: 1.32 })).toBeNull();
  expect(cashConversion({ ...year, ebitda: -4 })).toBeNull();
  expect(cashConversion({ ...year, priorRevenue: 0 })).toBeNull();
});

test('days stand against the same quarter a year ago', () => {
  const receivables = { balance: 27, flow: 34, balanceYearAgo: 20, flowYearAgo: 30, quarters: 1 };
  expect(daysOutstanding(receivables)?.days).toBeCloseTo(72.463235294118, 10);
  expect(daysOutstanding(receivables)?.daysYearAgo).toBeCloseTo(60.833333333333, 10);
  expect(daysOutstanding(receivables)?.change).toBeCloseTo(0.191176470588, 10);
  const inventory = { balance: 19, flow: 45, balanceYearAgo: 15, flowYearAgo: 40, quarters: 2 };
  expect(daysOutstanding(inventory)?.days).toBeCloseTo(77.055555555556, 10);
});

test('none a year ago, or no flow, gives no days rather than nought', () => {
  const inventory = { balance: 0, flow: 45, balanceYearAgo: 0, flowYearAgo: 40, quarters: 2 };
  expect(daysOutstanding(inventory)).toBeNull();
  expect(daysOutstanding({ ...inventory, balanceYearAgo: 5 })).toMatchObject({ days: 0, change: -1 });
  expect(daysOutstanding({ ...inventory, balanceYearAgo: 5, flow: 0 })).toBeNull();
  expect(daysOutstanding({ ...inventory, balanceYearAgo: 5, flowYearAgo: -1 })).toBeNull();
});

test('the wide accruals add what was spent on assets, and need assets a year before', () => {
  const inputs = {
    assetsPrior: 200,
    netIncome: 10,
    impairmentAfterTax: 2,
    cfo: 15,
    capex: 8,
    capitalisedCosts: 3,
    revenue: 110,
    revenuePrior: 100,
  };
  expect(accrualTerms(inputs)).toEqual({
    accruals: 0.04,
    reciprocalAssets: 0.005,
    revenueChange: 0.05,
    cashFlow: 0.075,
  });
  expect(accrualTerms({ ...inputs, assetsPrior: 0 })).toBeNull();
});
