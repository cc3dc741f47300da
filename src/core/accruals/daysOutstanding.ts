const DAYS_IN_QUARTER = 365 / 4;

/** Days of a flow that a balance stands for, at two dates a year apart. */
export interface DaysChange {
  readonly days: number;
  readonly daysYearAgo: number;
  /** Relative change: 0.25 for a quarter more days. */
  readonly change: number;
}

/** A balance and the flow that fed it, at a quarter end and a year before. */
export interface DaysInputs {
  readonly balance: number;
  readonly flow: number;
  readonly balanceYearAgo: number;
  readonly flowYearAgo: number;
  /** Quarters that the flow covers: 1 for receivables on sales, 2 for inventory on cost of sales. */
  readonly quarters: number;
}

/**
 * Days outstanding against the same quarter a year ago, so that seasons cancel.
 *
 * Own measure (methods.md B5, dampers). Null where a flow is not positive, where nothing stood a year ago, and for a
 * firm that has none in both years: none is not zero days.
 *
 * @example daysOutstanding({ balance: 27, flow: 34, balanceYearAgo: 20, flowYearAgo: 30, quarters: 1 })?.change // => 0.191…
 */
export function daysOutstanding(inputs: DaysInputs): DaysChange | null {
  const { balance, flow, balanceYearAgo, flowYearAgo, quarters } = inputs;
  if (flow <= 0 || flowYearAgo <= 0 || balanceYearAgo <= 0 || balance < 0) return null;
  const days = (balance / flow) * quarters * DAYS_IN_QUARTER;
  const daysYearAgo = (balanceYearAgo / flowYearAgo) * quarters * DAYS_IN_QUARTER;
  return { days, daysYearAgo, change: days / daysYearAgo - 1 };
}
