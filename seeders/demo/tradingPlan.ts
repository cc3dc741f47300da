import { addMonthsToMonthEnd, daysBetween, type PlainDate } from '../../src/core/calendar/plainDate.ts';
import type { SectorProfile } from './sectorProfiles.ts';

/** How one quarter departs from the sector's ordinary course; 1 and 0 are no departure. */
export interface QuarterShape {
  /** Multiplies revenue. */
  readonly revenue?: number;
  /** Added to the cost of sales' share of revenue. */
  readonly extraCostShare?: number;
  /** Multiply the days. */
  readonly receivableDays?: number;
  readonly inventoryDays?: number;
}

/** A quarter on the calendar. */
export interface CalendarQuarter {
  readonly end: PlainDate;
  /** 3, 6, 9 or 12. */
  readonly month: number;
  readonly days: number;
}

/** Eighteen are the fewest of which twelve are usable for accrual noise. */
export const QUARTERS_REPORTED = 18;
/** Quarters before the first reported one, in which the opening position settles. */
export const QUARTERS_BEFORE = 2;

/** The reported quarters up to the latest, and those before them. */
export const quartersUpTo = (latest: PlainDate): CalendarQuarter[] =>
  Array.from({ length: QUARTERS_BEFORE + QUARTERS_REPORTED }, (_, index) => {
    const end = addMonthsToMonthEnd(latest, -3 * (QUARTERS_BEFORE + QUARTERS_REPORTED - 1 - index));
    const days = daysBetween(addMonthsToMonthEnd(end, -3), end);
    return { end, month: Number(end.slice(5, 7)), days };
  });

/** A property that is valued every so often; between two valuations sheets carry the last one forward. */
export interface DemoProperty {
  /** Of gross plant on the day of a valuation. */
  readonly valueShare: number;
  readonly quartersBetweenValuations: number;
  /** Of EBITDA; null where the property has no income of its own. */
  readonly incomeShare: number | null;
}

export interface TradingPlan {
  /** Text that the random course is drawn from: same text, same course. */
  readonly seed: string;
  readonly calendar: readonly CalendarQuarter[];
  readonly fiscalYearEndMonth: number;
  readonly profile: SectorProfile;
  /** Of an average quarter at the start, in thousands. */
  readonly revenue: number;
  readonly growthPerYear: number;
  /** Term loan at the start, in thousands. */
  readonly termDebt: number;
  /** Share of the term loan that ranks below it. */
  readonly juniorShare: number;
  readonly interestRate: number;
  /** Share of a year's net income paid out in the quarter after the year end. */
  readonly dividendShare: number;
  /** Cash at the start as a share of a year's revenue. */
  readonly openingCashShare: number;
  /** A property behind the loan; null where there is none. */
  readonly property: DemoProperty | null;
  /** 0 is the latest quarter, 1 the one before. */
  readonly shape: (quartersBeforeLatest: number) => QuarterShape;
}

export const ORDINARY: TradingPlan['shape'] = () => ({});
