/** Why a result is another than the night before, kept with it and shown on the borrower's and the alert's page. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute } from '../../src/server/db/sql.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { showAlert } from '../../src/server/services/showAlert.ts';
import { showBorrower } from '../../src/server/services/showBorrower.ts';
import { acting, done } from '../support/acting.ts';
import { buildNightBook, rows, type NightBook } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

const NIGHT_29 = new Date('2026-11-30T01:30:00Z');
const RESET = new Date('2026-11-30T10:00:00Z');
const NIGHT_30 = new Date('2026-12-01T01:30:00Z');
const MORNING = new Date('2026-12-01T09:00:00Z');

let book: NightBook;

beforeAll(async () => {
  await useOwnDatabase();
  book = await buildNightBook();
});
afterAll(closeDatabase);

const night = (businessDate: '2026-11-29' | '2026-11-30', now: Date) =>
  runNight({ businessDate, kind: 'nightly', startedBy: null, now });
const shown = async (id: number) => done(await showBorrower(acting(book.desk.manager, MORNING), id));

test('the first night has nothing to be held against', async () => {
  await night('2026-11-29', NIGHT_29);
  expect((await shown(book.thin.id)).movements).toBeNull();
});

test('a night after which nothing changed says so', async () => {
  await night('2026-11-30', NIGHT_30);
  expect((await shown(book.roomy.id)).movements).toEqual({ since: '2026-11-29', rows: [] });
});

test('a level that was tightened is the cause of the test and of the alert that it raised', async () => {
  // As a correction is recorded: the old row is known until then, the new one from then on.
  await inTransaction(async (tx) => {
    await execute(
      tx,
      `update covenant_levels set known_to = :at
       where covenant_id in (select id from covenants where borrower_id = :id)`,
      { at: RESET, id: book.thin.id },
    );
    await execute(
      tx,
      `insert into covenant_levels (covenant_id, from_date, level, known_from)
       select id, '2025-01-01', '3.4', :at from covenants where borrower_id = :id`,
      { at: RESET, id: book.thin.id },
    );
  });
  await runNight({
    businessDate: '2026-11-30',
    kind: 'nightly',
    startedBy: null,
    now: new Date('2026-12-01T02:30:00Z'),
    again: true,
  });
  const { movements, alerts } = await shown(book.thin.id);
  expect(movements?.since).toBe('2026-11-29');
  expect(movements?.rows.find(({ what }) => what === 'Total leverage')).toMatchObject({
    before: '3.45x, against 3.50x, met, thin, at 30 Sep 2026',
    after: '3.45x, against 3.40x, not met, at 30 Sep 2026',
    steps: [{ cause: 'level' }],
  });
  const notMet = alerts.find(({ kind }) => kind === 'test not met');
  const alert = done(await showAlert(acting(book.desk.manager, MORNING), notMet!.id));
  expect(alert.movements?.rows).toMatchObject([
    { before: 'no alert', after: 'urgent, facts of 30 Sep 2026', steps: [{ cause: 'level' }] },
  ]);
});

test('what moved is kept with the result and with the night it was held against', async () => {
  const kept = await rows<{ since: string; movements: string }>(
    `select e.as_of as since, a.movements from current_assessments c
     join assessments a on a.id = c.assessment_id join assessments e on e.id = a.earlier_assessment_id
     where c.borrower_id = :id`,
    { id: book.thin.id },
  );
  expect(kept).toHaveLength(1);
  expect(kept[0]?.since).toBe('2026-11-29');
  expect(kept[0]?.movements).toContain('"cause":"level"');
});
