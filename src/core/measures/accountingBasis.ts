import type { Decimal } from '../money/decimal.ts';

export interface LeverageSides {
  readonly numerator: Decimal;
  readonly denominator: Decimal;
}

/**
 * Leverage under the accounting rules at closing and under those of today: frozen rules leave lease liabilities out
 * of debt and the rent in earnings. Both are shown. Source: methods.md A6.
 *
 * `debt` is without leases; `leaseAddBack` is the rent that today's EBITDA no longer bears.
 *
 * @example leverageByAccountingBasis({ ebitda: decimal(12), leaseAddBack: decimal(2), debt: decimal(30), leaseLiability: decimal(9) }).frozen // => { numerator: 30, denominator: 10 }
 */
export const leverageByAccountingBasis = ({
  ebitda,
  leaseAddBack,
  debt,
  leaseLiability,
}: {
  readonly ebitda: Decimal;
  readonly leaseAddBack: Decimal;
  readonly debt: Decimal;
  readonly leaseLiability: Decimal;
}): { readonly frozen: LeverageSides; readonly current: LeverageSides } => ({
  frozen: { numerator: debt, denominator: ebitda.minus(leaseAddBack) },
  current: { numerator: debt.plus(leaseLiability), denominator: ebitda },
});
