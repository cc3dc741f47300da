/** Where the story of the walk has got to, and how its people find their way. */
import type { Locator, Page } from 'playwright-core';
import { follow } from '../../support/browser.ts';

export const ANALYST = 'analyst, Harbour desk';
export const MANAGER = 'head of Harbour desk';
export const BORROWER = 'Juniverre Confiserie SAS';

export const story = { importPath: '', borrowerPath: '', alertPath: '', businessDay: '' };

export const pathOf = (page: Page): string => new URL(page.url()).pathname;
export const panel = (page: Page, name: string | RegExp): Locator => page.getByRole('region', { name });
export const row = (page: Page, name: string | RegExp): Locator => page.getByRole('row', { name });
export const shown = (where: Locator): Promise<void> => where.first().waitFor();

/** From anywhere: `/`, some letters, Enter. */
export async function openBorrower(page: Page, name: string): Promise<void> {
  await page.getByRole('combobox', { name: 'Find a borrower' }).fill(name.slice(0, 9));
  await shown(page.getByRole('option', { name }));
  await follow(page, () => page.keyboard.press('Enter'));
  await shown(page.getByRole('heading', { level: 1, name }));
}

export async function openedDialog(page: Page, name: RegExp): Promise<Locator> {
  const dialog = page.getByRole('dialog', { name });
  await shown(dialog);
  return dialog;
}
