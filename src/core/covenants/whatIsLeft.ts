import { MEASURES } from '../measures/index.ts';
import { formatMoney, formatShare } from '../money/print.ts';
import { isMet, isShort, type CovenantTest } from './covenantTest.ts';

/**
 * What is left before a test is not met, in the words of the covenant table: money first, then the share. Where a
 * test is not met, what is short of it: without the money, where money cured it.
 *
 * @example whatIsLeft(test) // => 'EBITDA may fall 1.9m (14.3\u00a0%)'
 */
export function whatIsLeft(test: Pick<CovenantTest, 'measure' | 'outcome' | 'reason' | 'headroom'>): string {
  const { moneyLeft, mayFall } = test.headroom;
  const { subject, charge, room = { may: 'may fall', past: 'short' } } = MEASURES[test.measure].words;
  switch (test.outcome) {
    case 'met, net cash':
      return 'Net cash: no debt to carry';
    case 'met, no charge to cover':
      return `No ${charge} to cover`;
    case 'awaiting figures':
    case 'not tested':
    case 'cannot be tested':
      return test.reason ?? test.outcome;
    default:
  }
  if (moneyLeft === null) return test.reason ?? 'Ratio has no meaning';
  if (isMet(test.outcome) && moneyLeft.lt(0)) return 'Nothing: met only as the agreement rounds';
  if (isShort(test.outcome) && moneyLeft.gte(0))
    return moneyLeft.isZero()
      ? 'Nothing: at its level, which is not enough'
      : 'Nothing: not met as the agreement rounds';
  const share = mayFall === null ? '' : ` (${formatShare(mayFall.abs())})`;
  return moneyLeft.lt(0)
    ? `${subject} ${formatMoney(moneyLeft.abs())} ${room.past}${share}`
    : `${subject} ${room.may} ${formatMoney(moneyLeft)}${share}`;
}
