/** The review sheet over HTTP: a file to keep, whatever the borrower is called, and a page that says the same. */
import '../support/useDatabase.ts';
import { beforeAll, expect, test } from 'vitest';
import { CAUTIONS } from '../../src/core/cautions.ts';
import { REVIEW_SECTIONS } from '../../src/core/reviewSheet.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute } from '../../src/server/db/sql.ts';
import { signedIn, type Client } from '../support/client.ts';
import { makeTwoDesks, PASSWORD, type TwoDesks } from '../support/twoDesks.ts';

const HOSTILE = '=1+1 Caf\u00e9 "Bell"\r\nX: y/../<b>';

let desks: TwoDesks;
let analyst: Client;

beforeAll(async () => {
  desks = await makeTwoDesks();
  await inTransaction((tx) =>
    execute(tx, 'update borrowers set name = :name where id = :id', {
      name: HOSTILE,
      id: desks.north.borrower,
    }),
  );
  analyst = await signedIn(desks.north.analyst.email, PASSWORD);
});

test('the export is a workbook to keep, under a name that is safe in a header', async () => {
  const answer = await analyst.send(`/api/v1/borrowers/${desks.north.borrower}/review-sheet`);
  expect(answer.status).toBe(200);
  expect(answer.headers.get('content-type')).toBe(
    'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
  );
  expect(answer.headers.get('cache-control')).toBe('no-store');
  expect(answer.headers.get('x-content-type-options')).toBe('nosniff');
  expect(answer.headers.get('x')).toBeNull();
  expect(answer.headers.get('content-disposition')).toMatch(
    /^attachment; filename="Review sheet _1_1 Cafe _Bell_X_ y_\.\._b_ \d{4}-\d\d-\d\d DRAFT\.xlsx"; filename\*=UTF-8''Review%20sheet%20%3D1%2B1%20Caf%C3%A9%20_Bell_X_%20y_\.\._b_%20[\d-]+%20DRAFT\.xlsx$/,
  );
  // The first bytes of a zip archive, APPNOTE 4.3.7.
  expect([...new Uint8Array(await answer.arrayBuffer()).slice(0, 4)]).toEqual([0x50, 0x4b, 3, 4]);
});

test('the page has every section and every caution, and no markup out of a name', async () => {
  const answer = await analyst.send(`/borrowers/${desks.north.borrower}/review-sheet`);
  expect(answer.status).toBe(200);
  const page = (await answer.text()).replaceAll('&#x27;', "'").replaceAll('&#39;', "'");
  for (const title of REVIEW_SECTIONS) expect(page).toContain(title);
  for (const caution of CAUTIONS) expect(page).toContain(caution);
  expect(page).toContain('DRAFT');
  expect(page).not.toContain('<b>');
});

test('another desk’s sheet is a page that is not there', async () => {
  const answer = await analyst.send(`/borrowers/${desks.south.borrower}/review-sheet`);
  expect(answer.status).toBe(404);
});
