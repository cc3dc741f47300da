/**
 * The main job, once through, as people do it: a borrower's workbook goes in, the night turns it into an alert, the
 * alert is mailed, worked and carried onto the watchlist by two persons' word, the review sheet is exported, and the
 * auditor finds every step. One story in steps: each rests on the ones before it.
 */
import ExcelJS from 'exceljs';
import type { Download, Locator, Page } from 'playwright-core';
import { expect, inject } from 'vitest';
import type { WatchlistView } from '../../src/contracts/watchlist.ts';
import { CAUTIONS } from '../../src/core/cautions.ts';
import { demoSignIn, mailThat } from '../support/demo.ts';
import { follow, signInOn, test, visit } from '../support/browser.ts';
import { owedWorkbook } from '../support/owedWorkbook.ts';

const ANALYST = 'analyst, Harbour desk';
const MANAGER = 'head of Harbour desk';
const BORROWER = 'Juniverre Confiserie SAS';

/** Where the story has got to. */
const story = { importPath: '', borrowerPath: '', alertPath: '', businessDay: '' };

const pathOf = (page: Page): string => new URL(page.url()).pathname;
const panel = (page: Page, name: string | RegExp): Locator => page.getByRole('region', { name });
const row = (page: Page, name: string | RegExp): Locator => page.getByRole('row', { name });
const shown = (where: Locator): Promise<void> => where.first().waitFor();

/** From anywhere: `/`, some letters, Enter. */
async function openBorrower(page: Page, name: string): Promise<void> {
  await page.getByRole('combobox', { name: 'Find a borrower' }).fill(name.slice(0, 9));
  await shown(page.getByRole('option', { name }));
  await follow(page, () => page.keyboard.press('Enter'));
  await shown(page.getByRole('heading', { level: 1, name }));
}

async function openedDialog(page: Page, name: RegExp): Promise<Locator> {
  const dialog = page.getByRole('dialog', { name });
  await shown(dialog);
  return dialog;
}

test('the analyst signs in, lands on Alerts and uploads the workbook that was owed', async ({ page }) => {
  await signInOn(page, ANALYST);
  expect(pathOf(page)).toBe('/alerts');
  await shown(row(page, new RegExp(`${BORROWER} Statement late`)));

  await follow(page, () => page.getByRole('link', { name: 'Imports' }).click());
  const { fileName, bytes } = await owedWorkbook('Juniverre', 12_000);
  await page.getByLabel('Borrower', { exact: true }).selectOption(BORROWER);
  await page.getByLabel('Workbook').setInputFiles({ name: fileName, mimeType: '', buffer: bytes });
  await follow(page, () => page.getByRole('button', { name: 'Read the file' }).click());
  expect(page.url()).toMatch(/\/imports\/\d+$/);
  story.importPath = pathOf(page);

  const grid = page.getByRole('table', { name: 'Income statement as the borrower sent it' });
  await shown(grid.getByRole('columnheader', { name: 'C 3 months to 30 Sep 2026' }));
  await shown(grid.getByRole('row', { name: /^6 Revenue [\d,]+ [\d,]+ Revenue$/ }));
  await page.getByRole('button', { name: /^Balance sheet \d+ rows$/ }).click();
  await shown(page.getByRole('columnheader', { name: 'C at 30 Sep 2026' }));
  await page.getByRole('button', { name: /^Cash flow \d+ rows$/ }).click();
  await shown(page.getByRole('table', { name: 'Cash flow as the borrower sent it' }));
});

test('what the file does not say is asked, nothing is preselected, and nothing counts before it is answered', async ({
  page,
}) => {
  await signInOn(page, ANALYST);
  await visit(page, '/imports');
  await page.getByRole('button', { name: 'Drafts' }).click();
  await row(page, new RegExp(`${BORROWER} .* draft`))
    .getByRole('link')
    .click();

  const accept = page.getByRole('button', { name: /^Accept \d periods$/ });
  await shown(page.getByText('2 questions are open. Answer first; the draft is kept.'));
  expect(await accept.getAttribute('aria-disabled')).toBe('true');
  expect(await page.getByRole('radio', { checked: true }).count()).toBe(0);

  const unit = panel(page, '2 questions').getByRole('listitem').filter({ hasText: 'thousands or millions' });
  await unit.getByRole('button', { name: 'Income statement!B6' }).click();
  await shown(page.getByRole('cell').and(page.locator('[aria-current="true"]')));
  await unit.getByRole('button', { name: 'Thousands' }).click();
  await panel(page, 'One question').getByRole('button', { name: 'EUR' }).click();
  await shown(page.getByRole('heading', { name: 'All questions answered' }));

  await accept.click();
  await shown(page.getByText('say whether these are audited, reviewed or management accounts'));
  await page.getByRole('radio', { name: 'management' }).check();
  await page.getByRole('radio', { name: 'the group' }).check();
  await follow(page, () => accept.click());
  expect(page.url()).toMatch(/\/borrowers\/\d+$/);
  story.borrowerPath = pathOf(page);
});

test('the borrower is assessed at once: covenants, strips, chart, reporting quality, each figure with its cell', async ({
  page,
}) => {
  await signInOn(page, ANALYST);
  await openBorrower(page, BORROWER);
  expect(pathOf(page)).toBe(story.borrowerPath);
  await shown(page.getByText('peers as of last night'));

  const leverage = row(page, /^Net leverage/);
  await shown(leverage.filter({ hasText: 'not met' }).filter({ hasText: '30 Sep 2026, preliminary' }));
  await shown(leverage.filter({ hasText: 'at most 3.50x' }));
  await shown(leverage.getByRole('img', { name: /^Net leverage, .*30 Sep 2026 not met, short by/ }));
  await shown(page.getByRole('cell', { name: /^Liquidity may fall .* \([\d.]+ %\)$/ }));
  await shown(
    page.getByRole('img', { name: /^Net leverage over \d+ tests\. Latest .* on 30 Sep 2026, .*: not met/ }),
  );
  await shown(page.getByRole('heading', { name: 'Headroom' }));

  const quality = panel(page, 'Reporting quality');
  await shown(quality.getByText(/^Quarter to 30 Sep 2026/));
  for (const block of ['Unexplained accruals', 'Sharpest stretch', 'Cash conversion'])
    await shown(quality.getByText(block));
  for (const caution of CAUTIONS) await shown(page.getByRole('note').filter({ hasText: caution }));

  await row(page, /^Senior debt/)
    .getByRole('link', { name: 'at 30 Sep 2026' })
    .click();
  await page.waitForURL(new RegExp(`${story.importPath}\\?sheet=Balance\\+sheet&cell=C\\d+`));
  const source = page.getByRole('cell').and(page.locator('[aria-current="true"]'));
  await shown(
    page.getByRole('row', { name: /Long-term borrowings/ }).and(page.locator(':has([aria-current])')),
  );
  expect(await source.textContent()).toMatch(/^[\d,]+$/);
});

test('statements stand as versions, and every amount leads to its cell in the file', async ({ page }) => {
  await signInOn(page, ANALYST);
  await visit(page, story.borrowerPath);
  await follow(page, () => page.getByRole('link', { name: 'Statements' }).click());
  const income = page.getByRole('table', { name: /^Income statement/ });
  await shown(income.getByRole('columnheader', { name: /^30 Sep 2026 3 months, management, EUR version 1/ }));
  await income
    .getByRole('row', { name: /^Revenue/ })
    .getByRole('link')
    .first()
    .click();
  await page.waitForURL(new RegExp(`${story.importPath}\\?sheet=Income\\+statement&cell=C6`));
});

test('the administrator starts the nightly run by hand and sees it progress to its end', async ({ page }) => {
  await signInOn(page, 'administrator');
  await follow(page, () => page.getByRole('link', { name: 'Desk settings' }).click());
  const day = await page.getByLabel('Business date').inputValue();
  await page.getByRole('button', { name: /^Start the run for/ }).click();
  await shown(page.getByRole('progressbar'));
  await shown(page.getByRole('button', { name: 'A run is going on' }));
  const run = panel(page, /^Run for/).filter({ hasText: 'Bram Oostrick' });
  await run.getByText('Done', { exact: true }).waitFor({ timeout: 60_000 });
  expect(await run.textContent()).toMatch(/Tested(\d+) of \1Failed0/);
  story.businessDay = day;
}, 90_000);

test('the digest is in the relationship manager’s mail, and its link leads through the sign-in to the alert', async ({
  page,
}) => {
  const { email } = demoSignIn(MANAGER);
  const item = new RegExp(`${BORROWER} .* · test not met, urgent\\s[^]*?(http\\S+/alerts/\\d+)`);
  const mail = await mailThat(({ to, text }) => to.includes(email) && item.test(text));
  expect(mail.subject).toMatch(/^\[Harbour desk\] .*needs? a decision/);
  expect(mail.subject).not.toContain('Juniverre');
  expect(mail.text).toContain(BORROWER);
  const inOneLine = (text: string) => text.replaceAll(/\s+/g, ' ');
  for (const caution of CAUTIONS) {
    expect(inOneLine(mail.text)).toContain(caution);
    expect(inOneLine(mail.html).replaceAll('&#39;', "'")).toContain(caution);
  }
  const [, link = ''] = item.exec(mail.text) ?? [];
  story.alertPath = new URL(link).pathname;

  await page.goto(link);
  await page.getByLabel('Email address').fill(email);
  await page.getByLabel('Password').fill(demoSignIn(MANAGER).password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL(link);
  await shown(page.getByRole('heading', { level: 1, name: 'Test not met' }));
  await shown(page.getByRole('heading', { name: BORROWER }));
});

test('Alerts is sorted and filtered, the address carries the view, and a copied link shows the same', async ({
  page,
}) => {
  await signInOn(page, MANAGER);
  const names = () => page.getByRole('rowheader').getByRole('link').allTextContents();
  await page.getByRole('button', { name: 'Borrower', exact: true }).click();
  await page.waitForURL(/sort=borrower/);
  await shown(
    page.getByRole('columnheader', { name: 'Borrower' }).and(page.locator('[aria-sort="ascending"]')),
  );
  const sorted = (found: string[]) => found.toSorted((one, other) => one.localeCompare(other));
  const everyName = sorted(await names());
  expect(new Set(everyName).size).toBeGreaterThan(1);
  await expect.poll(names).toEqual(everyName);
  await page.getByRole('button', { name: 'Borrower', exact: true }).click();
  await page.waitForURL(/direction=down/);
  await expect.poll(names).toEqual(everyName.toReversed());

  await page.getByLabel('Kind:').selectOption('Test not met');
  await page.waitForURL(/kind=test\+not\+met/);
  await expect.poll(names).toEqual([BORROWER]);
  await page.getByLabel('Severity:').selectOption('urgent');
  await page.waitForURL(/severity=urgent/);

  const copy = await page.context().newPage();
  await visit(copy, page.url());
  expect(await copy.getByRole('rowheader').getByRole('link').allTextContents()).toEqual([BORROWER]);
  expect(await copy.getByLabel('Kind:').inputValue()).toBe('test not met');
  await copy.close();

  await page.goBack();
  await expect.poll(() => page.getByLabel('Severity:').inputValue()).toBe('');
});

test('the manager reads the evidence, takes the alert and proposes the borrower for the watchlist', async ({
  page,
}) => {
  await signInOn(page, MANAGER);
  await visit(page, '/alerts?kind=test+not+met');
  await row(page, new RegExp(BORROWER)).getByText('Net leverage').first().click();
  const evidence = panel(page, BORROWER);
  await shown(evidence.getByText('What would change this:'));
  await shown(evidence.getByRole('img', { name: /^Net leverage of/ }));
  for (const caution of CAUTIONS) await shown(evidence.getByText(caution));
  await evidence.getByRole('button', { name: 'Take it' }).click();
  await shown(evidence.getByRole('list', { name: 'What was done' }).getByText('Taken by Ruben Astrelle'));

  await evidence.getByRole('button', { name: 'Propose for watchlist' }).click();
  const dialog = await openedDialog(page, /^Propose for watchlist/);
  const propose = dialog.getByRole('button', { name: 'Propose' });
  await propose.click();
  await shown(dialog.getByText('choose a grade'));
  await dialog.getByRole('radio', { name: 'W2, act' }).check();
  await dialog
    .getByLabel('Reason')
    .fill('Net leverage is not met on our figures after the borrowing of the summer.');
  await dialog.getByLabel('Owner of the plan').selectOption('Ruben Astrelle');
  await dialog
    .getByLabel('Plan', { exact: true })
    .fill('Meet the borrower; a plan to bring the debt down by the next test.');
  await propose.click();
  await shown(dialog.getByText('a day as YYYY-MM-DD'));
  await dialog.getByLabel('Next review').fill('2027-02-15');
  await propose.click();
  await dialog.waitFor({ state: 'hidden' });
  await shown(evidence.getByText('A watchlist proposal waits for a decision.'));
});

test('the manager closes an alert with a reason from the list', async ({ page }) => {
  await signInOn(page, MANAGER);
  await visit(page, '/alerts?kind=thin+headroom');
  await row(page, /Stradomarrel/)
    .getByRole('link')
    .click();
  expect(pathOf(page)).toMatch(/^\/alerts\/\d+$/);
  await page.getByRole('button', { name: 'Take it' }).click();
  await page.getByRole('button', { name: 'Close with reason' }).click();
  const dialog = await openedDialog(page, /^Close with reason/);
  await dialog.getByLabel('Reason').selectOption('3. Timing or seasonality, evidence seen');
  await dialog.getByLabel('What was seen').fill('Fleet insurance is paid in one sum in September.');
  await dialog.getByRole('button', { name: 'Close', exact: true }).click();
  await dialog.waitFor({ state: 'hidden' });
  await shown(page.getByText('Timing or seasonality, evidence seen. Fleet insurance'));
  await visit(page, '/alerts?kind=thin+headroom');
  await shown(page.getByText('No alerts in this view'));
});

test('the server refuses a decision by whoever proposed', async ({ page }) => {
  await signInOn(page, 'committee member, head of credit');
  await openBorrower(page, 'Solvarde Fish Products Oy');
  await page.getByRole('button', { name: 'Propose for watchlist' }).click();
  const dialog = await openedDialog(page, /^Propose for watchlist/);
  await dialog.getByRole('radio', { name: 'W1, monitor' }).check();
  await dialog.getByLabel('Reason').fill('The catch quota of next year is not settled.');
  await dialog.getByLabel('Owner of the plan').selectOption('Ruben Astrelle');
  await dialog.getByLabel('Plan', { exact: true }).fill('Read the quota decision in January and report.');
  await dialog.getByLabel('Next review').fill('2027-01-29');
  await dialog.getByRole('button', { name: 'Propose' }).click();
  await shown(page.getByRole('link', { name: 'A watchlist proposal waits for a decision' }));

  await visit(page, '/watchlist');
  const own = row(page, /^Solvarde/);
  await shown(own.getByText('You proposed this; another member decides.'));
  expect(await own.getByRole('button', { name: 'Decide' }).count()).toBe(0);
  const { proposals } = (await (await page.request.get('/api/v1/watchlist')).json()) as WatchlistView;
  const proposal = proposals.find(({ borrowerName }) => borrowerName === 'Solvarde Fish Products Oy');
  const refused = await page.request.post(`/api/v1/proposals/${proposal?.id}/decision`, {
    data: { decision: 'approve', text: 'I am content with my own proposal.' },
    headers: { origin: inject('baseUrl'), 'if-match': '"1"' },
  });
  expect(refused.status()).toBe(403);
  expect(await refused.text()).toContain('You proposed this; another committee member decides it.');
  await page.reload();
  await shown(own.getByText('You proposed this; another member decides.'));
});

test('another committee member decides, and the borrower stands on the watchlist and on its own page', async ({
  page,
}) => {
  await signInOn(page, 'committee member, head of credit');
  await follow(page, () => page.getByRole('link', { name: 'Watchlist' }).click());
  await row(page, new RegExp(`^${BORROWER}`))
    .getByRole('button', { name: 'Decide' })
    .click();
  const dialog = await openedDialog(page, /^Decide/);
  await shown(dialog.getByText('Ruben Astrelle proposes W2.'));
  await dialog.getByRole('button', { name: 'Approve' }).click();
  await shown(dialog.getByText('give the reason, in 10 characters or more'));
  await dialog.getByLabel('Reason for the decision').fill('Agreed: the plan goes to the next meeting.');
  await dialog.getByRole('button', { name: 'Approve' }).click();
  await dialog.waitFor({ state: 'hidden' });

  const listed = panel(page, 'On the watchlist').getByRole('row', { name: new RegExp(`^${BORROWER}`) });
  await shown(listed.getByText('proposed by Ruben Astrelle, decided by Agneta Lornby'));
  await listed.getByRole('link', { name: BORROWER }).click();
  await shown(page.getByText(/on watchlist at W2 since/));
});

test('the review sheet is opened and exported as a workbook, marked DRAFT', async ({ page }) => {
  await signInOn(page, 'committee member, head of credit');
  await visit(page, story.borrowerPath);
  await follow(page, () => page.getByRole('link', { name: 'Review sheet' }).click());
  await shown(page.getByText('DRAFT', { exact: true }));
  for (const heading of [/^1 /, /^3 /, /^6 /, /^7 /, /^9 /, /^11 /, /^12 /, /^16 /])
    await shown(page.getByRole('heading', { name: heading }));
  expect(await page.getByRole('heading', { name: /not recorded$/ }).count()).toBeGreaterThan(0);
  for (const caution of CAUTIONS) await shown(page.getByRole('note').filter({ hasText: caution }));

  const coming = page.waitForEvent('download');
  await page.getByRole('link', { name: 'Export as XLSX' }).click();
  const words = await wordsOf(await coming);
  expect(words).toContain('DRAFT');
  expect(words).toContain(BORROWER);
  for (const caution of CAUTIONS) expect(words).toContain(caution);
});

async function wordsOf(download: Download): Promise<string> {
  expect(download.suggestedFilename()).toMatch(/^Review sheet Juniverre .* DRAFT\.xlsx$/);
  const workbook = new ExcelJS.Workbook();
  await workbook.xlsx.readFile(await download.path());
  const words: string[] = [];
  workbook.eachSheet((sheet) =>
    sheet.eachRow((line) => line.eachCell((cell) => cell.value !== null && words.push(cell.text))),
  );
  return words.join('\n');
}

/** Buttons that change what is shown and nothing else: views, orders, sheets, cells of a file. */
const VIEW_BUTTON =
  /^(Not taken yet|My desk|[↑↓]?(Borrower|Earnings may fall|Reporting quality|Due)[↑↓]?|All|Drafts|Accepted|Withdrawn|.+ \d+ rows|.+![A-Z]+\d+)$/;

test('the auditor reads all of it and can change none of it', async ({ page }) => {
  await signInOn(page, 'auditor');
  for (const path of [
    '/alerts',
    story.alertPath,
    story.borrowerPath,
    `${story.borrowerPath}/statements`,
    `${story.borrowerPath}/review-sheet`,
    '/watchlist',
    '/imports',
    story.importPath,
  ]) {
    await visit(page, path);
    await shown(page.getByRole('heading', { level: 1 }));
    const buttons = await page.getByRole('main').getByRole('button').allTextContents();
    expect(
      buttons.filter((name) => !VIEW_BUTTON.test(name)),
      path,
    ).toEqual([]);
    expect(await page.getByRole('main').getByRole('radio').count(), path).toBe(0);
  }
});

test('the audit log has every step above, and its chain is intact', async ({ page }) => {
  await signInOn(page, 'auditor');
  await follow(page, () => page.getByRole('link', { name: 'Audit log' }).click());
  for (const [action, who, summary] of [
    ['stage-import', 'Jonna Tervikke', `Received Juniverre 2026-09-30.xlsx for ${BORROWER}`],
    ['answer-import', 'Jonna Tervikke', ''],
    ['accept-import', 'Jonna Tervikke', `statements of ${BORROWER}`],
    ['assess-borrower', '', BORROWER],
    ['start-run', 'Bram Oostrick', `Nightly run for ${story.businessDay} started by hand`],
    ['finish-run', '', `Nightly run for ${story.businessDay}`],
    ['send-mail', '', 'was handed to the mail server'],
    ['alert-take', 'Ruben Astrelle', `${BORROWER}, test not met: Taken`],
    ['alert-close', 'Ruben Astrelle', 'thin headroom: Closed: Timing or seasonality'],
    ['propose-watchlist', 'Ruben Astrelle', BORROWER],
    ['decide-proposal', 'Agneta Lornby', `Approved: ${BORROWER}`],
    ['export-review-sheet', 'Agneta Lornby', BORROWER],
  ] as const) {
    await page.getByLabel('What was done').fill(action);
    await page.waitForURL(new RegExp(`action=${action}$`));
    await row(page, new RegExp(`${who}.*${summary}.*${action}`))
      .first()
      .waitFor();
  }
  await page.getByRole('button', { name: 'Check the chain' }).click();
  await shown(page.getByText(/^All \d+ entries follow from one another; head [0-9a-f]{12}\.$/));
});
