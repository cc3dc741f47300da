/** The keyboard: the skip link, the search, rows, the list of keys, a focus that is seen; and day and night. */
import type { Page } from 'playwright-core';
import { expect } from 'vitest';
import { follow, signInOn, test, visit } from '../support/browser.ts';

const MANAGER = 'head of Northern desk';

const focused = (page: Page) => page.locator(':focus');

test('the first Tab offers to skip to the page, and the focus is seen wherever it goes', async ({ page }) => {
  await signInOn(page, MANAGER);
  await visit(page, '/alerts');
  await page.keyboard.press('Tab');
  const skip = page.getByRole('link', { name: 'Skip to the page' });
  expect(await skip.evaluate((link) => link === document.activeElement)).toBe(true);
  expect((await skip.boundingBox())?.y).toBeGreaterThanOrEqual(0);

  const stops = new Set<string>();
  for (let tabs = 0; tabs < 25; tabs += 1) {
    await page.keyboard.press('Tab');
    const { name, seen } = await focused(page).evaluate((element) => {
      const { outlineStyle, outlineWidth, boxShadow, borderColor } = getComputedStyle(element);
      const ringed = outlineStyle !== 'none' && parseFloat(outlineWidth) > 0;
      const label = element.closest('label');
      const labelRing = label && getComputedStyle(label).outlineStyle !== 'none';
      return {
        name: `${element.tagName} ${element.textContent?.slice(0, 40) ?? ''} ${borderColor}`,
        seen: ringed || boxShadow !== 'none' || labelRing === true,
      };
    });
    stops.add(name);
    expect(seen, `focus on ${name}`).toBe(true);
  }
  expect(stops.size).toBeGreaterThan(15);

  await visit(page, '/alerts');
  await page.keyboard.press('Tab');
  await page.keyboard.press('Enter');
  expect(await page.getByRole('main').evaluate((main) => main === document.activeElement)).toBe(true);
});

test('/ goes to the search, arrows choose, Enter opens, Escape clears', async ({ page }) => {
  await signInOn(page, MANAGER);
  await page.keyboard.press('/');
  const search = page.getByRole('combobox', { name: 'Find a borrower' });
  expect(await search.evaluate((input) => input === document.activeElement)).toBe(true);
  await page.keyboard.type('zzz');
  await page.getByText('No borrower that you can see is called “zzz”.').waitFor();
  await page.keyboard.press('Escape');
  expect(await search.inputValue()).toBe('');
  await page.keyboard.type('marrow');
  const options = page.getByRole('option');
  await options.nth(1).waitFor();
  await page.keyboard.press('ArrowDown');
  expect(await options.nth(1).getAttribute('aria-selected')).toBe('true');
  const href = await options.nth(1).getAttribute('href');
  await follow(page, () => page.keyboard.press('Enter'));
  expect(new URL(page.url()).pathname).toBe(href);
});

test('j and k move over the rows of Alerts and Enter shows the evidence', async ({ page }) => {
  await signInOn(page, MANAGER);
  await visit(page, '/alerts?sort=borrower');
  const current = () => page.getByRole('row').and(page.locator('[data-current="true"]')).innerText();
  const rows = page.getByRole('row');
  await page.keyboard.press('j');
  expect(await current()).toBe(await rows.nth(1).innerText());
  await page.keyboard.press('j');
  expect(await current()).toBe(await rows.nth(2).innerText());
  await page.keyboard.press('k');
  expect(await current()).toBe(await rows.nth(1).innerText());
  const borrower = await rows.nth(1).getByRole('link').innerText();
  await page.keyboard.press('Enter');
  await page.getByRole('region', { name: borrower }).getByText('What would change this:').waitFor();
  await page.getByRole('button', { name: 'Put away' }).click();
  expect(await page.getByText('What would change this:').count()).toBe(0);
});

test('j and Enter open a borrower, and letters typed into a field stay letters', async ({ page }) => {
  await signInOn(page, MANAGER);
  await visit(page, '/borrowers?sort=name');
  const search = page.getByRole('combobox', { name: 'Find a borrower' });
  await search.fill('jk/?');
  expect(await search.inputValue()).toBe('jk/?');
  expect(await page.getByRole('dialog').count()).toBe(0);
  await page.keyboard.press('Escape');
  await page.getByRole('heading', { level: 1 }).click();
  await page.keyboard.press('j');
  const name = await page.getByRole('rowheader').first().getByRole('link').innerText();
  await follow(page, () => page.keyboard.press('Enter'));
  await page.getByRole('heading', { level: 1, name }).waitFor();
});

test('? lists the keys, Escape puts the list away and the focus goes back', async ({ page }) => {
  await signInOn(page, MANAGER);
  const link = page.getByRole('link', { name: 'Watchlist' });
  await link.focus();
  await page.keyboard.press('?');
  const dialog = page.getByRole('dialog', { name: 'Keys' });
  for (const does of ['Find a borrower', 'List the keys', 'Next row', 'Row before', 'Open the row'])
    await dialog.getByText(does).waitFor();
  await page.keyboard.press('Escape');
  await dialog.waitFor({ state: 'hidden' });
  expect(await link.evaluate((element) => element === document.activeElement)).toBe(true);
});

test('columns are chosen, and what is chosen is shown', async ({ page }) => {
  await signInOn(page, MANAGER);
  await visit(page, '/alerts');
  await page.getByRole('columnheader', { name: 'Owner' }).waitFor();
  await page.getByText('Columns', { exact: true }).click();
  await page.getByRole('checkbox', { name: 'Owner' }).uncheck();
  await page.getByRole('columnheader', { name: 'Owner' }).waitFor({ state: 'detached' });
});

test('night is chosen once and stays', async ({ page }) => {
  await signInOn(page, MANAGER);
  const paper = () => page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor);
  const day = await paper();
  await page.getByRole('button', { name: 'Maren Holtqvane' }).click();
  await follow(page, () => page.getByRole('button', { name: 'Night' }).click());
  const night = await paper();
  expect(night).not.toBe(day);
  await visit(page, '/borrowers');
  expect(await paper()).toBe(night);
});
