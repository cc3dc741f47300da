import { dueDate, type DayCount } from '../calendar/deadline.ts';
import type { PlainDate } from '../calendar/plainDate.ts';

/** What an undertaking says of when something is due after a period end. */
export interface DeliveryTerms {
  readonly kind: string;
  readonly dueDays: number;
  readonly dayCount: DayCount;
}

/** A certificate goes with each set of accounts: where none is promised by itself, the accounts' day is its day. */
const STANDS_FOR_CERTIFICATE = ['compliance certificate', 'quarterly accounts', 'annual accounts'] as const;

/**
 * When the certificate of a test date is due; null where no undertaking says so. Source: methods.md A7.
 *
 * @example certificateDue([{ kind: 'quarterly accounts', dueDays: 45, dayCount: 'calendar' }], '2025-03-31') // => '2025-05-15'
 * @example certificateDue([], '2025-03-31') // => null
 */
export function certificateDue(
  undertakings: readonly DeliveryTerms[],
  testDate: PlainDate,
): PlainDate | null {
  const terms = STANDS_FOR_CERTIFICATE.map((kind) => undertakings.find((one) => one.kind === kind)).find(
    (one) => one !== undefined,
  );
  return terms ? dueDate({ periodEnd: testDate, days: terms.dueDays, dayCount: terms.dayCount }) : null;
}
