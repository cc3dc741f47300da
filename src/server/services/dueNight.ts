/** Which night is to run now, if any: the schedule, the missed night and the restart are one question. */
import { businessDate } from '../../core/calendar/businessDate.ts';
import { lastNightSlot } from '../../core/calendar/nightSlot.ts';
import type { PlainDate } from '../../core/calendar/plainDate.ts';
import { inTransaction } from '../db/inTransaction.ts';
import { findLender } from '../db/repositories/lender.ts';
import { findRunOf, listRuns } from '../db/repositories/runs.ts';

/**
 * The business date of the latest night that has no run yet. A night from before the worker's start counts only
 * where there were runs before it: a new installation has missed nothing.
 */
export const dueNight = (now: Date, workerStartedAt: Date): Promise<PlainDate | null> =>
  inTransaction(async (tx) => {
    const lender = await findLender(tx);
    if (!lender) return null;
    const slot = lastNightSlot(now, lender.nightAtUtc);
    const date = businessDate(slot, lender.zone);
    if (await findRunOf(tx, { businessDate: date, kind: 'nightly' })) return null;
    if (slot.getTime() >= workerStartedAt.getTime()) return date;
    const { total } = await listRuns(tx, { page: 1, perPage: 1 });
    return total > 0 ? date : null;
  });
