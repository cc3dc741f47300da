import type { Reading } from '../statements/reading.ts';
import type { MeasureRequest } from './definition.ts';
import { flowIn } from './readLines.ts';
import { turned } from './turned.ts';

/** How the rent is called in a bridge. */
export const LEASE_RENT = 'Rent of leases, by the rules at signing';

/**
 * The rent of leases that today's accounting keeps out of EBITDA and the rules at signing would take from it. Null
 * where the agreement goes by today's rules. A borrower that carries lease liabilities has to give it. Paid is
 * positive here. Source: methods.md A6.
 *
 * @example leaseRentIn(request) // => null
 */
export function leaseRentIn(request: MeasureRequest): Reading | null {
  const { book, date, definition } = request;
  if (definition.accounting === 'current') return null;
  const hasLeases = book.isCarriedBy('lease_liabilities', date);
  return turned(flowIn(request, 'rent_paid', hasLeases ? 'required' : 'optional'));
}
