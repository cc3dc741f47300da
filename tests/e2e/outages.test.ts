/**
 * The database gone for ten seconds, the mail server gone: a product of this file's own, whose way to its database
 * can be cut and whose mail server is not there at first.
 */
import '../support/useDatabase.ts';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, inject, test } from 'vitest';
import { freePort } from '../../jobs/database.mjs';
import type { SunkMail } from '../../jobs/mailSinkPages.ts';
import { untilAnswers } from '../../jobs/serve.mjs';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { insertLender } from '../../src/server/db/repositories/lender.ts';
import { execute, select, selectOne } from '../../src/server/db/sql.ts';
import { openPage, refusalsApart, signInAtForm, visit } from '../support/browser.ts';
import { openWay, type DatabaseWay } from '../support/databaseWay.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';
import { freePairOfPorts } from '../support/product.ts';
import { startProgram, type Program } from '../support/program.ts';
import { makeTwoDesks, PASSWORD, type DeskThings } from '../support/twoDesks.ts';

let way: DatabaseWay;
let desk: DeskThings;
let settings: Record<string, string>;
let folder: string;
const programs: Program[] = [];

function start(file: string): Program {
  const program = startProgram(file, settings);
  programs.push(program);
  return program;
}

beforeAll(async () => {
  const { url, ownerUrl } = await useOwnDatabase();
  await inTransaction((tx) =>
    insertLender(tx, { name: 'Test lender', zone: 'Europe/Paris', nightAtUtc: '01:30', seededOn: null }),
  );
  desk = (await makeTwoDesks()).north;
  way = await openWay(url);
  const port = await freePort();
  folder = mkdtempSync(join(tmpdir(), 'underkeel-outages-'));
  settings = {
    ...inject('productSettings'),
    DATABASE_URL: way.url,
    DATABASE_OWNER_URL: ownerUrl,
    APP_URL: `http://127.0.0.1:${port}`,
    PORT: String(port),
    DATA_DIR: folder,
    MAIL_SINK_PORT: String(await freePairOfPorts()),
  };
  start('jobs/server.ts');
  if (!(await untilAnswers(`${settings['APP_URL']}/livez`, () => false)))
    throw new Error(programs[0]?.output());
});

afterAll(async () => {
  for (const program of programs) program.kill('SIGKILL');
  await Promise.all(programs.map(({ ended }) => ended));
  rmSync(folder, { recursive: true, force: true });
  await way.cut();
  await closeDatabase();
});

async function signedIn(): Promise<{ page: Page; faults: string[]; close: () => Promise<void> }> {
  const opened = await openPage({ baseURL: settings['APP_URL'] });
  await visit(opened.page, '/sign-in');
  await signInAtForm(opened.page, { email: desk.manager.email, password: PASSWORD });
  return opened;
}

test('the database is gone for ten seconds: it is said, what was typed stays, and sending again does it once', async () => {
  const { page, faults, close } = await signedIn();
  await visit(page, `/alerts/${desk.alert}`);
  await page.getByRole('button', { name: 'Assessed' }).click();
  const dialog = page.getByRole('dialog', { name: /^Assessed/ });
  const typed = 'The order book covers the year; the figures are explained.';
  await dialog.getByLabel('Your assessment').fill(typed);

  await way.cut();
  const back = sleep(10_000).then(() => way.join());
  await dialog.getByRole('button', { name: 'Record the assessment' }).click();
  const alert = dialog.getByRole('alert');
  await alert.waitFor();
  expect(await alert.innerText()).toContain('The database does not answer. Nothing was changed.');
  expect(await dialog.getByLabel('Your assessment').inputValue()).toBe(typed);
  await back;

  await dialog.getByRole('button', { name: 'Record the assessment' }).click();
  await dialog.waitFor({ state: 'hidden' });
  await page.getByRole('list', { name: 'What was done' }).getByText(typed).waitFor();
  const done = await inTransaction((tx) =>
    select<{ action: string }>(tx, `select action from audit_entries where action = 'alert-assess'`),
  );
  expect(done).toHaveLength(1);
  await close();
  expect(faults.filter(refusalsApart)).toEqual([]);
}, 60_000);

test('the mail server is gone: the mail waits, says so to nobody’s harm, and arrives once when it is back', async () => {
  const { page, faults, close } = await openPage({ baseURL: settings['APP_URL'] });
  await visit(page, '/forgot-password');
  await page.getByLabel('Email address').fill(desk.manager.email);
  await page.getByRole('button', { name: 'Send the link' }).click();
  await page.getByText('a link is on its way').waitFor();
  await close();
  expect(faults).toEqual([]);

  start('jobs/worker.ts');
  const waiting = () =>
    inTransaction((tx) =>
      selectOne<{ state: string; tries: number; failure: string | null }>(
        tx,
        'select state, tries, failure from outbox',
      ),
    );
  await expect.poll(waiting, { timeout: 15_000, interval: 250 }).toMatchObject({ state: 'queued', tries: 1 });
  expect((await waiting())?.failure).toBeTruthy();

  start('jobs/mailSink.ts');
  const sink = `http://127.0.0.1:${Number(settings['MAIL_SINK_PORT']) + 1}`;
  expect(await untilAnswers(`${sink}/`, () => false)).toBe(true);
  // Half a minute passes.
  await inTransaction((tx) => execute(tx, 'update outbox set next_try_at = :now', { now: new Date() }));
  await expect.poll(waiting, { timeout: 15_000, interval: 250 }).toMatchObject({ state: 'sent', tries: 2 });
  await sleep(3_000);
  const mails = (await (await fetch(`${sink}/messages.json`)).json()) as SunkMail[];
  expect(mails.map(({ to }) => to)).toEqual([[desk.manager.email]]);
}, 60_000);
