import { ifAll, QUARTER_AGO, YEAR_AGO, type AccountsAt, type Back } from './accountsAt.ts';

/** Own rule: acquisitions paid, or goodwill risen, by at least 1 % of assets a year before. */
const MATERIAL_SHARE = 0.01;

export interface Acquisitions {
  readonly inYear: boolean;
  readonly thisQuarter: boolean;
}

/**
 * Whether the borrower bought another business in the twelve months, and in the quarter. Where the quarter cannot be
 * told from the year, the year's acquisition may have closed in it.
 *
 * @example acquisitionsOf(accounts) // => { inYear: false, thisQuarter: false }
 */
export function acquisitionsOf(accounts: AccountsAt): Acquisitions {
  const assets = accounts.balance('total_assets', YEAR_AGO) ?? accounts.balance('total_assets') ?? 0;
  const isMaterial = (paid: number | undefined, back: Back): boolean => {
    const goodwillRise = ifAll(
      { closing: accounts.optionalBalance('goodwill'), opening: accounts.optionalBalance('goodwill', back) },
      ({ closing, opening }) => closing - opening,
    );
    return Math.max(-(paid ?? 0), goodwillRise ?? 0) > MATERIAL_SHARE * assets;
  };
  const inYear = isMaterial(accounts.optionalTwelveMonths('acquisitions_paid'), YEAR_AGO);
  const quarter = accounts.optionalQuarter('acquisitions_paid');
  return { inYear, thisQuarter: inYear && (quarter === undefined || isMaterial(quarter, QUARTER_AGO)) };
}
