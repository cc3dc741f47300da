import type { PlainDate } from '../src/core/calendar/plainDate.ts';
import { inTransaction } from '../src/server/db/inTransaction.ts';
import { listRuns } from '../src/server/db/repositories/runs.ts';
import { runNight } from '../src/server/services/runNight.ts';

/**
 * Computes the night before the desk is first looked at, where no night was ever finished: also after a first start
 * that was cut between laying the desk out and assessing it. True where this computed it.
 */
export async function runFirstNight({
  businessDate,
  now,
}: {
  businessDate: PlainDate;
  now: Date;
}): Promise<boolean> {
  const { rows } = await inTransaction((tx) => listRuns(tx, { page: 1, perPage: 50 }));
  if (rows.some(({ state }) => state === 'done')) return false;
  const night = await runNight({ businessDate, kind: 'nightly', startedBy: null, now });
  if (night.outcome === 'skipped') {
    console.log(night.reason);
    return false;
  }
  const { tested, total, failed, alertsRaised } = night;
  console.log(
    `the night of ${businessDate}: tested ${tested} of ${total} borrowers, ${failed} failed, ${alertsRaised} alerts raised`,
  );
  return true;
}
