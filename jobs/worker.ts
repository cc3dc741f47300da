/**
 * The worker: the nightly run by schedule and by hand, and the mail. It keeps nothing in memory that matters: what
 * it was doing when it ended is taken up from the database.
 */
import { setTimeout as sleep } from 'node:timers/promises';
import { schedule } from 'node-cron';
import { env } from '../src/server/config/env.ts';
import { closeDatabase } from '../src/server/db/connection.ts';
import { inTransaction } from '../src/server/db/inTransaction.ts';
import { findRunToDo } from '../src/server/db/repositories/runs.ts';
import { log } from '../src/server/http/log.ts';
import { dueNight } from '../src/server/services/dueNight.ts';
import { runNight } from '../src/server/services/runNight.ts';
import { sendDueMail } from '../src/server/services/sendMail.ts';
import { runUntilTold } from './supervised.ts';

const PAUSE_MS = 2_000;
const PAUSE_AFTER_FAULT_MS = 5_000;
const END_MS_MOST = 10_000;

const startedAt = new Date();
const told = new AbortController();

/** Does the work over and over until told to end; an outage is logged and tried again. */
async function repeat(name: string, work: () => Promise<void>): Promise<void> {
  while (!told.signal.aborted) {
    let pauseMs = PAUSE_MS;
    try {
      await work();
    } catch (error) {
      log().error({ err: error, work: name }, 'failed; tried again in a moment');
      pauseMs = PAUSE_AFTER_FAULT_MS;
    }
    await sleep(pauseMs, undefined, { signal: told.signal }).catch(() => undefined);
  }
}

/** Asked every minute and at the start; answered by the database, so that two workers start one run. */
let mayBeDue = true;
const clock = schedule('* * * * *', () => void (mayBeDue = true), { timezone: 'UTC', noOverlap: true });

async function runWhatWaits(): Promise<void> {
  if (mayBeDue && env().NIGHT_SCHEDULE) {
    const now = new Date();
    const date = await dueNight(now, startedAt);
    if (date) await runOne({ businessDate: date, startedBy: null, now });
    mayBeDue = false;
  }
  const run = await inTransaction((tx) => findRunToDo(tx));
  if (run) await runOne({ businessDate: run.businessDate, startedBy: run.startedById, now: new Date() });
}

async function runOne(run: Omit<Parameters<typeof runNight>[0], 'kind'>): Promise<void> {
  const summary = await runNight({ ...run, kind: 'nightly', signal: told.signal });
  log().info({ businessDate: run.businessDate, summary }, 'nightly run');
}

async function sendWhatWaits(): Promise<void> {
  const summary = await sendDueMail(new Date());
  if (summary.putBack + summary.failed > 0) log().warn(summary, 'some mail was not sent');
}

const loops = Promise.all([repeat('nightly run', runWhatWaits), repeat('mail', sendWhatWaits)]);

runUntilTold('worker', async () => {
  told.abort();
  await clock.stop();
  // A run that is cut here goes on where it stopped; waiting lets the borrower in hand and the mail in hand finish.
  await Promise.race([loops, sleep(END_MS_MOST, undefined, { ref: false })]);
  await closeDatabase();
});
log().info('worker runs');
