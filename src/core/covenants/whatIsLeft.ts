import { formatMoney, formatShare } from '../money/print.ts';
import type { CovenantTest } from './covenantTest.ts';

/**
 * What is left before a test is not met, in the words of the covenant table: money first, then the share. Where a
 * test is not met, what is short of it.
 *
 * @example whatIsLeft(test) // => 'EBITDA may fall 0.4m (9.2 %)'
 */
export function whatIsLeft(
  test: Pick<CovenantTest, 'measure' | 'outcome' | 'reason' | 'headroom' | 'tested' | 'level'>,
): string {
  const { moneyLeft, mayFall } = test.headroom;
  if (test.outcome === 'met, net cash') return 'Net cash: no debt to cover';
  if (test.outcome === 'met, no charge to cover') return 'No interest to cover';
  if (
    test.outcome === 'awaiting figures' ||
    test.outcome === 'not tested' ||
    test.outcome === 'cannot be tested'
  )
    return test.reason ?? test.outcome;
  if (moneyLeft === null) return test.reason ?? 'Ratio has no meaning';
  const what = SUBJECTS[test.measure];
  const share = mayFall === null ? '' : ` (${formatShare(mayFall.abs())})`;
  return moneyLeft.isNegative()
    ? `${what} ${formatMoney(moneyLeft.abs())} short${share}`
    : `${what} may fall ${formatMoney(moneyLeft)}${share}`;
}

const SUBJECTS = {
  'total-leverage': 'EBITDA',
  'net-leverage': 'EBITDA',
  'interest-cover': 'EBITDA',
  'current-ratio': 'Current assets',
  'minimum-liquidity': 'Liquidity',
} as const;
