/**
 * Lays out the demo desk in an empty database and prints what it prints every time: the sign-ins as one line of
 * JSON, the workbooks to try an upload with, one a line.
 *
 * SEED_DAY=2026-12-01 pins the day that everything is relative to; without it, today in UTC. A desk that is laid out
 * is never dated anew.
 */
import { join, relative } from 'node:path';
import { isPlainDate, plainDate, type PlainDate } from '../src/core/calendar/plainDate.ts';
import { env } from '../src/server/config/env.ts';
import { closeDatabase } from '../src/server/db/connection.ts';
import { inTransaction } from '../src/server/db/inTransaction.ts';
import { findLender } from '../src/server/db/repositories/lender.ts';
import { businessDayBefore } from './demo/demoDays.ts';
import { DEMO_PASSWORD, DEMO_PEOPLE } from './demo/people.ts';
import { layOutDemoDesk } from './layOutDemoDesk.ts';
import { runFirstNight } from './runFirstNight.ts';
import { workTheFirstMorning } from './workTheFirstMorning.ts';
import { writeUploads } from './writeUploads.ts';

try {
  process.exitCode = await main();
} finally {
  await closeDatabase();
}

async function main(): Promise<number> {
  const pinned = process.env.SEED_DAY;
  if (pinned !== undefined && !isPlainDate(pinned)) {
    console.error(`SEED_DAY is "${pinned}": give a day as YYYY-MM-DD. Nothing was changed.`);
    return 1;
  }
  const now = pinned === undefined ? new Date() : new Date(`${pinned}T06:00:00.000Z`);
  const lender = await inTransaction((tx) => findLender(tx));
  if (lender && lender.seededOn === null) {
    console.log(`${lender.name} is set up here: no demo desk is laid out.`);
    return 0;
  }
  const seedDay = plainDate(lender?.seededOn ?? pinned ?? now.toISOString().slice(0, 10));
  if (!lender) {
    const laidOut = await layOutDemoDesk({ seedDay, now });
    if (!laidOut.ok) {
      console.error('detail' in laidOut.error ? laidOut.error.detail : laidOut.error.kind);
      return 1;
    }
    console.log(`the demo desk is laid out as of ${seedDay}`);
  }
  if (await runFirstNight({ businessDate: businessDayBefore(seedDay), now })) await workTheFirstMorning(now);
  await printWhatThereIs(seedDay);
  return 0;
}

async function printWhatThereIs(seedDay: PlainDate): Promise<void> {
  const uploads = await writeUploads(join(env().DATA_DIR, 'demo'), seedDay);
  for (const { path, borrowerName, remark } of uploads)
    console.log(`to upload for ${borrowerName} (${remark}): ${relative(process.cwd(), path)}`);
  const demoSignIns = DEMO_PEOPLE.map(({ part, email }) => ({ role: part, email, password: DEMO_PASSWORD }));
  console.log(JSON.stringify({ demoSignIns }));
}
