/** Who reads what in the morning mail. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import type { Person } from '../../src/server/auth/policy.ts';
import { tokenHash } from '../../src/server/auth/tokens.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { findByUnsubscribeHash } from '../../src/server/db/repositories/people.ts';
import { execute } from '../../src/server/db/sql.ts';
import { assessBorrower } from '../../src/server/services/assessBorrower.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { systemActor } from '../../src/server/services/actor.ts';
import { buildBorrower, buildCovenant, buildPerson, buildStatements } from '../support/factories.ts';
import { ACCEPTED, buildNightBook, LAST_QUARTER, rows, type NightBook } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

let book: NightBook;
let other: NightBook;
let administrator: Person;

interface Mail {
  readonly key: string;
  readonly personId: number;
  readonly subject: string;
  readonly body: string;
  readonly headers: string;
}

beforeAll(async () => {
  await useOwnDatabase();
  book = await buildNightBook();
  other = await buildNightBook();
  administrator = await inTransaction((tx) => buildPerson(tx, { roles: ['administrator'], now: ACCEPTED }));
});
afterAll(closeDatabase);

let day = Date.UTC(2026, 10, 30);
/** One more night, and the mails it queued. */
async function nextNight(): Promise<readonly Mail[]> {
  day += 86_400_000;
  const [last] = await rows<{ id: number }>('select coalesce(max(id), 0) as id from outbox');
  const businessDate = new Date(day).toISOString().slice(0, 10) as Parameters<
    typeof runNight
  >[0]['businessDate'];
  const summary = await runNight({
    businessDate,
    kind: 'nightly',
    startedBy: null,
    now: new Date(day + 5_400_000),
  });
  expect(summary.outcome).toBe('done');
  return rows<Mail>(
    `select message_key as \`key\`, person_id as personId, subject, text_body as body, headers
     from outbox where id > :id order by id`,
    { id: last?.id ?? 0 },
  );
}
const readers = (mails: readonly Mail[]) =>
  mails
    .filter(({ key }) => key.startsWith('digest:'))
    .map(({ personId }) => personId)
    .sort((a, b) => a - b);
const mailOf = (mails: readonly Mail[], person: Person): Mail => {
  const mail = mails.find(({ personId }) => personId === person.id);
  if (!mail) throw new Error(`no mail for ${person.name}`);
  return mail;
};
const change = (text: string, values: Parameters<typeof execute>[2] = {}) =>
  inTransaction((tx) => execute(tx, text, values));

/** A thin borrower more on the first desk, assessed in the middle of the day. */
async function raiseByDay(debt = 13_800_000) {
  const at = new Date(day + 40_000_000);
  const borrower = await inTransaction(async (tx) => {
    const built = await buildBorrower(tx, book.desk, { now: at });
    await buildCovenant(tx, built, { knownFrom: at });
    await buildStatements(tx, built, {
      last: LAST_QUARTER,
      quarters: Array.from({ length: 8 }, () => ({ ebitda: 1_000_000, debt })),
      knownFrom: at,
    });
    return built;
  });
  const done = await assessBorrower(systemActor('test', at), borrower.id, {
    runId: null,
    knownAt: at,
    asOf: new Date(day).toISOString().slice(0, 10) as '2026-12-01',
  });
  if (!done.ok) throw new Error(done.error.kind);
  return { borrower, assessed: done.value };
}

test('the first night tells owners of their own borrowers and heads of what is urgent on their desk', async () => {
  const mails = await nextNight();
  expect(readers(mails)).toEqual(
    [book.desk.head, book.desk.manager, other.desk.head, other.desk.manager]
      .map(({ id }) => id)
      .sort((a, b) => a - b),
  );
  const own = mailOf(mails, book.desk.manager);
  expect(own.subject).toMatch(/^\[Desk \d+\] \d+ need a decision - 1 Dec 2026$/);
  expect(own.subject).not.toContain('Borrower');
  expect(own.body).toContain(book.thin.name);
  expect(own.body).toContain(book.notMet.name);
  expect(own.body).not.toContain(`${other.thin.name} (`);
  const head = mailOf(mails, book.desk.head);
  expect(head.body).toContain(book.notMet.name);
  expect(head.body).not.toContain(`${book.thin.name} (`);
  expect(mailOf(mails, administrator).subject).toBe(
    '[Harbour Lending] Nightly run: tested 6 of 6 - 1 Dec 2026',
  );
});

test('an item says exposure, figures, since when, what is asked and where', async () => {
  const [mail] = await rows<Mail>('select text_body as body from outbox where person_id = :id', {
    id: book.desk.manager.id,
  });
  const [alert] = await rows<{ id: number; sentence: string }>(
    `select id, sentence from alerts where borrower_id = :id and kind = 'test not met'`,
    { id: book.notMet.id },
  );
  for (const part of [
    `${book.notMet.name} (limit EUR 12.4m)`,
    'test not met, urgent',
    alert?.sentence ?? 'no alert',
    'Since 30 Sep 2026. Asked: Take it, assess by 3 Dec 2026, decide by 8 Dec 2026.',
    `/alerts/${alert?.id}`,
    'Figures known at 1 Dec 2026, 02:30 CET. Run at 1 Dec 2026, 02:30 CET.',
  ])
    expect(mail?.body).toContain(part);
});

test('a quiet night is quiet for everybody but administrators', async () => {
  const mails = await nextNight();
  expect(mails.map(({ personId }) => personId)).toEqual([administrator.id]);
});

test('what is raised by day, on last night’s peers, is told the next morning, once', async () => {
  const { borrower, assessed } = await raiseByDay();
  expect(assessed).toMatchObject({ isCurrent: true });
  const [basis] = await rows<{ runId: number | null; asOf: string; peersAsOf: string }>(
    `select a.run_id as runId, a.as_of as asOf, x.as_of as peersAsOf
     from assessments a join cross_sections x on x.id = a.cross_section_id where a.id = :id`,
    { id: assessed.assessmentId },
  );
  expect(basis).toEqual({ runId: null, asOf: '2026-12-02', peersAsOf: '2026-12-02' });
  expect(mailOf(await nextNight(), book.desk.manager).body).toContain(borrower.name);
  expect(readers(await nextNight())).toEqual([]);
});

describe('a deputy', () => {
  let deputy: Person;
  beforeEach(async () => {
    deputy = await inTransaction((tx) =>
      buildPerson(tx, { roles: ['relationship manager'], deskIds: [book.desk.id], now: ACCEPTED }),
    );
  });
  const standsIn = (from: string, until: string) =>
    change(
      'insert into deputies (person_id, deputy_id, from_date, until_date) values (:who, :by, :from, :until)',
      {
        who: book.desk.manager.id,
        by: deputy.id,
        from,
        until,
      },
    );
  const on = (days: number) => new Date(day + days * 86_400_000).toISOString().slice(0, 10);

  test.each([
    ['on the first day', 1, 5, true],
    ['on the last day', -3, 1, true],
    ['the day before', 2, 5, false],
    ['the day after', -3, 0, false],
  ])('reads the owner’s alerts %s: %i to %i days on', async (_when, from, until, reads) => {
    await standsIn(on(from), on(until));
    await raiseByDay();
    expect(readers(await nextNight()).includes(deputy.id)).toBe(reads);
  });
});

describe('a person who wants no digest, or is not active any more', () => {
  test('gets none', async () => {
    await change('update people set wants_digest = 0 where id = :id', { id: book.desk.manager.id });
    await raiseByDay();
    expect(readers(await nextNight())).not.toContain(book.desk.manager.id);
    await change('update people set wants_digest = 1, is_active = 0 where id = :id', {
      id: book.desk.manager.id,
    });
    await raiseByDay();
    expect(readers(await nextNight())).not.toContain(book.desk.manager.id);
    await change('update people set is_active = 1 where id = :id', { id: book.desk.manager.id });
  });
});

test('the link to stop the digest is the person’s own and found by its hash', async () => {
  await raiseByDay();
  const mail = mailOf(await nextNight(), book.desk.manager);
  const token = /\/unsubscribe\?token=([A-Za-z0-9_-]+)/.exec(mail.body)?.[1] ?? '';
  const person = await inTransaction((tx) => findByUnsubscribeHash(tx, tokenHash(token)));
  expect(person?.id).toBe(book.desk.manager.id);
  // The address is http here: one click needs https (RFC 8058), so no header promises it.
  expect(JSON.parse(mail.headers)).toEqual({});
});

test('a due date is told on its day and the day after, then counted', async () => {
  await change(`update alerts set due_on = :on where borrower_id = :id and kind = 'thin headroom'`, {
    id: book.thin.id,
    on: new Date(day + 86_400_000).toISOString().slice(0, 10),
  });
  const dueDay = mailOf(await nextNight(), book.desk.manager);
  expect(dueDay.subject).toMatch(/\] 1 due today - /);
  expect(dueDay.body).toContain('decide today');
  const after = mailOf(await nextNight(), book.desk.manager);
  expect(after.body).toContain('Overdue (1)');
  const later = await nextNight();
  expect(readers(later)).not.toContain(book.desk.manager.id);
});
