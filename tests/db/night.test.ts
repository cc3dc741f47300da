/** The nightly run: once per date, never twice at a time, going on where it was cut. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { execute } from '../../src/server/db/sql.ts';
import { systemActor } from '../../src/server/services/actor.ts';
import { assessBorrower, assessWithin } from '../../src/server/services/assessBorrower.ts';
import { finishNight } from '../../src/server/services/finishNight.ts';
import { memberOfBook } from '../../src/server/services/memberOfBook.ts';
import { runNight, type NightCommand, type NightSteps } from '../../src/server/services/runNight.ts';
import { buildPerson } from '../support/factories.ts';
import { ACCEPTED, buildNightBook, rows, type NightBook } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

let book: NightBook;

beforeAll(async () => {
  await useOwnDatabase();
  book = await buildNightBook();
  await inTransaction((tx) => buildPerson(tx, { roles: ['administrator'], now: ACCEPTED }));
});
afterAll(closeDatabase);

const night = (day: string, over: Partial<NightCommand> = {}): NightCommand => ({
  businessDate: day as NightCommand['businessDate'],
  kind: 'nightly',
  startedBy: null,
  now: new Date(`${day}T01:30:00Z`),
  ...over,
});
const steps = (over: Partial<NightSteps> = {}): NightSteps => ({
  assessWithin,
  memberOfBook,
  finishNight,
  ...over,
});

const runOf = async (day: string) => {
  const [run] = await rows<{
    id: number;
    state: string;
    attempt: number;
    knownAt: Date;
    done: number;
    failed: number;
    total: number;
    failure: string | null;
  }>(
    `select id, state, attempt, known_at as knownAt, borrowers_done as done, borrowers_failed as failed,
       borrowers_total as total, failure
     from runs where business_date = :day`,
    { day },
  );
  if (!run) throw new Error(`no run for ${day}`);
  return run;
};
const mailKeys = async () =>
  (await rows<{ key: string }>('select message_key as `key` from outbox order by id')).map(({ key }) => key);
/** Every result of a run as stored, without the numbers that differ from attempt to attempt. */
const resultsOf = (runId: number, knownAt: Date) =>
  rows<object>(
    `select borrower_id as borrowerId, as_of as asOf, input_version as inputVersion, policy_version as policyVersion,
       smallest_may_fall as smallestMayFall, quality_headline as qualityHeadline, content
     from assessments where run_id = :runId and known_at = :knownAt order by borrower_id`,
    { runId, knownAt },
  );

test('a night tests every borrower, raises what it finds and queues the mail', async () => {
  const summary = await runNight(night('2026-12-01'));
  expect(summary).toMatchObject({ outcome: 'done', attempt: 1, tested: 3, total: 3, failed: 0 });
  expect(await runOf('2026-12-01')).toMatchObject({ state: 'done', done: 3, failed: 0, total: 3 });

  const alerts = await rows<{ borrowerId: number; kind: string; severity: string }>(
    'select borrower_id as borrowerId, kind, severity from alerts order by id',
  );
  expect(alerts).toContainEqual({ borrowerId: book.notMet.id, kind: 'test not met', severity: 'urgent' });
  expect(alerts).toContainEqual({ borrowerId: book.thin.id, kind: 'thin headroom', severity: 'soon' });
  expect(alerts.filter(({ borrowerId }) => borrowerId === book.roomy.id)).toEqual([]);
  if (summary.outcome !== 'done') throw new Error('skipped');
  expect(summary.alertsRaised).toBe(alerts.length);
  expect((await mailKeys()).map((key) => key.split(':')[0]).sort()).toEqual([
    'digest',
    'digest',
    'heartbeat',
  ]);
  expect(summary.mails).toBe(3);
});

test('what we computed stands beside what was certified and accepted, which stay as they are', async () => {
  await inTransaction((tx) =>
    execute(
      tx,
      `update covenant_tests t join covenants c on c.id = t.covenant_id
       set t.certified_outcome = 'met', t.certified_value = 3.2, t.checking = 'checked'
       where c.borrower_id = :id and t.test_date = '2026-09-30'`,
      { id: book.notMet.id },
    ),
  );
  const read = () =>
    rows<{ version: number }>(
      `select t.computed_outcome as computed, t.certified_outcome as certified, t.accepted_outcome as accepted,
         t.checking, t.version
       from covenant_tests t join covenants c on c.id = t.covenant_id
       where c.borrower_id = :id and t.test_date = '2026-09-30'`,
      { id: book.notMet.id },
    );
  const [before] = await read();
  expect(before).toMatchObject({
    computed: 'not met',
    certified: 'met',
    accepted: null,
    checking: 'checked',
  });
  await runNight(night('2026-12-02'));
  expect(await read()).toEqual([before]);
});

describe('a date', () => {
  test('to come is not computed: at the business date of the lender’s zone it is', async () => {
    // 22:59 UTC is 23:59 in Paris.
    const before = night('2026-12-03', { now: new Date('2026-12-02T22:59:59.999Z') });
    expect(await runNight(before)).toMatchObject({ outcome: 'skipped' });
    expect(await rows('select id from runs where business_date = :day', { day: '2026-12-03' })).toEqual([]);
  });

  test('that is done is not computed again by the schedule, and nothing is mailed twice', async () => {
    const before = await mailKeys();
    expect(await runNight(night('2026-12-02'))).toMatchObject({ outcome: 'skipped' });
    expect(await mailKeys()).toEqual(before);
  });

  test('that is started again by hand is another attempt of the same run, with only the heartbeat where nothing changed', async () => {
    const before = await mailKeys();
    const first = await runOf('2026-12-02');
    const summary = await runNight(
      night('2026-12-02', { again: true, now: new Date('2026-12-02T09:00:00Z') }),
    );
    expect(summary).toMatchObject({ outcome: 'done', runId: first.id, attempt: 2, tested: 3, mails: 1 });
    expect((await mailKeys()).slice(before.length)).toEqual([
      expect.stringMatching(new RegExp(`^heartbeat:${first.id}:2:`)),
    ]);
  });

  test('is run once where two start it at once', async () => {
    const both = await Promise.all([runNight(night('2026-12-03')), runNight(night('2026-12-03'))]);
    expect(both.map(({ outcome }) => outcome).sort()).toEqual(['done', 'skipped']);
    expect(await rows('select id from runs where business_date = :day', { day: '2026-12-03' })).toHaveLength(
      1,
    );
    const run = await runOf('2026-12-03');
    expect(await resultsOf(run.id, run.knownAt)).toHaveLength(3);
  });
});

describe('a run that is cut', () => {
  test('goes on where it stopped and ends as if it had not been cut', async () => {
    const whole = await runNight(night('2026-12-04'));
    if (whole.outcome !== 'done') throw new Error('skipped');
    const undisturbed = await resultsOf(whole.runId, (await runOf('2026-12-04')).knownAt);

    const order = night('2026-12-04', { again: true, now: new Date('2026-12-04T09:00:00Z') });
    let assessed: number[] = [];
    const cutAtSecond: NightSteps['assessWithin'] = async (tx, actor, id, request) => {
      if (assessed.length === 1)
        // As it is for a process that slept too long: another one has taken the lock.
        await inTransaction((other) =>
          execute(
            other,
            `update job_locks set owner = 'another', fence = fence + 1 where name = 'nightly-run'`,
          ),
        );
      assessed.push(id);
      return assessWithin(tx, actor, id, request);
    };
    await expect(runNight(order, steps({ assessWithin: cutAtSecond }))).rejects.toThrow('taken over');
    const cut = await runOf('2026-12-04');
    expect(cut).toMatchObject({ state: 'running', attempt: 2, done: 1 });
    expect(await resultsOf(cut.id, cut.knownAt)).toHaveLength(1);

    await inTransaction((tx) =>
      execute(tx, `update job_locks set held_until = null where name = 'nightly-run'`),
    );
    const [doneBefore] = assessed;
    assessed = [];
    const counted: NightSteps['assessWithin'] = (tx, actor, id, request) => {
      assessed.push(id);
      return assessWithin(tx, actor, id, request);
    };
    const later = { ...order, now: new Date('2026-12-04T10:00:00Z') };
    expect(await runNight(later, steps({ assessWithin: counted }))).toMatchObject({
      outcome: 'done',
      attempt: 2,
      tested: 3,
    });
    expect(assessed).toHaveLength(2);
    expect(assessed).not.toContain(doneBefore);
    const ended = await runOf('2026-12-04');
    expect(ended.knownAt).toEqual(cut.knownAt);
    expect(await resultsOf(ended.id, ended.knownAt)).toEqual(undisturbed);
  });

  test('by the end of its process goes on at once with the next start, no lock to wait for', async () => {
    const order = night('2026-12-05');
    const told = new AbortController();
    const endsAfterFirst: NightSteps['assessWithin'] = (tx, actor, id, request) => {
      told.abort();
      return assessWithin(tx, actor, id, request);
    };
    const stopped = await runNight(
      { ...order, signal: told.signal },
      steps({ assessWithin: endsAfterFirst }),
    );
    expect(stopped).toMatchObject({ outcome: 'skipped' });
    expect(await runOf('2026-12-05')).toMatchObject({ state: 'running', done: 1 });
    expect(await runNight(order)).toMatchObject({ outcome: 'done', attempt: 1, tested: 3 });
  });

  test('by a fault that is no borrower’s waits, says why, and is taken up by the next start', async () => {
    const order = night('2026-12-06');
    const fails = () => Promise.reject(new RangeError('no time zone Nowhere/Else'));
    await expect(runNight(order, steps({ finishNight: fails }))).rejects.toThrow(RangeError);
    expect(await runOf('2026-12-06')).toMatchObject({ state: 'interrupted', done: 3 });
    expect((await runOf('2026-12-06')).failure).toContain('Nowhere/Else');
    expect(await runNight(order)).toMatchObject({ outcome: 'done', attempt: 1, tested: 3 });
    expect(await runOf('2026-12-06')).toMatchObject({ state: 'done', failure: null });
  });

  test('three times by the same borrower leaves that borrower out', async () => {
    const order = night('2026-12-07');
    const dies: NightSteps['assessWithin'] = async (tx, actor, id, request) => {
      if (id === book.thin.id)
        await inTransaction((other) =>
          execute(other, `update job_locks set owner = 'another' where name = 'nightly-run'`),
        );
      return assessWithin(tx, actor, id, request);
    };
    const free = () =>
      inTransaction((tx) => execute(tx, `update job_locks set held_until = null where name = 'nightly-run'`));
    for (let time = 1; time <= 3; time += 1) {
      await expect(runNight(order, steps({ assessWithin: dies }))).rejects.toThrow('taken over');
      await free();
    }
    expect(await runNight(order, steps({ assessWithin: dies }))).toMatchObject({ tested: 2, failed: 1 });
  });
});

describe('a borrower that fails', () => {
  const fails =
    (id: number): NightSteps['assessWithin'] =>
    async (tx, actor, borrowerId, request) => {
      const done = await assessWithin(tx, actor, borrowerId, request);
      if (borrowerId === id) throw new Error('a figure is no number');
      return done;
    };

  test('is marked with its reason, stores nothing, and the rest goes on', async () => {
    const before = await mailKeys();
    const summary = await runNight(night('2026-12-08'), steps({ assessWithin: fails(book.thin.id) }));
    expect(summary).toMatchObject({ outcome: 'done', tested: 2, total: 3, failed: 1 });
    const run = await runOf('2026-12-08');
    expect(run).toMatchObject({ state: 'done', done: 2, failed: 1 });
    expect(
      await rows(
        `select borrower_id as id, phase, failure from run_tasks where run_id = :id and state = 'failed'`,
        {
          id: run.id,
        },
      ),
    ).toEqual([{ id: book.thin.id, phase: 'scores', failure: 'a figure is no number' }]);
    expect(
      (await resultsOf(run.id, run.knownAt)).map((row) => (row as { borrowerId: number }).borrowerId),
    ).toEqual([book.roomy.id, book.notMet.id]);

    const mails = await rows<{ key: string; body: string }>(
      'select message_key as `key`, text_body as body from outbox order by id',
    );
    const sent = mails.slice(before.length);
    const digest = sent.find(({ key }) => key.endsWith(`:${book.desk.manager.id}`));
    expect(digest?.body).toContain(`${book.thin.name} (a figure is no number)`);
    expect(digest?.body).toContain('Tested 2 of 3 borrowers');
    const heartbeat = sent.find(({ key }) => key.startsWith('heartbeat:'));
    expect(heartbeat?.body).toContain(
      `Borrower ${book.thin.id} (${book.desk.name}), scores: a figure is no number`,
    );
    expect(heartbeat?.body).not.toContain(book.thin.name);
  });

  test('in both phases is one failed borrower', async () => {
    const summary = await runNight(
      night('2026-12-09'),
      steps({
        assessWithin: fails(book.thin.id),
        memberOfBook: (tx, id, knownAt, asOf) =>
          id === book.thin.id ? Promise.reject(new Error('no peers')) : memberOfBook(tx, id, knownAt, asOf),
      }),
    );
    expect(summary).toMatchObject({ tested: 2, failed: 1 });
  });
});

test('a date before one that is done is a look back: kept beside it, no alert, no digest, only the heartbeat', async () => {
  const before = await mailKeys();
  const alertsBefore = await rows('select id, version from alerts order by id');
  const current = await rows(
    'select borrower_id, assessment_id from current_assessments order by borrower_id',
  );
  const summary = await runNight(night('2026-11-30', { now: new Date('2026-12-10T09:00:00Z') }));
  expect(summary).toMatchObject({ outcome: 'done', tested: 3, mails: 1 });
  expect((await mailKeys()).slice(before.length)).toEqual([expect.stringMatching(/^heartbeat:/)]);
  expect(await rows('select id, version from alerts order by id')).toEqual(alertsBefore);
  expect(
    await rows('select borrower_id, assessment_id from current_assessments order by borrower_id'),
  ).toEqual(current);
});

test('a result of the day that knows more than the night stays the current one', async () => {
  const byDay = new Date('2026-12-11T03:00:00Z');
  const done = await assessBorrower(systemActor('test', byDay), book.thin.id, {
    runId: null,
    knownAt: byDay,
    asOf: '2026-12-11',
  });
  if (!done.ok) throw new Error(done.error.kind);
  expect(await runNight(night('2026-12-11'))).toMatchObject({ outcome: 'done', tested: 3 });
  const current = await rows<{ borrowerId: number; runId: number | null }>(
    `select c.borrower_id as borrowerId, a.run_id as runId
     from current_assessments c join assessments a on a.id = c.assessment_id order by c.borrower_id`,
  );
  const { id } = await runOf('2026-12-11');
  expect(current).toEqual([
    { borrowerId: book.roomy.id, runId: id },
    { borrowerId: book.thin.id, runId: null },
    { borrowerId: book.notMet.id, runId: id },
  ]);
});

test('a run is audited at its begin and its end', async () => {
  const run = await runOf('2026-12-03');
  const entries = await rows<{ action: string }>(
    `select action from audit_entries where subject_kind = 'run' and subject_id = :id order by seq`,
    { id: String(run.id) },
  );
  expect(entries.map(({ action }) => action)).toEqual(['begin-run', 'finish-run']);
});
