/**
 * A test with a page of Chromium. Whatever the page logs as an error, throws or refuses by its content security
 * policy fails the test that it happened in.
 */
import { join } from 'node:path';
import { chromium, type Browser, type Page, type Response } from 'playwright-core';
import { afterAll, expect, inject, test as base } from 'vitest';
import { demoSignIn } from './demo.ts';

const FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

let browser: Promise<Browser> | null = null;
const open = (): Promise<Browser> =>
  (browser ??= chromium.launch({
    executablePath: process.env['CHROMIUM'] ?? '/usr/bin/chromium',
    args: FLAGS,
  }));

afterAll(async () => {
  const opened = browser;
  browser = null;
  await (await opened)?.close();
});

export interface BrowserContextOptions {
  readonly width?: number;
  readonly height?: number;
  readonly colorScheme?: 'light' | 'dark';
  readonly javaScriptEnabled?: boolean;
  /** Where the product answers; the run's own by default. */
  readonly baseURL?: string;
}

/** A page of a fresh browser profile, and what went wrong on it so far. */
export async function openPage(
  options: BrowserContextOptions = {},
): Promise<{ page: Page; faults: string[]; close: () => Promise<void> }> {
  const {
    width = 1440,
    height = 900,
    colorScheme = 'light',
    javaScriptEnabled = true,
    baseURL = inject('baseUrl'),
  } = options;
  const context = await (
    await open()
  ).newContext({
    baseURL,
    viewport: { width, height },
    colorScheme,
    javaScriptEnabled,
    reducedMotion: 'reduce',
  });
  context.setDefaultTimeout(10_000);
  const page = await context.newPage();
  const faults: string[] = [];
  page.on('pageerror', (error) => faults.push(`thrown: ${error.message}`));
  page.on('console', (message) => {
    if (message.type() === 'error') faults.push(`logged on ${page.url()}: ${message.text()}`);
  });
  return { page, faults, close: () => context.close() };
}

/** Signs in through the sign-in page as somebody of the demo desk. */
export async function signInOn(page: Page, part: string): Promise<void> {
  await page.goto('/sign-in');
  await signInAtForm(page, demoSignIn(part));
}

/** Signs in on the sign-in page that is open, and waits for what comes after it. */
export async function signInAtForm(
  page: Page,
  { email, password }: { readonly email: string; readonly password: string },
): Promise<void> {
  await page.getByLabel('Email address').fill(email);
  await page.getByLabel('Password').fill(password);
  await follow(page, () => page.getByRole('button', { name: 'Sign in' }).click());
  expect(new URL(page.url()).pathname).not.toBe('/sign-in');
}

/** A press before an island of the page is awake is lost: people are slower than this, tests are not. */
async function islandsAwake(page: Page): Promise<void> {
  await page.waitForFunction(() => {
    const isReacts = (element: Element) => Object.keys(element).some((key) => key.startsWith('__reactFiber'));
    return [...document.querySelectorAll('astro-island')].every(
      (island) =>
        !island.hasAttribute('ssr') &&
        (island.childElementCount === 0 || [...island.querySelectorAll('*')].some(isReacts)),
    );
  });
  // What listens for keys is put up after the first drawing.
  await page.evaluate(() => new Promise((resume) => requestIdleCallback(resume)));
}

/** Does what leads to another page, and waits until that one is there and awake. */
export async function follow(page: Page, leads: () => Promise<void>): Promise<void> {
  const loaded = page.waitForEvent('load');
  await leads();
  await loaded;
  await islandsAwake(page);
}

export async function visit(page: Page, address: string): Promise<Response | null> {
  const answer = await page.goto(address);
  await islandsAwake(page);
  return answer;
}

/** Chromium logs every refused request as an error of its own; where a refusal is what is wanted it is none. */
export const refusalsApart = (fault: string): boolean =>
  !/Failed to load resource: the server responded with a status of (4\d\d|503)/.test(fault);

/** Where the last picture of a page is kept whose test failed; nowhere by default. */
const PICTURES = process.env['PICTURES_OF_FAILURES'];

export const test = base.extend<{ page: Page }>({
  page: async ({ task }, use) => {
    const { page, faults, close } = await openPage();
    await use(page);
    if (PICTURES && task.result?.state === 'fail')
      await page.screenshot({
        path: join(PICTURES, `${task.name.replaceAll(/\W+/g, ' ').slice(0, 80)}.png`),
        fullPage: true,
      });
    await close();
    expect(faults).toEqual([]);
  },
});
