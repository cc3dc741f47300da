import { ifAll, NOW, QUARTER_AGO, YEAR_AGO, type AccountsAt, type Back } from './accountsAt.ts';

/**
 * Whether there are no quarterly income statements, so that days are counted on the year's flows.
 *
 * @example hasDaysOnYear(accounts) // => true
 */
export const hasDaysOnYear = ({ hasQuarter }: AccountsAt): boolean =>
  !hasQuarter('revenue') || !hasQuarter('revenue', YEAR_AGO);

/**
 * The flow of so many quarters that days are counted on; the year's share where there are no quarterly income
 * statements.
 *
 * @example dayFlow(accounts, 'revenue', 1, { months: 0 }) // => 22500000
 */
export function dayFlow(
  accounts: AccountsAt,
  line: 'revenue' | 'cogs',
  quarters: 1 | 2,
  back: Back = NOW,
): number | undefined {
  if (hasDaysOnYear(accounts)) {
    const year = accounts.twelveMonths(line, back);
    return year === undefined ? undefined : (year * quarters) / 4;
  }
  const latest = accounts.quarter(line, back);
  if (quarters === 1) return latest;
  const before = accounts.quarter(line, { months: back.months + QUARTER_AGO.months });
  return ifAll({ latest, before }, (flows) => flows.latest + flows.before);
}
