import type { Decimal } from './decimal.ts';

/**
 * An exact amount as a point of a statistical sample: the only crossing from money to binary floating point.
 *
 * Keeps the amount's unit. The nearest double is within 1.2e-16 of the amount, relatively; what is compared after
 * this is a rank or a fitted model, never a covenant. Never turned back into money.
 *
 * @example toSample(decimal('1250000.25')) // => 1250000.25
 */
export const toSample = (amount: Decimal): number => amount.toNumber();
