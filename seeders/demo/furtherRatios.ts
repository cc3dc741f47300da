/** Ratio arithmetic of the further covenants over demo quarters, in thousands, apart from the product's own. */
import type { DemoLine, DemoQuarter } from './demoLines.ts';
import { ratesOf } from './demoRates.ts';
import { netDebt, quarterEbitda, yearEbitda } from './ratios.ts';

export type ReadingOf = (quarters: readonly DemoQuarter[], index: number) => number | null;

const at = (quarters: readonly DemoQuarter[], index: number, line: DemoLine): number =>
  quarters[index]?.lines[line] ?? Number.NaN;

const year = (quarters: readonly DemoQuarter[], index: number, line: DemoLine): number =>
  [0, 1, 2, 3].reduce((sum, before) => sum + at(quarters, index - before, line), 0);

const over = (numerator: number, denominator: number): number | null =>
  Number.isFinite(numerator / denominator) ? numerator / denominator : null;

const ebitdaOf = (quarters: readonly DemoQuarter[], index: number): number =>
  yearEbitda(quarters, index) ?? Number.NaN;

const seniorDebt = (quarters: readonly DemoQuarter[], index: number): number =>
  at(quarters, index, 'short_term_debt') + at(quarters, index, 'senior_debt');

export const seniorLeverage: ReadingOf = (quarters, index) =>
  over(seniorDebt(quarters, index), ebitdaOf(quarters, index));

export const capexOfYear = (quarters: readonly DemoQuarter[], index: number): number =>
  -year(quarters, index, 'capex') - year(quarters, index, 'capitalised_costs_paid');

const workingCapital = (quarters: readonly DemoQuarter[], index: number): number =>
  at(quarters, index, 'receivables') +
  at(quarters, index, 'inventory') +
  at(quarters, index, 'other_current_assets') -
  at(quarters, index, 'payables') -
  at(quarters, index, 'accrued_liabilities');

const debtService = (quarters: readonly DemoQuarter[], index: number): number =>
  year(quarters, index, 'scheduled_principal') - year(quarters, index, 'interest_paid');

export const debtServiceCover: ReadingOf = (quarters, index) =>
  over(
    ebitdaOf(quarters, index) +
      year(quarters, index, 'tax_paid') -
      capexOfYear(quarters, index) -
      (workingCapital(quarters, index) - workingCapital(quarters, index - 4)),
    debtService(quarters, index),
  );

export const fixedChargeCover: ReadingOf = (quarters, index) => {
  const rent = year(quarters, index, 'rent_expense');
  return over(
    ebitdaOf(quarters, index) + rent - capexOfYear(quarters, index) + year(quarters, index, 'tax_paid'),
    debtService(quarters, index) + rent,
  );
};

export const loanToValue: ReadingOf = (quarters, index) =>
  over(seniorDebt(quarters, index), at(quarters, index, 'collateral_value'));

export const debtYield: ReadingOf = (quarters, index) =>
  over(year(quarters, index, 'noi'), seniorDebt(quarters, index));

export const quickRatio: ReadingOf = (quarters, index) =>
  over(
    at(quarters, index, 'cash') + at(quarters, index, 'receivables'),
    at(quarters, index, 'current_liabilities'),
  );

export const tangibleNetWorth = (quarters: readonly DemoQuarter[], index: number): number =>
  at(quarters, index, 'equity') - at(quarters, index, 'goodwill') - at(quarters, index, 'intangibles');

/** Debt over debt and tangible net worth. */
export const gearing: ReadingOf = (quarters, index) => {
  const debt = seniorDebt(quarters, index) + at(quarters, index, 'junior_debt');
  return over(debt, debt + tangibleNetWorth(quarters, index));
};

/** By the rules at signing: leases are no debt, and their rent is a cost. */
export const frozenLeverage: ReadingOf = (quarters, index) =>
  over(
    seniorDebt(quarters, index) + at(quarters, index, 'junior_debt') - at(quarters, index, 'cash'),
    ebitdaOf(quarters, index) + year(quarters, index, 'rent_paid'),
  );

/** With leases in debt, and no more cash netted than the cap. */
export const leverageWithLeases =
  (cashCap: number): ReadingOf =>
  (quarters, index) =>
    over(
      seniorDebt(quarters, index) +
        at(quarters, index, 'junior_debt') +
        at(quarters, index, 'lease_liabilities') -
        Math.min(cashCap, at(quarters, index, 'cash')),
      ebitdaOf(quarters, index),
    );

export const ebitdaOfYear: ReadingOf = (quarters, index) => yearEbitda(quarters, index);

/** Net leverage of a pound borrower in euro: debt at the closing rate, each quarter's EBITDA at its average. */
export const leverageInEuro: ReadingOf = (quarters, index) => {
  const earnings = [0, 1, 2, 3].reduce((sum, before) => {
    const quarter = quarters[index - before];
    return quarter ? sum + quarterEbitda(quarter) * ratesOf(quarter.quarterEnd).average : Number.NaN;
  }, 0);
  const quarter = quarters[index];
  return quarter ? over(netDebt(quarter) * ratesOf(quarter.quarterEnd).closing, earnings) : null;
};

/** Net leverage with the EBITDA since one quarter before the first test, set to a year. */
export const annualisedLeverage =
  (firstTest: number): ReadingOf =>
  (quarters, index) => {
    const quarter = quarters[index];
    const since = quarters.slice(firstTest, index + 1);
    const earned = since.reduce((sum, one) => sum + quarterEbitda(one), 0);
    return quarter ? over(netDebt(quarter), (earned * 4) / since.length) : null;
  };
