/**
 * Eighteen quarters of three statements that tie exactly, in whole thousands: every figure is an integer before
 * anything is added up, so that no subtotal is a rounding away from its parts.
 */
import type { DemoQuarter } from './demoLines.ts';
import { openingPosition, type Position } from './openingPosition.ts';
import { randomNumbers, type RandomNumbers } from './randomNumbers.ts';
import { quarterEbitda } from './ratios.ts';
import { tradeQuarter, type QuarterDraw } from './tradeQuarter.ts';
import { QUARTERS_BEFORE, type TradingPlan } from './tradingPlan.ts';

export function tradingYears(plan: TradingPlan): DemoQuarter[] {
  const random = randomNumbers(plan.seed);
  let position: Position = openingPosition(plan);
  const quarters = plan.calendar.map((quarter, index): DemoQuarter => {
    const before = plan.calendar.length - 1 - index;
    const traded = tradeQuarter(plan, position, { index, before, quarter, draw: drawQuarter(random) });
    position = traded.closing;
    return { quarterEnd: quarter.end, lines: traded.lines };
  });
  return withProperty(plan, withCommitment(quarters.slice(QUARTERS_BEFORE)));
}

function drawQuarter(random: RandomNumbers): QuarterDraw {
  return {
    revenue: random.wobble(),
    cost: random.wobble(),
    receivableDays: random.wobble(),
    inventoryDays: random.wobble(),
    payableDays: random.wobble(),
    capex: random.wobble(),
  };
}

/** One commitment for the whole course: a quarter above the most that was drawn, and a twelfth of a year's revenue at least. */
function withCommitment(quarters: readonly DemoQuarter[]): DemoQuarter[] {
  const mostDrawn = Math.max(...quarters.map((quarter) => quarter.lines.revolver_drawn));
  const yearOfRevenue = quarters.slice(-4).reduce((sum, quarter) => sum + quarter.lines.revenue, 0);
  const commitment = Math.ceil(Math.max(mostDrawn * 1.25, yearOfRevenue / 12) / 500) * 500;
  return quarters.map((quarter) => ({
    ...quarter,
    lines: { ...quarter.lines, revolver_commitment: commitment },
  }));
}

/** Valued on the first quarter end, on the third, and so many quarters after each valuation. */
function withProperty({ property }: TradingPlan, quarters: readonly DemoQuarter[]): DemoQuarter[] {
  if (!property) return [...quarters];
  let valued = 0;
  return quarters.map((quarter, index) => {
    const { lines } = quarter;
    if (index === 0 || isValued(index, property.quartersBetweenValuations))
      valued = Math.round((lines.ppe_gross * property.valueShare) / 100) * 100;
    const noi = property.incomeShare === null ? 0 : Math.round(quarterEbitda(quarter) * property.incomeShare);
    return { ...quarter, lines: { ...lines, collateral_value: valued, noi } };
  });
}

const isValued = (index: number, quartersBetween: number): boolean =>
  index >= FIRST_REGULAR_VALUATION && (index - FIRST_REGULAR_VALUATION) % quartersBetween === 0;

const FIRST_REGULAR_VALUATION = 2;
