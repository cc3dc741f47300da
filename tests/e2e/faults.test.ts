/** Bad input and bad luck at the screen: each is said clearly, loses nothing and doubles nothing. */
import '../support/useDatabase.ts';
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, expect, inject } from 'vitest';
import type { WatchlistView } from '../../src/contracts/watchlist.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { addDeskMember } from '../../src/server/db/repositories/desks.ts';
import { execute, selectOne } from '../../src/server/db/sql.ts';
import { follow, openPage, refusalsApart, signInAtForm, signInOn, test, visit } from '../support/browser.ts';
import { demoSignIn } from '../support/demo.ts';
import { hostileFiles } from '../support/hostileFiles.ts';
import { makePersonAlone, PASSWORD } from '../support/twoDesks.ts';

const ANALYST = 'analyst, Harbour desk';
const LATE_BORROWER = 'Aldermerrin Trade B.V.';

afterAll(() => closeDatabase());

/** The workbook that the demo desk lays ready for its late borrower. */
function readyWorkbook(): string {
  const folder = join(inject('productSettings')['DATA_DIR'] ?? '', 'demo');
  const name = readdirSync(folder).find((file) => file.startsWith('Aldermerrin'));
  if (!name) throw new Error(`no workbook of ${LATE_BORROWER} in ${folder}`);
  return join(folder, name);
}

const importsOf = async (page: Page): Promise<number> =>
  ((await (await page.request.get('/api/v1/imports')).json()) as { total: number }).total;

async function upload(
  page: Page,
  file: Parameters<ReturnType<Page['getByLabel']>['setInputFiles']>[0],
): Promise<void> {
  await page.getByLabel('Borrower', { exact: true }).selectOption(LATE_BORROWER);
  await page.getByLabel('Workbook').setInputFiles(file);
  await page.getByRole('button', { name: 'Read the file' }).click();
}

test('a file that is no readable workbook is refused with its reason, and nothing is imported', async () => {
  const { page, faults, close } = await openPage();
  await signInOn(page, ANALYST);
  await visit(page, '/imports');
  const before = await importsOf(page);
  for (const { name, bytes, reason } of hostileFiles()) {
    await upload(page, { name, mimeType: '', buffer: bytes });
    const alert = page.getByRole('alert').filter({ hasText: reason });
    await alert.waitFor();
    expect(await alert.textContent(), name).toContain('Nothing was imported.');
    expect(await page.getByLabel('Borrower', { exact: true }).locator('option:checked').textContent()).toBe(
      LATE_BORROWER,
    );
  }
  expect(await importsOf(page)).toBe(before);
  await close();
  expect(faults.filter(refusalsApart)).toEqual([]);
}, 60_000);

test('eleven megabytes are refused before they are sent', async ({ page }) => {
  await signInOn(page, ANALYST);
  await visit(page, '/imports');
  const sent: string[] = [];
  page.on('request', (request) => request.method() === 'POST' && sent.push(request.url()));
  await page.getByRole('button', { name: 'Read the file' }).click();
  await page.getByText('Choose whose figures these are.').waitFor();
  await upload(page, { name: 'Large.xlsx', mimeType: '', buffer: Buffer.alloc(11 * 1024 * 1024, 65) });
  await page.getByText('Large.xlsx is larger than 10 MB. Nothing was sent. Save a copy without').waitFor();
  expect(sent).toEqual([]);
});

test('the same file twice is one import', async () => {
  const { page, faults, close } = await openPage();
  await signInOn(page, ANALYST);
  await visit(page, '/imports');
  const before = await importsOf(page);
  await follow(page, () => upload(page, readyWorkbook()));
  expect(page.url()).toMatch(/\/imports\/\d+$/);
  const id = page.url().split('/').at(-1);

  await visit(page, '/imports');
  await upload(page, readyWorkbook());
  const alert = page.getByRole('alert').filter({ hasText: 'This very file is here already' });
  await alert.waitFor();
  expect(await alert.textContent()).toContain(`(draft, import ${id}). Nothing was imported twice.`);
  expect(await importsOf(page)).toBe(before + 1);
  await close();
  expect(faults.filter(refusalsApart)).toEqual([]);
});

test('two analysts accept at once: the figures count once, and the second is told by whom', async () => {
  const second = await makePersonAlone('analyst');
  await inTransaction(async (tx) => {
    const desk = await selectOne<{ id: number }>(tx, `select id from desks where name = 'Harbour desk'`);
    await addDeskMember(tx, desk?.id ?? 0, second.id);
  });
  const [one, other] = [await openPage(), await openPage()];
  await signInOn(one.page, ANALYST);
  await visit(other.page, '/sign-in');
  await signInAtForm(other.page, { email: second.email, password: PASSWORD });
  for (const { page } of [one, other]) {
    await visit(page, '/imports');
    await page.getByRole('button', { name: 'Drafts' }).click();
    await page
      .getByRole('row', { name: new RegExp(`${LATE_BORROWER} .* draft`) })
      .getByRole('link')
      .click();
    await page.getByRole('radio', { name: 'management' }).check();
    await page.getByRole('radio', { name: 'the group' }).check();
  }
  const accepted = ({ page }: typeof one) =>
    Promise.race([
      page.waitForURL(/\/borrowers\/\d+$/).then(() => 'accepted'),
      page
        .getByRole('alert')
        .waitFor()
        .then(() => page.getByRole('alert').innerText()),
    ]);
  const accept = ({ page }: typeof one) => page.getByRole('button', { name: /^Accept \d periods$/ }).click();
  await Promise.all([accept(one), accept(other)]);
  const outcomes = await Promise.all([accepted(one), accepted(other)]);
  expect(outcomes.filter((outcome) => outcome === 'accepted')).toHaveLength(1);
  const [refused = ''] = outcomes.filter((outcome) => outcome !== 'accepted');
  expect(refused).toMatch(/(Jonna Tervikke|Test analyst \w+) accepted this import already/);
  expect(refused).toContain('nothing was changed');

  const doubled = await inTransaction((tx) =>
    selectOne<{ most: number }>(
      tx,
      `select max(statement_version) as most from statements s join borrowers b on b.id = s.borrower_id
       where b.name = :name`,
      { name: LATE_BORROWER },
    ),
  );
  expect(doubled?.most).toBe(1);
  for (const { close, faults } of [one, other]) {
    await close();
    expect(faults.filter(refusalsApart)).toEqual([]);
  }
});

test('a session that ends in the middle of a form loses nothing that was typed, and sends it once', async () => {
  const { page, faults, close } = await openPage();
  await signInOn(page, ANALYST);
  const name = 'Kelvarrow Facades Ltd';
  await page.getByRole('combobox', { name: 'Find a borrower' }).fill(name);
  await follow(page, () => page.getByRole('option', { name }).click());
  await page.getByRole('button', { name: 'Propose for watchlist' }).click();
  const dialog = page.getByRole('dialog', { name: `Propose for watchlist: ${name}` });
  await dialog.getByRole('radio', { name: 'W1, monitor' }).check();
  await dialog.getByLabel('Reason').fill('Two large contracts end in spring.');
  await dialog.getByLabel('Owner of the plan').selectOption('Ruben Astrelle');
  await dialog.getByLabel('Plan', { exact: true }).fill('Ask for the order book at the end of January.');
  await dialog.getByLabel('Next review').fill('2027-02-01');

  const { email, password } = demoSignIn(ANALYST);
  await inTransaction((tx) =>
    execute(tx, 'delete s from sessions s join people p on p.id = s.person_id where p.email = :email', {
      email,
    }),
  );
  await dialog.getByRole('button', { name: 'Propose', exact: true }).click();
  const alert = dialog.getByRole('alert');
  await alert.waitFor();
  expect(await alert.innerText()).toContain('Nothing was changed, and what you typed is still here.');

  const tabOpens = page.context().waitForEvent('page');
  await alert.getByRole('link', { name: 'Sign in in a new tab' }).click();
  const tab = await tabOpens;
  await tab.waitForLoadState();
  await signInAtForm(tab, { email, password });
  await tab.close();

  expect(await dialog.getByLabel('Reason').inputValue()).toBe('Two large contracts end in spring.');
  await dialog.getByRole('button', { name: 'Propose', exact: true }).click();
  await page.getByRole('link', { name: 'A watchlist proposal waits for a decision' }).waitFor();
  const { proposals } = (await (await page.request.get('/api/v1/watchlist')).json()) as WatchlistView;
  expect(proposals.filter(({ borrowerName }) => borrowerName === name)).toHaveLength(1);
  await close();
  expect(faults.filter(refusalsApart)).toEqual([]);
});
