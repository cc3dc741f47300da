/** What covers debt service and fixed charges, and what they come to: methods.md A3. Paid items are positive. */
import type { Decimal } from '../money/decimal.ts';

/**
 * Cash flow available for debt service: EBITDA less cash tax, capital expenditure that is not financed, and the
 * increase in working capital.
 *
 * @example cashForDebtService({ ebitda: decimal(12), cashTax: decimal(2), unfundedCapex: decimal(3), workingCapitalIncrease: decimal(1) }) // => 6
 */
export const cashForDebtService = ({
  ebitda,
  cashTax,
  unfundedCapex,
  workingCapitalIncrease,
}: {
  readonly ebitda: Decimal;
  readonly cashTax: Decimal;
  readonly unfundedCapex: Decimal;
  readonly workingCapitalIncrease: Decimal;
}): Decimal => ebitda.minus(cashTax).minus(unfundedCapex).minus(workingCapitalIncrease);

/**
 * Cash interest and scheduled principal; a bullet only where the agreement counts it.
 *
 * @example debtService({ cashInterest: decimal(2), scheduledPrincipal: decimal(3), bullet: ZERO }) // => 5
 */
export const debtService = ({
  cashInterest,
  scheduledPrincipal,
  bullet,
}: {
  readonly cashInterest: Decimal;
  readonly scheduledPrincipal: Decimal;
  /** What the agreement counts of final repayments; nought where it leaves them out. */
  readonly bullet: Decimal;
}): Decimal => cashInterest.plus(scheduledPrincipal).plus(bullet);

/**
 * EBITDA before rent less capital expenditure that is not financed and cash tax, over interest, principal and rent.
 *
 * @example fixedChargeSides({ ebitda: decimal(12), rent: decimal(2), unfundedCapex: decimal(3), cashTax: decimal(1), cashInterest: decimal(2), scheduledPrincipal: decimal(4) }) // => { numerator: 10, denominator: 8 }
 */
export const fixedChargeSides = ({
  ebitda,
  rent,
  unfundedCapex,
  cashTax,
  cashInterest,
  scheduledPrincipal,
}: {
  readonly ebitda: Decimal;
  readonly rent: Decimal;
  readonly unfundedCapex: Decimal;
  readonly cashTax: Decimal;
  readonly cashInterest: Decimal;
  readonly scheduledPrincipal: Decimal;
}): { readonly numerator: Decimal; readonly denominator: Decimal } => ({
  numerator: ebitda.plus(rent).minus(unfundedCapex).minus(cashTax),
  denominator: cashInterest.plus(scheduledPrincipal).plus(rent),
});
