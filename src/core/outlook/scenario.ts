/** What a fall of sales, of receivables and stocks, and a rise of rates come to in a test's own money. */
import type { PlainDate } from '../calendar/plainDate.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { MEASURES } from '../measures/index.ts';
import { totalDebt } from '../measures/debt.ts';
import { decimal, ZERO, type Decimal } from '../money/decimal.ts';
import type { OutlookPolicy, ScenarioSizes } from '../policy.ts';
import { balanceAt, lastTwelveMonths } from '../statements/flows.ts';
import { sumOfReadings, type Reading } from '../statements/reading.ts';
import type { StatementBook } from '../statements/statementBook.ts';
import type { Blow } from './blow.ts';
import { plainRequest } from './plainRequest.ts';

/** What shares of a scenario are taken of, on a test date; null where the accounts do not have it. */
export interface ScenarioBase {
  /** EBITDA as the test has it; null in a test without earnings, or where they are not positive. */
  readonly earnings: Decimal | null;
  /** Of twelve months. */
  readonly sales: Decimal | null;
  /** Receivables and stocks. */
  readonly workingCapital: Decimal | null;
  readonly cash: Decimal | null;
  readonly debt: Decimal | null;
}

/** Shares of one, each of its own base. Sales bring earnings down by what of them is no variable cost. */
export interface Falls extends ScenarioSizes {
  readonly earningsFall: Decimal;
}

export const NO_FALLS: Falls = {
  earningsFall: ZERO,
  salesFall: ZERO,
  workingCapitalLoss: ZERO,
  rateRise: ZERO,
};

/**
 * The bases of one borrower's shares on a day, whole currency units of the accounts.
 *
 * @example scenarioBase(test, book).sales // => 90000000
 */
export const scenarioBase = (test: CovenantTest, book: StatementBook): ScenarioBase => ({
  earnings: earningsIn(test),
  ...balancesOn(book, test.testDate),
});

const balancesOn = (book: StatementBook, date: PlainDate): Omit<ScenarioBase, 'earnings'> => ({
  sales: positive(lastTwelveMonths(book, 'revenue', date)),
  workingCapital: positive(
    sumOfReadings([
      { sign: 1, reading: balanceAt(book, 'receivables', date, 'optional') },
      { sign: 1, reading: balanceAt(book, 'inventory', date, 'optional') },
    ]),
  ),
  cash: positive(balanceAt(book, 'cash', date)),
  debt: positive(totalDebt(plainRequest(book, date)).reading),
});

const positive = (reading: Reading): Decimal | null =>
  reading.kind === 'value' && reading.value.gt(0) ? reading.value : null;

/**
 * EBITDA is a side of a leverage or of interest cover; where it is only a part of a side, it is what the money left is
 * so many per cent of.
 */
function earningsIn({ measure, numerator, denominator, headroom }: CovenantTest): Decimal | null {
  const { earningsSide } = MEASURES[measure];
  if (earningsSide === null) return null;
  const { moneyLeft, mayFall } = headroom;
  if (moneyLeft && mayFall && !mayFall.isZero()) {
    const earnings = moneyLeft.div(mayFall);
    return earnings.gt(0) ? earnings : null;
  }
  const side = earningsSide === 'numerator' ? numerator : denominator;
  return side?.gt(0) ? side : null;
}

/**
 * The blow that some falls are for a test; names the base that is missing where one is needed and not there.
 *
 * @example blowOf({ ...NO_FALLS, salesFall: decimal('0.1') }, { earnings: null, sales: decimal(90), workingCapital: null, cash: null, debt: null }, POLICY_VERSION_1.outlook) // => { earnings: 3.15, cash: 0, interest: 0 }
 */
export function blowOf(
  falls: Falls,
  base: ScenarioBase,
  { variableCostShare, floatingDebtShare }: Pick<OutlookPolicy, 'variableCostShare' | 'floatingDebtShare'>,
): Blow | { readonly missing: string } {
  const { earningsFall, salesFall, workingCapitalLoss, rateRise } = falls;
  if (salesFall.gt(0) && !base.sales) return { missing: 'no sales of twelve months' };
  if (workingCapitalLoss.gt(0) && !base.workingCapital) return { missing: 'no receivables or stocks' };
  if (rateRise.gt(0) && !base.debt) return { missing: 'no debt on the balance sheet' };
  const kept = decimal(1).minus(variableCostShare);
  return {
    earnings: times(base.earnings, earningsFall).plus(times(base.sales, salesFall).times(kept)),
    cash: times(base.workingCapital, workingCapitalLoss),
    interest: times(base.debt, rateRise).times(floatingDebtShare),
  };
}

const times = (base: Decimal | null, share: Decimal): Decimal => (base ? base.times(share) : ZERO);
