import type { Decimal } from '../money/decimal.ts';

/**
 * Drawings over commitments; `drawn` holds what the agreement counts, letters of credit it leaves out not among it.
 *
 * @example utilisation(decimal(7), decimal(20)) // => 0.35
 */
export const utilisation = (drawn: Decimal, commitment: Decimal): Decimal => drawn.div(commitment);

/**
 * Whether a springing covenant is tested: only where drawings exceed the trigger share of commitments on the test
 * date. The ratio is shown either way. Source: methods.md A6.
 *
 * @example isSprung({ drawn: decimal(7), commitment: decimal(20), trigger: decimal('0.35') }) // => false
 */
export const isSprung = ({
  drawn,
  commitment,
  trigger,
}: {
  readonly drawn: Decimal;
  readonly commitment: Decimal;
  readonly trigger: Decimal;
}): boolean => utilisation(drawn, commitment).gt(trigger);
