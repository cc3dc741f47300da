/** The policy changes by two persons; the next night computes by it, and what was computed before keeps its version. */
import { expect } from 'vitest';
import type { BorrowerView } from '../../../src/contracts/borrowers.ts';
import { follow, signInOn, test, visit } from '../../support/browser.ts';
import { openedDialog, panel, shown, story } from './story.ts';

const VALUE = 'Reporting quality fell: a lower band and at least';

export function policyByTwoPersons(): void {
  test('an administrator proposes another value, is told what cannot stand, and cannot decide', async ({
    page,
  }) => {
    await signInOn(page, 'administrator');
    await follow(page, () => page.getByRole('link', { name: 'Policy', exact: true }).first().click());
    await page.getByRole('button', { name: 'Propose a change' }).click();
    await page.getByLabel(VALUE).fill('101');
    await page.getByRole('button', { name: 'Propose the change' }).click();
    await shown(page.getByText('It must be between 1 point and 100 points.'));
    await page.getByLabel(VALUE).fill('11');
    await page.getByLabel('Reason').fill('Ten points are within the noise of one quarter.');
    await page.getByRole('button', { name: 'Propose the change' }).click();
    const proposed = panel(page, 'Proposed change');
    await shown(proposed.getByRole('row', { name: `${VALUE} 10 points 11 points` }));
    expect(await proposed.getByRole('button', { name: 'Decide' }).count()).toBe(0);
    await shown(panel(page, 'In force: version 1'));
  });

  test('a committee member finds it from any page and confirms it', async ({ page }) => {
    await signInOn(page, 'committee member, head of credit');
    await follow(page, () => page.getByRole('link', { name: /^Policy ?1 to decide$/ }).click());
    await panel(page, 'Proposed change').getByRole('button', { name: 'Decide' }).click();
    const dialog = await openedDialog(page, /^Decide on the change/);
    await dialog.getByLabel('Reason for the decision').fill('Agreed by the committee.');
    await dialog.getByRole('button', { name: 'Confirm' }).click();
    await shown(panel(page, 'In force: version 2'));
    const versions = panel(page, 'Versions');
    await shown(versions.getByText('Proposed by Bram Oostrick, confirmed by Agneta Lornby'));
    expect(await versions.textContent()).toContain('10 points → 11 points');

    await visit(page, '/methods/alerts');
    const settings = panel(page, 'Settings in force');
    expect(await settings.textContent()).toContain('11 points');
    expect(await settings.textContent()).toContain('From policy version 2');
  });

  test('the next night computes by it', async ({ page }) => {
    const policyVersion = async (): Promise<number | undefined> => {
      const answer = await page.request.get(`/api/v1${story.borrowerPath}`);
      return ((await answer.json()) as BorrowerView).computed?.policyVersion;
    };
    await signInOn(page, 'auditor');
    expect(await policyVersion()).toBe(1);

    await page.context().clearCookies();
    await signInOn(page, 'administrator');
    await visit(page, '/desk-settings/runs');
    await page.getByRole('button', { name: /^Start the run for/ }).click();
    await shown(page.getByRole('button', { name: 'A run is going on' }));
    await page.getByRole('button', { name: /^Start the run for/ }).waitFor({ timeout: 80_000 });

    await page.context().clearCookies();
    await signInOn(page, 'auditor');
    expect(await policyVersion()).toBe(2);
  }, 120_000);
}
