/** Ratio arithmetic over demo quarters, to choose debt, add-backs and levels by. The product computes its own. */
import type { DemoQuarter } from './demoLines.ts';

/** Sums the four quarters that end at the index; null before there are four. */
function lastFour(
  quarters: readonly DemoQuarter[],
  index: number,
  amount: (quarter: DemoQuarter) => number,
): number | null {
  if (index < 3) return null;
  return quarters.slice(index - 3, index + 1).reduce((sum, quarter) => sum + amount(quarter), 0);
}

export const quarterEbitda = ({ lines }: DemoQuarter): number =>
  lines.net_income +
  lines.income_tax +
  lines.interest_expense -
  lines.interest_income +
  lines.depreciation +
  lines.amortisation;

export const yearEbitda = (quarters: readonly DemoQuarter[], index: number): number | null =>
  lastFour(quarters, index, quarterEbitda);

/** Borrowings without leases. */
const grossDebt = ({ lines }: DemoQuarter): number =>
  lines.short_term_debt + lines.senior_debt + lines.junior_debt;

export const netDebt = (quarter: DemoQuarter): number => grossDebt(quarter) - quarter.lines.cash;

const atIndex = (quarters: readonly DemoQuarter[], index: number): DemoQuarter => {
  const quarter = quarters[index];
  if (!quarter) throw new RangeError(`no quarter ${index}`);
  return quarter;
};

function over(numerator: number | null, denominator: number | null): number | null {
  return numerator === null || denominator === null || denominator === 0 ? null : numerator / denominator;
}

/** Each gives null before four quarters are there. `addBacks` are of the four quarters. */
export const netLeverage = (quarters: readonly DemoQuarter[], index: number, addBacks = 0): number | null => {
  const ebitda = yearEbitda(quarters, index);
  return ebitda === null ? null : over(netDebt(atIndex(quarters, index)), ebitda + addBacks);
};

export const totalLeverage = (quarters: readonly DemoQuarter[], index: number): number | null =>
  over(grossDebt(atIndex(quarters, index)), yearEbitda(quarters, index));

export const interestCover = (quarters: readonly DemoQuarter[], index: number): number | null =>
  over(
    yearEbitda(quarters, index),
    lastFour(quarters, index, ({ lines }) => -lines.interest_paid),
  );

export const currentRatio = (quarters: readonly DemoQuarter[], index: number): number =>
  atIndex(quarters, index).lines.current_assets / atIndex(quarters, index).lines.current_liabilities;

/** Cash and what can still be drawn, in thousands. */
export const liquidity = (quarters: readonly DemoQuarter[], index: number): number => {
  const { lines } = atIndex(quarters, index);
  return lines.cash + lines.revolver_commitment - lines.revolver_drawn;
};

/** Cash from operations before interest and tax as a share of EBITDA, over four quarters. */
export const cashConversion = (quarters: readonly DemoQuarter[], index: number): number | null =>
  over(
    lastFour(quarters, index, ({ lines }) => lines.cfo - lines.interest_paid - lines.tax_paid),
    yearEbitda(quarters, index),
  );

/** Days of the quarter's sales that customers owe; quarters counted as 91 days. */
export const receivableDays = ({ lines }: DemoQuarter): number => (lines.receivables / lines.revenue) * 91;
