/**
 * Every text that the product keeps is replaced by markup and script, then every page is opened in Chromium under its
 * content security policy: nothing runs, nothing is drawn as markup, nothing is refused, and every island comes alive.
 */
import '../support/useDatabase.ts';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute, select, selectOne, type SqlValues } from '../../src/server/db/sql.ts';
import { openPage, signInOn } from '../support/browser.ts';
import { demoSignIn } from '../support/demo.ts';

/** Each sets P where it runs. */
const PAYLOADS = [
  '"><img src=x onerror=P=1>',
  '</script><script>P=1</script>',
  `' autofocus onfocus='P=1`,
  'javascript:P=1',
  '${P=1}{{P=1}}<%=P=1%>',
  '<svg onload=P=1><a href=javascript:P=1>x</a></svg>',
  '</title></style></textarea><script>P=1</script>',
  '&lt;img src=x onerror=P=1&gt;&#60;script&#62;',
  '--><iframe srcdoc="<script>parent.P=1</script>">',
  '\u2028</astro-island><style>*{display:none}</style>',
];
const hostile = (n: number) => `${PAYLOADS[n % PAYLOADS.length] ?? ''} ${n}`;

/** Table, its key, and its columns of free text. */
const TEXTS: readonly (readonly [string, string, readonly string[]])[] = [
  ['lenders', 'id', ['name']],
  ['people', 'id', ['name']],
  ['desks', 'id', ['name']],
  ['sectors', 'code', ['label']],
  ['borrowers', 'id', ['name']],
  ['facilities', 'id', ['name', 'security']],
  ['covenant_terms', 'id', ['name', 'clause']],
  ['add_backs', 'id', ['label', 'reason', 'evidence']],
  ['waivers', 'id', ['conditions']],
  ['imports', 'id', ['file_name']],
  ['alerts', 'id', ['sentence', 'would_change', 'closing_text']],
  ['alert_events', 'id', ['what', 'text']],
  ['proposals', 'id', ['decision_text']],
  ['watchlist_entries', 'id', ['reason', 'plan']],
];

interface Kept {
  readonly table: string;
  readonly key: string;
  readonly row: Readonly<Record<string, string | number | null>>;
}
const kept: Kept[] = [];
let payloadsUsed = 0;

const set = (table: string, key: string, row: Kept['row']): Promise<unknown> =>
  inTransaction((tx) =>
    execute(
      tx,
      `update ${table} set ${Object.keys(row)
        .filter((column) => column !== key)
        .map((column) => `${column} = :${column}`)
        .join(', ')} where ${key} = :${key}`,
      row as SqlValues,
    ),
  );

interface Ids {
  readonly borrower: number;
  readonly alert: number;
  readonly statement: number;
  readonly import: number;
}
let ids: Ids;

beforeAll(async () => {
  ids = await inTransaction(async (tx) => {
    const one = async (text: string) => (await selectOne<{ id: number }>(tx, text))?.id ?? 0;
    const alert = await one(
      `select max(a.id) as id from alerts a join desks d on d.id = a.desk_id where a.open_slot is not null and d.name = 'Northern desk'`,
    );
    const borrower = await one(`select borrower_id as id from alerts where id = ${alert}`);
    return {
      alert,
      borrower,
      statement: await one(
        `select max(statement_id) as id from statement_cells c join statements s on s.id = c.statement_id where c.line = 'revenue' and s.borrower_id = ${borrower}`,
      ),
      import: await one(
        `select max(i.id) as id from imports i join borrowers b on b.id = i.borrower_id join desks d on d.id = b.desk_id where d.name = 'Northern desk'`,
      ),
    };
  });
  for (const [table, key, columns] of TEXTS) {
    const rows = await inTransaction((tx) =>
      select<Kept['row']>(tx, `select ${key}, ${columns.join(', ')} from ${table} order by ${key} limit 400`),
    );
    for (const row of rows) {
      kept.push({ table, key, row });
      const bad = Object.fromEntries(
        Object.entries(row).map(([column, value]) => [
          column,
          column === key || value === null ? value : hostile((payloadsUsed += 1)).slice(0, 60),
        ]),
      );
      await set(table, key, bad);
    }
  }
}, 180_000);

afterAll(async () => {
  for (const { table, key, row } of kept) await set(table, key, row);
}, 180_000);

/** What of the payloads came alive on the page. */
const alive = (page: Page): Promise<Record<string, unknown>> =>
  page.evaluate(() => ({
    ran: 'P' in window,
    markup: document.querySelectorAll(
      'img[src="x"], iframe, svg[onload], a[href^="javascript:"], [onerror], [onload], [onfocus]',
    ).length,
    waiting: document.querySelectorAll('astro-island[ssr]').length,
    stored: Object.keys(localStorage).length + Object.keys(sessionStorage).length,
    cookies: document.cookie,
  }));

const PAGES: readonly (readonly [string, readonly string[]])[] = [
  [
    'head of Northern desk',
    ['/alerts', '/alerts/ALERT', '/borrowers', '/borrowers/BORROWER', '/borrowers/BORROWER/facilities'],
  ],
  [
    'analyst',
    [
      '/borrowers/BORROWER/quality',
      '/borrowers/BORROWER/statements',
      '/borrowers/BORROWER/alerts',
      '/borrowers/BORROWER/review-sheet',
      '/statements/STATEMENT/cells/revenue',
      '/imports',
      '/imports/IMPORT',
    ],
  ],
  ['committee member', ['/watchlist', '/account', '/alerts?state=closed', '/not-there']],
  ['administrator', ['/desk-settings', '/desk-settings/runs']],
  ['auditor', ['/audit-log', '/alerts', '/borrowers']],
];

const addressOf = (path: string): string =>
  path
    .replace('ALERT', String(ids.alert))
    .replace('BORROWER', String(ids.borrower))
    .replace('STATEMENT', String(ids.statement))
    .replace('IMPORT', String(ids.import));

test.each(PAGES)(
  'as %s nothing of it runs on any page, and every island comes alive',
  async (part, paths) => {
    const { page, faults, close } = await openPage();
    page.on('dialog', (dialog) => {
      faults.push(`dialog: ${dialog.message()}`);
      void dialog.dismiss();
    });
    await page.addInitScript(() => {
      document.addEventListener('securitypolicyviolation', (event) =>
        console.error(`refused: ${event.violatedDirective} ${event.blockedURI}`),
      );
    });
    await signInOn(page, part);
    let seen = 0;
    for (const path of paths) {
      const address = addressOf(path);
      const answer = await page.goto(address, { waitUntil: 'networkidle' });
      expect(answer?.status(), address).toBe(path === '/not-there' ? 404 : 200);
      expect(await alive(page), address).toEqual({
        ran: false,
        markup: 0,
        waiting: 0,
        stored: 0,
        cookies: '',
      });
      const text = await page.evaluate(() => document.body.textContent);
      if (PAYLOADS.some((payload) => text.includes(payload.slice(0, 20)))) seen += 1;
    }
    // A page that is not there is refused as such, in the console too.
    const real = faults.filter((fault) => !/not-there.*404/.test(fault));
    expect(real).toEqual([]);
    expect(seen, 'pages that show a payload as text').toBeGreaterThan(paths.length / 2);
    await close();
  },
  120_000,
);

test('what is typed into the sign-in form or its address comes back as text', async () => {
  const { page, faults, close } = await openPage();
  const [image = ''] = PAYLOADS;
  await page.goto(`/sign-in?next=${encodeURIComponent(image)}&ended=${encodeURIComponent(image)}`);
  await page.getByLabel('Email address').fill(`${image}@lender.example`);
  await page.getByLabel('Password').fill('not the password at all');
  await page.getByLabel('Email address').evaluate((field) => field.setAttribute('type', 'text'));
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByText('do not belong together').waitFor();
  expect(await page.getByLabel('Email address').inputValue()).toContain(image);
  expect(await alive(page)).toMatchObject({ ran: false, markup: 0 });
  expect(faults).toEqual([]);
  await close();
});

test('mail is made of the same texts and holds none of them as markup', async () => {
  const { page, faults, close } = await openPage();
  await page.goto('/forgot-password');
  await page.getByLabel('Email address').fill(demoSignIn('auditor').email);
  await page.getByRole('button').first().click();
  await page.waitForURL((url) => url.search !== '' || url.pathname !== '/forgot-password');
  const html = await inTransaction((tx) =>
    selectOne<{ html: string; name: string }>(
      tx,
      `select html_body as html, to_name as name from outbox
       where message_key like 'reset-password:%' and to_address = :to order by id desc limit 1`,
      { to: demoSignIn('auditor').email },
    ),
  );
  expect(html?.name).toMatch(/ \d+$/);
  expect(html?.html).not.toMatch(/<(img|script|iframe|svg)\b/i);
  expect(faults).toEqual([]);
  await close();
});
