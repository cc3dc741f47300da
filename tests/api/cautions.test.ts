/** The fixed texts stand, word for word, on every page that shows a result; a page that loses one fails here. */
import { expect, test } from 'vitest';
import type { AlertRow } from '../../src/contracts/alerts.ts';
import type { Page } from '../../src/contracts/paging.ts';
import { NO_FORECAST } from '../../src/components/outlook/outlookWords.ts';
import { CAUTIONS } from '../../src/core/cautions.ts';
import { signInAs } from '../support/demo.ts';

/** What a reader sees: tags away, entities back. */
const textOf = (html: string): string =>
  html
    .replaceAll(/<astro-island[^>]*>/g, '')
    .replaceAll(/<[^>]+>/g, ' ')
    .replaceAll('&#39;', "'")
    .replaceAll('&#x27;', "'")
    .replaceAll('&amp;', '&')
    .replaceAll(/\s+/g, ' ');

const PARTS = ['', '/outlook', '/statements', '/quality', '/alerts', '/facilities', '/review-sheet'];

test.each(PARTS)('a borrower’s page carries all four cautions: %s', async (part) => {
  const reader = await signInAs('auditor');
  const answer = await reader.send(`/borrowers/1${part}`);
  expect(answer.status).toBe(200);
  const text = textOf(await answer.text());
  for (const caution of CAUTIONS) expect(text).toContain(caution);
});

test('an alert carries all four cautions', async () => {
  const reader = await signInAs('auditor');
  const { rows } = (await (await reader.send('/api/v1/alerts')).json()) as Page<AlertRow>;
  const [alert] = rows;
  expect(alert).toBeDefined();
  const text = textOf(await (await reader.send(`/alerts/${alert?.id}`)).text());
  for (const caution of CAUTIONS) expect(text).toContain(caution);
});

test('the book carries all four cautions', async () => {
  const reader = await signInAs('auditor');
  const text = textOf(await (await reader.send('/book')).text());
  for (const caution of CAUTIONS) expect(text).toContain(caution);
});

test('the watchlist carries all four cautions', async () => {
  const reader = await signInAs('auditor');
  const text = textOf(await (await reader.send('/watchlist')).text());
  for (const caution of CAUTIONS) expect(text).toContain(caution);
});

test('what is said of tests to come carries its own caution, and all four', async () => {
  const reader = await signInAs('auditor');
  for (const address of ['/borrowers/1/outlook', '/book/projections']) {
    const text = textOf(await (await reader.send(address)).text());
    for (const caution of [NO_FORECAST, ...CAUTIONS]) expect(text).toContain(caution);
  }
});
