/**
 * npm run nightly -- --as-of 2026-11-30: computes the night of one business date, again where it is done.
 *
 * Exit codes: 0 every borrower computed, 1 the run failed or could not start, 2 the arguments cannot be used,
 * 3 computed, and some borrowers failed.
 */
import { parseArgs } from 'node:util';
import { businessDate } from '../src/core/calendar/businessDate.ts';
import { isPlainDate, type PlainDate } from '../src/core/calendar/plainDate.ts';
import { closeDatabase } from '../src/server/db/connection.ts';
import { inTransaction } from '../src/server/db/inTransaction.ts';
import { findLender } from '../src/server/db/repositories/lender.ts';
import { listRuns } from '../src/server/db/repositories/runs.ts';
import { runNight } from '../src/server/services/runNight.ts';

/** The line of progress that was printed last. */
let printed = '';

process.exitCode = await main();
await closeDatabase();

async function main(): Promise<number> {
  const day = await wantedDay();
  if (day === null) {
    console.error('usage: npm run nightly -- [--as-of YYYY-MM-DD]\nNothing was started.');
    return 2;
  }
  const progress = setInterval(() => void printProgress(day), 1_000);
  const summary = await runNight({
    businessDate: day,
    kind: 'nightly',
    startedBy: null,
    now: new Date(),
    again: true,
  }).finally(() => clearInterval(progress));
  if (summary.outcome === 'skipped') {
    console.error(summary.reason);
    return 1;
  }
  const { tested, total, failed, alertsRaised, mails } = summary;
  console.log(
    `nightly run for ${day}: tested ${tested} of ${total} borrowers, ${failed} failed, ${alertsRaised} alerts raised, ${mails} mails queued`,
  );
  return failed > 0 ? 3 : 0;
}

/** The day that was asked for, the lender's business date without one, null where the arguments cannot be used. */
async function wantedDay(): Promise<PlainDate | null> {
  const given = argument();
  if (given === null) return null;
  if (given !== undefined) return isPlainDate(given) ? given : null;
  const lender = await inTransaction((tx) => findLender(tx));
  return businessDate(new Date(), lender?.zone ?? 'UTC');
}

function argument(): string | undefined | null {
  try {
    return parseArgs({ options: { 'as-of': { type: 'string' } } }).values['as-of'];
  } catch (error) {
    if (error instanceof TypeError) return null;
    throw error;
  }
}

async function printProgress(day: PlainDate): Promise<void> {
  const { rows } = await inTransaction((tx) => listRuns(tx, { page: 1, perPage: 50 }));
  const run = rows.find(({ businessDate: date, state }) => date === day && state === 'running');
  if (!run) return;
  const line = `${run.phase}: ${run.borrowersDone} of ${run.borrowersTotal} borrowers, ${run.borrowersFailed} failed`;
  if (line !== printed) console.log(line);
  printed = line;
}
