/** How coming tests and movements are printed. */
import type { BreakEvenView, FirstNotMetView, ScenarioSizesView } from '../../contracts/outlook.ts';
import type { Factor, ScenarioName } from '../../core/outlook/sensitivity.ts';
import { decimal } from '../../core/money/decimal.ts';
import { formatMoney, formatShare } from '../../core/money/print.ts';
import { printOften } from '../../core/outlook/projectionWord.ts';

/** Stands with every projection. */
export const NO_FORECAST =
  'How often the tests would not be met were a borrower’s results to change as those of its peers did. It is no forecast: nothing here knows orders, plans or markets. Changes overlap and borrowers repeat, so that fewer independent cases stand behind n.';

export const FACTOR_NAMES: Readonly<Record<Factor, string>> = {
  earnings: 'EBITDA may fall',
  sales: 'Sales may fall',
  'working capital': 'Receivables and stocks may lose',
  rates: 'Interest may rise by',
  together: 'All three together',
};

export const SCENARIO_NAMES: Readonly<Record<ScenarioName, string>> = {
  'slower sales': 'Slower sales',
  'dearer money': 'Dearer money',
};

/** "24 %": of counts, where tenths would pretend. */
export const wholeShare = (share: number): string => printOften(share);

/** "2 quarters" */
export const quartersText = (quarters: number): string =>
  quarters === 1 ? '1 quarter' : `${quarters} quarters`;

const NOTHING_AT: Readonly<Record<'not met already' | 'not reached' | 'never', string>> = {
  // The same for our own trigger, which is never not met.
  'not met already': 'nothing left',
  'not reached': 'does not move it',
  never: 'not even all of it',
};

/** "12.4 %", "3.1 points"; words where there is no figure. */
export function breakEvenText(factor: Factor, found: BreakEvenView): string {
  if (found.kind === 'at') return moveText(factor, found.share);
  return found.kind === 'unknown' ? found.reason : NOTHING_AT[found.kind];
}

/** Rates move by points of the debt a year, everything else by a share of itself. */
const moveText = (factor: Factor, share: string): string =>
  factor === 'rates' ? `${decimal(share).times(100).toFixed(1)} points` : formatShare(decimal(share));

export const moneyText = (amount: string | null): string | null =>
  amount === null ? null : formatMoney(decimal(amount));

/** "sales fall 10 %, 5 % of receivables and stocks bring no cash, interest rises 2.0 points" */
export function sizesText({ salesFall, workingCapitalLoss, rateRise }: ScenarioSizesView): string {
  const parts = [
    isNought(salesFall) ? null : `sales fall ${shareText(salesFall)}`,
    isNought(workingCapitalLoss)
      ? null
      : `${shareText(workingCapitalLoss)} of receivables and stocks bring no cash`,
    isNought(rateRise) ? null : `interest rises ${moveText('rates', rateRise)}`,
  ];
  return parts.filter((part) => part !== null).join(', ') || 'nothing moves';
}

const isNought = (share: string): boolean => decimal(share).isZero();

/** A setting with the digits that it has. */
export const shareText = (share: string): string => {
  const value = decimal(share);
  return formatShare(value, { places: value.times(100).dp() });
};

/** "Net leverage first, at 12.4 %" */
export const firstText = (
  factor: Factor,
  first: FirstNotMetView | null,
  nameOf: (covenantId: number) => string,
): string => (first ? `${moveText(factor, first.share)}, ${nameOf(first.covenantId)}` : 'none');
