/** From the night by way of mail and alert to the watchlist. */
import { expect, inject } from 'vitest';
import type { WatchlistView } from '../../../src/contracts/watchlist.ts';
import { CAUTIONS } from '../../../src/core/cautions.ts';
import { follow, signInOn, test, visit } from '../../support/browser.ts';
import { demoSignIn, mailThat } from '../../support/demo.ts';
import { MANAGER, BORROWER, story, pathOf, panel, row, shown, openBorrower, openedDialog } from './story.ts';

export function fromNightToWatchlist(): void {
  test('the administrator starts the nightly run by hand and sees it progress to its end', async ({
    page,
  }) => {
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
}
