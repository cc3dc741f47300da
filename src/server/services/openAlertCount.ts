import { deskScope, mayAnywhere, type Person } from '../auth/policy.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { countOpenAlerts } from '../db/repositories/alertLists.ts';

/** Open alerts on the desks that the person reads; null where the person reads no borrower. */
export async function openAlertCount(person: Person): Promise<number | null> {
  if (!mayAnywhere(person, 'read borrower')) return null;
  return inTransaction((tx) => countOpenAlerts(tx, deskScope(person, 'read borrower')));
}
