/** kill -9 of the process that computes the night, several times over. */
import '../support/useDatabase.ts';
import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { setTimeout as sleep } from 'node:timers/promises';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute } from '../../src/server/db/sql.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { buildPerson } from '../support/factories.ts';
import { ACCEPTED, buildNightBook, rows } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const DAY = '2026-12-01';
const DESKS = 4;
const BORROWERS = DESKS * 3;
/** Each process is killed once so many borrowers are done: at the begin, in the middle, before the last. */
const KILLED_AT = [1, 5, BORROWERS - 1];

beforeAll(async () => {
  await useOwnDatabase();
  for (let desk = 0; desk < DESKS; desk += 1) await buildNightBook();
  await inTransaction((tx) => buildPerson(tx, { roles: ['administrator'], now: ACCEPTED }));
});
afterAll(closeDatabase);

const nightly = (): ChildProcess =>
  spawn(process.execPath, ['--import', 'tsx', 'jobs/nightly.ts', '--as-of', DAY], {
    env: { ...process.env },
    stdio: ['ignore', 'ignore', 'inherit'],
  });

const done = async (): Promise<number> => {
  const [count] = await rows<{ n: number }>(
    `select count(*) as n from run_tasks where phase = 'scores' and state = 'done'`,
  );
  return count?.n ?? 0;
};

async function killAt(borrowers: number): Promise<void> {
  const child = nightly();
  const ended = once(child, 'exit');
  while ((await done()) < borrowers && child.exitCode === null) await sleep(5);
  child.kill('SIGKILL');
  await ended;
}

/** Stands for the minute after which a lock without its owner is free. */
const lockRunsOut = () =>
  inTransaction((tx) => execute(tx, `update job_locks set held_until = now(6) - interval 1 second`));

const results = () =>
  rows<{ borrowerId: number; attemptKnownAt: Date; content: string }>(
    'select borrower_id as borrowerId, known_at as attemptKnownAt, content from assessments order by id',
  );
const alerts = () =>
  rows<object>(
    `select borrower_id as borrowerId, kind, severity, sentence, evidence, counter, due_on as dueOn from alerts
     order by borrower_id, kind`,
  );

test('a night that is killed again and again ends as an undisturbed one: nothing lost, nothing twice', async () => {
  for (const borrowers of KILLED_AT) {
    await killAt(borrowers);
    expect(await rows('select state from runs')).toEqual([{ state: 'running' }]);
    expect(await done()).toBeLessThan(BORROWERS);
    await lockRunsOut();
  }
  const [code] = (await once(nightly(), 'exit')) as [number];
  expect(code).toBe(0);

  const killed = await results();
  expect(killed).toHaveLength(BORROWERS);
  expect(new Set(killed.map(({ borrowerId }) => borrowerId)).size).toBe(BORROWERS);
  expect(new Set(killed.map(({ attemptKnownAt }) => attemptKnownAt.getTime())).size).toBe(1);
  const raised = await alerts();
  expect(raised.length).toBeGreaterThan(0);
  expect(raised).toEqual(raised.map((alert) => ({ ...alert, counter: 1 })));

  const keys = (await rows<{ key: string }>('select message_key as `key` from outbox')).map(({ key }) => key);
  expect(keys).toHaveLength(DESKS * 2 + 1);

  const undisturbed = await runNight({
    businessDate: DAY,
    kind: 'nightly',
    startedBy: null,
    now: new Date(Date.now() + 1_000),
    again: true,
  });
  expect(undisturbed).toMatchObject({ outcome: 'done', attempt: 2, tested: BORROWERS });
  const again = (await results()).slice(BORROWERS);
  const byBorrower = (rowsOf: typeof killed) =>
    new Map(rowsOf.map(({ borrowerId, content }) => [borrowerId, content]));
  expect(byBorrower(again)).toEqual(byBorrower(killed));
  expect(await alerts()).toEqual(raised);
}, 120_000);
