/** From the workbook that was owed to the borrower’s page. */
import { expect } from 'vitest';
import { CAUTIONS } from '../../../src/core/cautions.ts';
import { follow, signInOn, test, visit } from '../../support/browser.ts';
import { owedWorkbook } from '../../support/owedWorkbook.ts';
import { ANALYST, BORROWER, story, pathOf, panel, row, shown, openBorrower } from './story.ts';

export function fromWorkbookToBorrower(): void {
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

    const unit = panel(page, '2 questions')
      .getByRole('listitem')
      .filter({ hasText: 'thousands or millions' });
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
    await shown(
      income.getByRole('columnheader', { name: /^30 Sep 2026 3 months, management, EUR version 1/ }),
    );
    await income
      .getByRole('row', { name: /^Revenue/ })
      .getByRole('link')
      .first()
      .click();
    await page.waitForURL(new RegExp(`${story.importPath}\\?sheet=Income\\+statement&cell=C6`));
  });
}
