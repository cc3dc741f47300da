/** The worker as a process, on databases without borrowers: which nights it runs, and how often. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, beforeEach, expect, inject, test } from 'vitest';
import { businessDate } from '../../src/core/calendar/businessDate.ts';
import { lastNightSlot } from '../../src/core/calendar/nightSlot.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { insertLender } from '../../src/server/db/repositories/lender.ts';
import { insertRun } from '../../src/server/db/repositories/runs.ts';
import { execute, select } from '../../src/server/db/sql.ts';
import { freePort } from '../../jobs/database.mjs';
import { useOwnDatabase } from '../support/ownDatabase.ts';
import { startProgram, type Program } from '../support/program.ts';

const ZONE = 'Europe/Paris';
const HOUR_MS = 3_600_000;
const hourMinute = (at: Date): string => at.toISOString().slice(11, 16);

const started: Program[] = [];
afterAll(async () => {
  for (const program of started) program.kill('SIGKILL');
  await closeDatabase();
});

let addresses: { url: string; ownerUrl: string };
beforeAll(async () => {
  addresses = await useOwnDatabase();
});
beforeEach(() =>
  inTransaction(async (tx) => {
    await execute(tx, 'delete from runs');
    await execute(tx, 'delete from lenders');
  }),
);

/** A lender whose night was an hour ago. */
async function lenderWithNightAnHourAgo(): Promise<{ settings: Record<string, string>; dueDate: string }> {
  const nightAtUtc = hourMinute(new Date(Date.now() - HOUR_MS));
  await inTransaction((tx) =>
    insertLender(tx, { name: 'Test lender', zone: ZONE, nightAtUtc, seededOn: null }),
  );
  const settings = {
    ...inject('productSettings'),
    DATABASE_URL: addresses.url,
    DATABASE_OWNER_URL: addresses.ownerUrl,
    NIGHT_SCHEDULE: '1',
    LOG_LEVEL: 'info',
    MAIL_SINK_PORT: String(await freePort()),
  };
  return { settings, dueDate: businessDate(lastNightSlot(new Date(), nightAtUtc), ZONE) };
}

const worker = (settings: Record<string, string>): Program => {
  const program = startProgram('jobs/worker.ts', settings);
  started.push(program);
  return program;
};

const runs = (): Promise<{ businessDate: string; state: string; attempt: number }[]> =>
  inTransaction((tx) =>
    select(tx, 'select business_date as businessDate, state, attempt from runs order by business_date'),
  );

async function until(isSo: () => Promise<boolean>): Promise<void> {
  for (let waited = 0; waited < 100; waited += 1) {
    if (await isSo()) return;
    await new Promise((resume) => setTimeout(resume, 200));
  }
  throw new Error(`it did not come to that in 20 s; runs: ${JSON.stringify(await runs())}`);
}

async function stop(...programs: Program[]): Promise<void> {
  for (const program of programs) program.kill('SIGTERM');
  expect(await Promise.all(programs.map(({ ended }) => ended))).toEqual(programs.map(() => 0));
}

test('a night that was missed is caught up once, also by two workers at once', async () => {
  const { settings, dueDate } = await lenderWithNightAnHourAgo();
  await inTransaction(async (tx) => {
    await insertRun(tx, {
      businessDate: '2026-01-05',
      kind: 'nightly',
      state: 'done',
      startedBy: null,
      now: new Date('2026-01-05T01:30:00Z'),
    });
  });
  const both = [worker(settings), worker(settings)];
  await until(async () => (await runs()).some((run) => run.businessDate === dueDate && run.state === 'done'));
  await Promise.all(both.map((one) => one.until(/worker runs/)));
  await stop(...both);
  expect(await runs()).toEqual([
    { businessDate: '2026-01-05', state: 'done', attempt: 1 },
    { businessDate: dueDate, state: 'done', attempt: 1 },
  ]);
  const again = worker(settings);
  await again.until(/worker runs/);
  await new Promise((resume) => setTimeout(resume, 3_000));
  await stop(again);
  expect((await runs()).map(({ attempt }) => attempt)).toEqual([1, 1]);
});

test('a new installation has missed nothing; what is started by hand is run', async () => {
  const { settings, dueDate } = await lenderWithNightAnHourAgo();
  const one = worker(settings);
  await one.until(/worker runs/);
  await new Promise((resume) => setTimeout(resume, 3_000));
  expect(await runs()).toEqual([]);
  await inTransaction((tx) =>
    execute(
      tx,
      `insert into runs (business_date, kind, state, phase, known_at, started_at)
       values (:dueDate, 'nightly', 'queued', 'tests', :now, :now)`,
      { dueDate, now: new Date() },
    ),
  );
  await until(async () => (await runs())[0]?.state === 'done');
  await stop(one);
});
