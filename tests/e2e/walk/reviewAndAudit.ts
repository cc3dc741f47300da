/** The review sheet, and what the auditor finds. */
import ExcelJS from 'exceljs';
import type { Download } from 'playwright-core';
import { expect } from 'vitest';
import { CAUTIONS } from '../../../src/core/cautions.ts';
import { follow, signInOn, test, visit } from '../../support/browser.ts';
import { BORROWER, story, row, shown } from './story.ts';

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

export function reviewAndAudit(): void {
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
}
