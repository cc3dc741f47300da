/**
 * A test with a page of Chromium. Whatever the page logs as an error, throws or refuses by its content security
 * policy fails the test that it happened in.
 */
import { chromium, type Browser, type Page } from 'playwright-core';
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
}

/** A page of a fresh browser profile, and what went wrong on it so far. */
export async function openPage(
  options: BrowserContextOptions = {},
): Promise<{ page: Page; faults: string[]; close: () => Promise<void> }> {
  const { width = 1440, height = 900, colorScheme = 'light', javaScriptEnabled = true } = options;
  const context = await (
    await open()
  ).newContext({
    baseURL: inject('baseUrl'),
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
  const { email, password } = demoSignIn(part);
  await page.goto('/sign-in');
  await page.getByLabel('Email address').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL((url) => url.pathname !== '/sign-in');
}

export const test = base.extend<{ page: Page }>({
  page: async ({ task: _task }, use) => {
    const { page, faults, close } = await openPage();
    await use(page);
    await close();
    expect(faults).toEqual([]);
  },
});
