import { equityOf, totalAssetsOf, type Balances } from './statements.ts';
import type { TradingQuarter } from './trading.ts';

export interface Finance {
  readonly cash: number;
  readonly shortTermDebt: number;
  readonly seniorDebt: number;
  readonly debtDrawn: number;
  readonly debtRepaid: number;
  readonly dividends: number;
  readonly equityIssued: number;
}

const REPAID_PER_QUARTER = 0.0125;
const ACQUISITION_DEBT = 0.8;
/** Bounds of cash, in quarters of ordinary revenue: below, the revolver is drawn; above, it is repaid. */
const CASH = { least: 0.12, most: 0.35 };
/** Share of the cash above that is paid out. */
const PAID_OUT = 0.5;
/** Years of ordinary EBITDA from which a revolver is turned into a term loan. */
const REVOLVER_MOST = 1.5;
/** Equity over assets below which the owners pay in, and how much of assets they do. */
const OWNERS = { below: -0.05, payIn: 0.1 };

/** How a quarter is paid for: `cash` is what is there before finance, `price` what was paid for a business. */
export function financeQuarter(
  opening: Balances,
  trading: TradingQuarter,
  { cash, price }: { readonly cash: number; readonly price: number },
): Finance {
  const assets = totalAssetsOf(opening);
  const equityIssued = equityOf(opening) < OWNERS.below * assets ? Math.round(OWNERS.payIn * assets) : 0;
  const scheduled = Math.round(REPAID_PER_QUARTER * opening.seniorDebt);
  const loan = Math.round(ACQUISITION_DEBT * price);
  const before = cash + equityIssued + loan - scheduled;
  const least = Math.round(CASH.least * trading.revenue);
  const most = Math.round(CASH.most * trading.revenue);
  const drawn = Math.max(0, least - before);
  const revolverRepaid = Math.min(opening.shortTermDebt, Math.max(0, before - least));
  const after = before + drawn - revolverRepaid;
  const dividends = Math.max(0, Math.round(PAID_OUT * (after - most)));
  const revolver = opening.shortTermDebt + drawn - revolverRepaid;
  const bearable = REVOLVER_MOST * 4 * trading.ordinaryEbitda;
  const turned = revolver > bearable ? Math.round(revolver - bearable / 2) : 0;
  return {
    cash: after - dividends,
    shortTermDebt: revolver - turned,
    seniorDebt: opening.seniorDebt + loan - scheduled + turned,
    debtDrawn: loan + drawn + turned,
    debtRepaid: scheduled + revolverRepaid + turned,
    dividends,
    equityIssued,
  };
}
