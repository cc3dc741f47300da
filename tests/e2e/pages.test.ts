/**
 * Every page as every role, wide by day and narrow by night: it answers, logs nothing, refuses nothing by its content
 * security policy, does not scroll sideways and passes the accessibility rules.
 */
import { AxeBuilder } from '@axe-core/playwright';
import type { Locator, Page } from 'playwright-core';
import { describe, expect } from 'vitest';
import { demoSignIn } from '../support/demo.ts';
import { follow, openPage, refusalsApart, signInOn, test, visit } from '../support/browser.ts';
import { owedWorkbook } from '../support/owedWorkbook.ts';

const WIDE_BY_DAY = { width: 1440, height: 900, colorScheme: 'light' } as const;
const NARROW_BY_NIGHT = { width: 390, height: 844, colorScheme: 'dark' } as const;
const VIEWS = [WIDE_BY_DAY, NARROW_BY_NIGHT];

/** Where tables begin to fold and where a phone ends. */
const WIDTHS = [1440, 1024, 1000, 768, 390, 320];

/** The pages are the same for every role but for their buttons: each page's rules are run in both views. */
const ROLES = [
  { part: 'analyst', rulesAt: [390] },
  { part: 'relationship manager', rulesAt: [] },
  { part: 'committee member', rulesAt: [1440] },
  { part: 'administrator', rulesAt: [1440, 390] },
  { part: 'auditor', rulesAt: [] },
] as const;

const BORROWER_PARTS = ['', '/outlook', '/statements', '/quality', '/alerts', '/facilities', '/review-sheet'];

interface Rows {
  readonly rows: readonly { readonly id: number; readonly borrowerId: number }[];
}

/** What the person finds: each kind of page once. */
async function addressesFor(page: Page): Promise<string[]> {
  const firstOf = async (list: string) => {
    const answer = await page.request.get(`/api/v1/${list}`);
    return answer.ok() ? ((await answer.json()) as Rows).rows[0] : undefined;
  };
  const alert = await firstOf('alerts?view=desk&sort=borrower');
  const received = await firstOf('imports?state=accepted');
  return [
    '/alerts',
    '/watchlist',
    '/borrowers',
    '/imports',
    '/book',
    '/book/projections',
    '/audit-log',
    '/desk-settings/runs',
    '/desk-settings/policy',
    '/methods',
    '/methods/alerts',
    '/methods/headroom',
    '/methods/validation',
    '/account',
    ...(alert ? [`/alerts/${alert.id}`] : []),
    ...(alert ? BORROWER_PARTS.map((part) => `/borrowers/${alert.borrowerId}${part}`) : []),
    ...(received ? [`/imports/${received.id}`] : []),
  ];
}

const sideways = (): number => document.documentElement.scrollWidth - document.documentElement.clientWidth;

/** Charts follow a new width a moment later. */
async function overflow(page: Page): Promise<number> {
  for (let tries = 0; tries < 10 && (await page.evaluate(sideways)) > 0; tries += 1)
    await page.waitForTimeout(50);
  return page.evaluate(sideways);
}

async function accessibilityFaults(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page })
    .setLegacyMode(true)
    .options({ resultTypes: ['violations'] })
    .analyze();
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`);
}

/** Faults of one page, each with its address. */
async function look(page: Page, address: string, rules: boolean, status = 200): Promise<string[]> {
  const faults: string[] = [];
  const answer = await visit(page, address);
  if (answer?.status() !== status) faults.push(`answered ${answer?.status() ?? 'nothing'}`);
  const here = page.viewportSize() ?? WIDE_BY_DAY;
  for (const width of rules ? WIDTHS : [here.width]) {
    await page.setViewportSize({ ...here, width });
    const wide = await overflow(page);
    if (wide > 0) faults.push(`scrolls sideways by ${wide} px at ${width}`);
  }
  await page.setViewportSize(here);
  if (rules) faults.push(...(await accessibilityFaults(page)));
  return faults.map((fault) => `${address} at ${here.width}: ${fault}`);
}

describe.each(ROLES)('as $part', ({ part, rulesAt }) => {
  test.for(VIEWS)('every page at $width px', { timeout: 90_000 }, async (view) => {
    const { page, faults, close } = await openPage(view);
    await signInOn(page, part);
    const rules = (rulesAt as readonly number[]).includes(view.width);
    const found: string[] = [];
    for (const address of await addressesFor(page)) found.push(...(await look(page, address, rules)));
    await close();
    expect([...found, ...faults]).toEqual([]);
  });
});

test.for(VIEWS)('every page before sign-in at $width px', async (view) => {
  const { page, faults, close } = await openPage(view);
  const found: string[] = [];
  for (const [address, status] of [
    ['/sign-in', 200],
    ['/sign-in?ended=1&next=/alerts', 200],
    ['/forgot-password', 200],
    ['/reset-password?token=none', 410],
    ['/unsubscribe?token=none', 404],
    ['/set-up', 410],
  ] as const)
    found.push(...(await look(page, address, true, status)));
  await close();
  expect([...found, ...faults.filter(refusalsApart)]).toEqual([]);
});

test.for(VIEWS)('what opens on a page keeps the rules too, at $width px', async (view) => {
  const { page, faults, close } = await openPage(view);
  const found: string[] = [];
  const check = async (what: string) =>
    found.push(...(await accessibilityFaults(page)).map((fault) => `${what}: ${fault}`));
  const closing = async (dialog: Locator, what: string) => {
    await dialog.waitFor();
    await check(what);
    await page.keyboard.press('Escape');
    await dialog.waitFor({ state: 'hidden' });
  };

  await signInOn(page, 'analyst, Harbour desk');
  await visit(page, '/imports');
  const { bytes } = await owedWorkbook('Juniverre', view.width);
  await page.getByLabel('Borrower', { exact: true }).selectOption('Kaldermarrow Pressings Ltd');
  await page.getByLabel('Workbook').setInputFiles({ name: 'Rules.xlsx', mimeType: '', buffer: bytes });
  await follow(page, () => page.getByRole('button', { name: 'Read the file' }).click());
  await page.getByRole('button', { name: 'Thousands' }).waitFor();
  await check('a draft with open questions');
  if ((await overflow(page)) > 0) found.push('a draft scrolls sideways');
  await page.getByRole('button', { name: 'Withdraw this import…' }).click();
  await page.getByRole('button', { name: 'Withdraw this import' }).click();
  await page.getByText('This import is withdrawn').waitFor({ state: 'attached' });

  await page.context().clearCookies();
  await signInOn(page, 'head of Northern desk');
  await page.keyboard.press('?');
  await closing(page.getByRole('dialog', { name: 'Keys' }), 'the list of keys');
  await page.getByRole('button', { name: 'Maren Holtqvane' }).click();
  await page.getByRole('button', { name: 'Sign out' }).waitFor();
  await check('the person’s menu');
  await page.keyboard.press('Escape');

  const alerts = await page.request.get('/api/v1/alerts?view=mine&severity=soon');
  const { rows } = (await alerts.json()) as Rows;
  await visit(page, `/alerts/${rows[0]?.id}`);
  for (const step of ['Put off', 'Close with reason', 'Propose for watchlist']) {
    await page.getByRole('button', { name: step }).click();
    await closing(page.getByRole('dialog', { name: new RegExp(`^${step}`) }), step);
  }
  await close();
  expect([...found, ...faults]).toEqual([]);
});

test('a page of another desk and one that never was look the same', async () => {
  const { page, faults, close } = await openPage();
  await signInOn(page, 'analyst, Northern desk');
  const texts: string[] = [];
  for (const address of ['/borrowers/5', '/borrowers/999999', '/nothing/here']) {
    expect(await look(page, address, true, 404)).toEqual([]);
    texts.push(await page.getByRole('main').innerText());
  }
  expect(new Set(texts).size).toBe(1);
  await close();
  expect(faults.filter(refusalsApart)).toEqual([]);
});

test('an administrator without another role sees no borrower', async () => {
  const { page, faults, close } = await openPage();
  await signInOn(page, 'administrator');
  expect(new URL(page.url()).pathname).toBe('/desk-settings/runs');
  for (const [address, what] of [
    ['/alerts', 'read alerts'],
    ['/borrowers', 'read borrowers'],
    ['/watchlist', 'read the watchlist'],
    ['/imports', 'read imports'],
    ['/book', 'read the book'],
  ] as const) {
    await visit(page, address);
    await page.getByText(`Your role may not ${what}`).waitFor();
    expect(await page.getByRole('main').getByRole('table').count()).toBe(0);
  }
  for (const part of BORROWER_PARTS) {
    const answer = await visit(page, `/borrowers/1${part}`);
    expect(answer?.status(), part).toBe(404);
  }
  expect(await page.getByRole('combobox', { name: 'Find a borrower' }).count()).toBe(0);
  await close();
  expect(faults.filter(refusalsApart)).toEqual([]);
});

test('without a script a person signs in, reads a borrower and signs out', async () => {
  const { page, close } = await openPage({ javaScriptEnabled: false });
  const { email, password } = demoSignIn('relationship manager');
  await page.goto('/borrowers/1');
  expect(new URL(page.url()).pathname).toBe('/sign-in');
  await page.getByLabel('Email address').fill(email);
  await page.getByLabel('Password').fill('not this one');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('status').getByText('Address and password do not belong together.').waitFor();
  expect(await page.getByLabel('Email address').inputValue()).toBe(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL('/borrowers/1');
  await page.getByRole('table', { name: 'Covenants, latest test of each' }).waitFor();
  await page.getByRole('button', { name: 'Piers Wexcombe' }).click();
  await page.getByRole('button', { name: 'Sign out' }).click();
  await page.getByText('You are signed out.').waitFor();
  await close();
});
