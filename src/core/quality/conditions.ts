/** What makes a comparison weaker and is said where the number is shown: seasons, first quarters, negative equity. */
import { ifAll, type AccountsAt } from './accountsAt.ts';
import { QUALITY_TABLE } from './qualityTable.ts';
import type { QuarterScore } from './score.ts';
import { percent } from './wording.ts';

/** Own rule: a business whose strongest quarter brings more of the year than this is called seasonal. */
const SEASONAL_SHARE = 0.33;

/**
 * The conditions of the latest quarter end. Source: methods.md B5 and B6.
 *
 * @example conditionsOf(accounts, [{ score: 61 }]) // => ['Only 1 of the last three quarter ends is scored: the headline rests on it alone.']
 */
export const conditionsOf = (
  accounts: AccountsAt,
  headlineQuarters: readonly Pick<QuarterScore, 'score'>[],
): readonly string[] =>
  [seasons(accounts), firstQuarters(headlineQuarters), negativeEquity(accounts)].filter(
    (remark) => remark !== null,
  );

function seasons({ quarter }: AccountsAt): string | null {
  const revenue = [0, 3, 6, 9].map((months) => quarter('revenue', { months }));
  const share = ifAll(
    { one: revenue[0], two: revenue[1], three: revenue[2], four: revenue[3] },
    (quarters) => {
      const amounts = Object.values(quarters);
      const year = amounts.reduce((sum, amount) => sum + amount, 0);
      return year > 0 ? Math.max(...amounts) / year : 0;
    },
  );
  return share !== undefined && share > SEASONAL_SHARE
    ? `The business is seasonal: its strongest quarter brings ${percent(share)} of the year's revenue. Only twelve months and the same quarter a year before are compared.`
    : null;
}

function firstQuarters(quarters: readonly Pick<QuarterScore, 'score'>[]): string | null {
  const scored = quarters.filter(({ score }) => score !== null).length;
  if (scored === 0 || scored >= QUALITY_TABLE.headlineQuarters) return null;
  return scored === 1
    ? 'Only 1 of the last three quarter ends is scored: the headline rests on it alone.'
    : 'Only 2 of the last three quarter ends are scored: the headline is their mean.';
}

function negativeEquity({ balance }: AccountsAt): string | null {
  const equity = balance('equity');
  return equity !== undefined && equity < 0
    ? 'Equity is negative: distress scores that rest on it are drawn down by that alone; the score of reporting quality does not use it.'
    : null;
}
