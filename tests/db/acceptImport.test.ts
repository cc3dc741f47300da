/** Figures are accepted, superseded and taken back: once, whole, and never overwritten. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { ImportView } from '../../src/contracts/imports.ts';
import { importAcceptance } from '../../src/contracts/imports.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { acceptImport } from '../../src/server/services/acceptImport.ts';
import { answerImport } from '../../src/server/services/answerImport.ts';
import { listStatements, showSource } from '../../src/server/services/listStatements.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { showBorrower } from '../../src/server/services/showBorrower.ts';
import { withdrawImport } from '../../src/server/services/withdrawImport.ts';
import { acting, done, expectRefused } from '../support/acting.ts';
import { buildCovenant, buildPerson, type BuiltBorrower } from '../support/factories.ts';
import { whileFailing, type FailingStatement } from '../support/failingStatement.ts';
import {
  buildImportDesk,
  MANAGEMENT_GROUP,
  newBorrower,
  pack,
  QUARTERS,
  RECEIVED,
  shown,
  staged,
  useOwnFolder,
  type ImportDesk,
} from '../support/importedFile.ts';
import { rows } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';
import { tyingPeriod } from '../support/tyingFigures.ts';

const clearFolder = useOwnFolder();
const LATER = new Date('2026-11-25T10:00:00Z');
let people: ImportDesk;

beforeAll(async () => {
  await useOwnDatabase();
  people = await buildImportDesk();
  await inTransaction((tx) => buildPerson(tx, { roles: ['administrator'], now: RECEIVED }));
  const lastNight = { businessDate: '2026-11-19', kind: 'nightly', startedBy: null } as const;
  await runNight({ ...lastNight, now: new Date('2026-11-20T01:30:00Z') });
});
afterAll(async () => {
  await closeDatabase();
  clearFolder();
});

const accept = (view: Pick<ImportView, 'id' | 'version'>, person = people.analyst, now = RECEIVED) =>
  acceptImport(acting(person, now), { id: view.id, version: view.version }, MANAGEMENT_GROUP);
const statementsOf = async (borrower: BuiltBorrower) =>
  done(await listStatements(acting(people.analyst, LATER), borrower.id)).statements;
const quarter = async (borrower: BuiltBorrower, end = '2026-06-30') =>
  (await statementsOf(borrower)).filter(({ periodEnd, months }) => periodEnd === end && months === 3);
const inputVersion = async (borrower: BuiltBorrower) =>
  (
    await rows<{ version: number }>(
      'select input_version as version from borrower_input_versions where borrower_id = :id',
      { id: borrower.id },
    )
  )[0]?.version;
const alertKinds = async (borrower: BuiltBorrower) =>
  (
    await rows<{ kind: string }>(
      'select kind from alerts where borrower_id = :id and open_slot is not null',
      {
        id: borrower.id,
      },
    )
  ).map(({ kind }) => kind);
const assessmentCount = async (borrower: BuiltBorrower) =>
  (await rows('select id from assessments where borrower_id = :id', { id: borrower.id })).length;

/** Total leverage of at most 3.50x; EBITDA of the four quarters is 18 % of 49.61 million, debt 70 % of 12.91 million. */
async function withCovenant(): Promise<BuiltBorrower> {
  const borrower = await newBorrower(people.desk);
  await inTransaction((tx) => buildCovenant(tx, borrower, { knownFrom: RECEIVED }));
  return borrower;
}

/** June restated from 12.4 million of revenue: its EBITDA moves that of the twelve months by more than 2 %. */
const restatedPack = () =>
  pack({
    periods: QUARTERS.map((period) =>
      period.end === '2026-06-30' ? tyingPeriod('2026-06-30', 10_400_000, 2_150_000) : period,
    ),
  });

describe('accepting', () => {
  test('makes a version of every period and assesses the borrower at once with the peers of last night', async () => {
    const borrower = await withCovenant();
    const view = await staged(people.analyst, borrower, await pack());
    const before = await inputVersion(borrower);
    expect(done(await accept(view, people.colleague))).toMatchObject({
      statements: 8,
      unchanged: 0,
      changes: [],
    });
    expect(await shown(people.analyst, view.id)).toMatchObject({
      state: 'accepted',
      acceptedBy: 'Colleague',
      basis: 'management',
      scope: 'group',
    });
    const statements = await statementsOf(borrower);
    expect(statements).toHaveLength(8);
    for (const statement of statements)
      expect(statement).toMatchObject({
        version: 1,
        inForce: true,
        tie: 'ties',
        currency: 'EUR',
        receivedOn: '2026-11-20',
        importId: view.id,
      });
    expect(await inputVersion(borrower)).toBe((before ?? 0) + 1);

    const page = done(await showBorrower(acting(people.analyst, RECEIVED), borrower.id));
    expect(page.computed).toMatchObject({
      peersAreLastNights: true,
      peersAsOf: '2026-11-19',
      asOf: '2026-11-20',
    });
    const latest = page.covenants[0]?.tests.at(-1);
    expect(latest).toMatchObject({ testDate: '2026-09-30', outcome: 'met' });
    // By hand: 0.7 × 12,910,000 = 9,037,000 of debt over 0.18 × 49,610,000 = 8,929,800 of EBITDA.
    expect(Number(latest?.tested)).toBeCloseTo(9_037_000 / 8_929_800, 6);
    expect(
      await rows<{ action: string; personName: string }>(
        `select action, person_name as personName from audit_entries where borrower_id = :id and action in ('accept-import', 'assess-borrower') order by seq`,
        { id: borrower.id },
      ),
    ).toEqual([
      { action: 'accept-import', personName: 'Colleague' },
      { action: 'assess-borrower', personName: 'Underkeel' },
    ]);
  });

  test('keeps the sheet and cell of every amount; another desk does not see them', async () => {
    const borrower = await newBorrower(people.desk);
    const view = await staged(people.analyst, borrower, await pack());
    done(await accept(view));
    const [june] = await quarter(borrower);
    // Income statement: headings in row 4, revenue below it; June is the third period from column B.
    expect(done(await showSource(acting(people.desk.manager, LATER), june?.id ?? 0, 'revenue'))).toEqual({
      cells: [
        {
          importId: view.id,
          fileName: 'Figures.xlsx',
          sha256: view.sha256,
          sheet: 'Income statement',
          cell: 'D5',
          rawText: '12,400',
          label: 'Revenue',
          fromFormula: false,
        },
      ],
    });
    expectRefused(await showSource(acting(people.stranger, LATER), june?.id ?? 0, 'revenue'), 'not-found');
    expectRefused(await showSource(acting(people.analyst, LATER), june?.id ?? 0, 'no line'), 'not-found');
    expectRefused(await listStatements(acting(people.stranger, LATER), borrower.id), 'not-found');
  });

  test('is refused while a question is open', async () => {
    const borrower = await newBorrower(people.desk);
    const view = await staged(people.analyst, borrower, await pack({ currency: null }));
    expectRefused(await accept(view), 'conflict', 'One question is open', 'Nothing was changed');
    expect(await statementsOf(borrower)).toEqual([]);
  });

  test('asks for basis and scope, which no file can say', () => {
    expect(importAcceptance.safeParse({ scope: 'group' }).success).toBe(false);
    expect(importAcceptance.safeParse({ basis: 'management' }).success).toBe(false);
    expect(importAcceptance.safeParse(MANAGEMENT_GROUP).success).toBe(true);
  });

  test('by two people at once takes the figures once, and the other is told who did', async () => {
    const borrower = await newBorrower(people.desk);
    const view = await staged(people.analyst, borrower, await pack());
    const both = await Promise.all([accept(view), accept(view, people.colleague)]);
    expect(both.filter((outcome) => outcome.ok)).toHaveLength(1);
    const winner = both[0].ok ? people.analyst.name : 'Colleague';
    const loser = both.find((outcome) => !outcome.ok);
    if (!loser) throw new Error('one of the two is refused');
    expectRefused(loser, 'conflict', `${winner} accepted this import already`, 'taken once');
    expect(await statementsOf(borrower)).toHaveLength(8);
  });

  test('of two files of one borrower at once numbers their versions one after the other', async () => {
    const borrower = await newBorrower(people.desk);
    const one = await staged(people.analyst, borrower, await pack());
    const other = await staged(people.colleague, borrower, await restatedPack());
    const both = await Promise.all([accept(one), accept(other, people.colleague)]);
    expect(both.map((outcome) => outcome.ok)).toEqual([true, true]);
    expect((await quarter(borrower)).map(({ version, inForce }) => [version, inForce])).toEqual([
      [2, true],
      [1, false],
    ]);
    expect(await quarter(borrower, '2026-09-30')).toHaveLength(1);
  });

  test('again with the same key gets the first answer, and makes neither figures nor a result again', async () => {
    const borrower = await withCovenant();
    const view = await staged(people.analyst, borrower, await pack());
    const send = () =>
      acceptImport(
        acting(people.analyst, RECEIVED, { key: `accept-${view.id}` }),
        { id: view.id, version: view.version },
        MANAGEMENT_GROUP,
      );
    const first = done(await send());
    expect(done(await send())).toEqual(first);
    expect(await statementsOf(borrower)).toHaveLength(8);
    expect(await assessmentCount(borrower)).toBe(1);
  });

  test('of a version that somebody changed meanwhile is stale', async () => {
    const view = await staged(people.analyst, await newBorrower(people.desk), await pack({ currency: null }));
    const answer = { questionKey: 'currency', answer: 'EUR' };
    done(
      await answerImport(acting(people.colleague, RECEIVED), { id: view.id, version: view.version }, answer),
    );
    expectRefused(await accept(view), 'stale', 'Nothing was changed');
    done(await accept({ ...view, version: view.version + 1 }));
  });

  test('counts the day that the file came by the lender’s clock, not by UTC', async () => {
    const borrower = await newBorrower(people.desk);
    // 23:30 in UTC is 00:30 of the next day in Paris, where this lender is.
    const view = await staged(people.analyst, borrower, await pack(), new Date('2026-11-20T23:30:00Z'));
    done(await accept(view, people.analyst, LATER));
    expect((await statementsOf(borrower))[0]?.receivedOn).toBe('2026-11-21');
  });
});

describe('a later file', () => {
  test('with the same figures changes nothing and says so; what it adds is added', async () => {
    const borrower = await newBorrower(people.desk);
    done(await accept(await staged(people.analyst, borrower, await pack())));
    const same = await staged(people.analyst, borrower, await pack({ costsNegative: true }), LATER);
    expectRefused(
      await accept(same, people.analyst, LATER),
      'conflict',
      'equal figures',
      'Nothing was changed',
    );

    const periods = [...QUARTERS.slice(1), tyingPeriod('2026-12-31', 13_000_000, 2_400_000)];
    const next = await staged(people.analyst, borrower, await pack({ periods }), LATER);
    expect(done(await accept(next, people.analyst, LATER))).toMatchObject({
      statements: 2,
      unchanged: 6,
      changes: [],
    });
    expect(await statementsOf(borrower)).toHaveLength(10);
  });

  test('that restates a quarter makes a new version beside the old, and the borrower gets an alert', async () => {
    const borrower = await withCovenant();
    done(await accept(await staged(people.analyst, borrower, await pack())));
    const [first] = await quarter(borrower);
    expect(await alertKinds(borrower)).not.toContain('prior figures restated');

    const view = await staged(people.analyst, borrower, await restatedPack(), LATER);
    const accepted = done(await accept(view, people.analyst, LATER));
    expect(accepted).toMatchObject({ statements: 2, unchanged: 6 });
    expect(accepted.changes).toContainEqual({
      line: 'revenue',
      periodEnd: '2026-06-30',
      months: 3,
      onFile: '12400000',
      inThisFile: '10400000',
    });
    expect(await quarter(borrower)).toMatchObject([
      { version: 2, inForce: true, importId: view.id, amounts: { revenue: '10400000.0000' } },
      { ...first, inForce: false },
    ]);
    expect(await alertKinds(borrower)).toContain('prior figures restated');
  });

  test('that does not balance is taken only as marked, and its balance sheet is marked does-not-tie', async () => {
    const borrower = await newBorrower(people.desk);
    const periods = QUARTERS.map((period) =>
      period.end === '2026-09-30'
        ? {
            ...period,
            amounts: { ...period.amounts, total_assets: Number(period.amounts['total_assets']) + 500_000 },
          }
        : period,
    );
    const view = await staged(people.analyst, borrower, await pack({ periods }));
    const [question] = view.reading.questions;
    expect(question).toMatchObject({ kind: 'does-not-balance', holdsFor: 'file' });
    const answered = (version: number, answer: string) =>
      answerImport(
        acting(people.analyst, RECEIVED),
        { id: view.id, version },
        { questionKey: question?.key ?? '', answer },
      );
    const waiting = done(await answered(view.version, 'wait'));
    expectRefused(await accept(waiting), 'conflict', 'wait for a corrected file');
    done(await accept(done(await answered(waiting.version, 'draft'))));
    const ties = (await statementsOf(borrower))
      .filter(({ months }) => months === 0)
      .map(({ periodEnd, tie }) => [periodEnd, tie]);
    expect(ties).toEqual([
      ['2026-09-30', 'does-not-tie'],
      ['2026-06-30', 'ties'],
      ['2026-03-31', 'ties'],
      ['2025-12-31', 'ties'],
    ]);
    expect(
      await rows('select id from placements where borrower_id = :id', { id: borrower.id }),
      'an answer about these figures only',
    ).toEqual([]);
  });
});

describe('withdrawing', () => {
  test('an accepted import restores what was on file before it, and all of it stays on record', async () => {
    const borrower = await withCovenant();
    done(await accept(await staged(people.analyst, borrower, await pack())));
    const before = await statementsOf(borrower);
    const view = await staged(people.analyst, borrower, await restatedPack(), LATER);
    done(await accept(view, people.analyst, LATER));
    const between = await inputVersion(borrower);

    const after = new Date('2026-11-26T10:00:00Z');
    const gone = await withdrawImport(acting(people.colleague, after), {
      id: view.id,
      version: view.version + 1,
    });
    expect(done(gone)).toMatchObject({ id: view.id, hadCounted: true });
    expect(await statementsOf(borrower)).toEqual(before);
    expect(await inputVersion(borrower)).toBe((between ?? 0) + 1);
    expect(await assessmentCount(borrower)).toBe(3);
    const tested = done(
      await showBorrower(acting(people.analyst, after), borrower.id),
    ).covenants[0]?.tests.at(-1)?.tested;
    expect(Number(tested)).toBeCloseTo(9_037_000 / 8_929_800, 6);
    expect(await rows('select id from statements where borrower_id = :id', { id: borrower.id })).toHaveLength(
      10,
    );
    expectRefused(
      await withdrawImport(acting(people.analyst, after), { id: view.id, version: view.version + 2 }),
      'conflict',
      'withdrawn already',
    );
  });

  test('of a version that somebody changed meanwhile is stale, and a draft leaves the figures alone', async () => {
    const borrower = await newBorrower(people.desk);
    const view = await staged(people.analyst, borrower, await pack());
    const stale = { id: view.id, version: view.version + 1 };
    expectRefused(await withdrawImport(acting(people.analyst, LATER), stale), 'stale');
    const version = await inputVersion(borrower);
    done(await withdrawImport(acting(people.analyst, LATER), { id: view.id, version: view.version }));
    expect(await inputVersion(borrower)).toBe(version);
    expect(await assessmentCount(borrower)).toBe(0);
  });

  test('and accepted once more, the next version has a number of its own', async () => {
    const borrower = await newBorrower(people.desk);
    const bytes = await pack();
    const first = await staged(people.analyst, borrower, bytes);
    done(await accept(first));
    done(await withdrawImport(acting(people.analyst, LATER), { id: first.id, version: first.version + 1 }));
    done(await accept(await staged(people.analyst, borrower, bytes, LATER), people.analyst, LATER));
    expect((await quarter(borrower)).map(({ version, inForce }) => [version, inForce])).toEqual([[2, true]]);
  });
});

const STATEMENTS_OF_ACCEPTING: readonly FailingStatement[] = [
  { table: 'statements', at: 'insert' },
  { table: 'statement_cells', at: 'insert' },
  { table: 'imports', at: 'update' },
  { table: 'borrower_input_versions', at: 'update', when: 'new.input_version <> old.input_version' },
  { table: 'placements', at: 'insert' },
  { table: 'audit_entries', at: 'insert' },
  { table: 'audit_heads', at: 'update' },
];

test.each(STATEMENTS_OF_ACCEPTING)(
  'accepting that is cut at $table leaves nothing half-written and can be done again',
  async (failing) => {
    const borrower = await newBorrower(people.desk);
    const view = await staged(people.analyst, borrower, await pack({ currency: null }));
    const answer = { questionKey: 'currency', answer: 'EUR' };
    const ready = done(
      await answerImport(acting(people.analyst, RECEIVED), { id: view.id, version: view.version }, answer),
    );
    const everything = async () => ({
      statements: await statementsOf(borrower),
      import: await shown(people.analyst, view.id),
      inputVersion: await inputVersion(borrower),
      remembered: await rows('select id from placements where borrower_id = :id', { id: borrower.id }),
      audit: await rows('select seq from audit_entries'),
      head: await rows('select seq, hash from audit_heads'),
    });
    const before = await everything();
    await expect(whileFailing(failing, () => accept(ready))).rejects.toThrow('fails in tests');
    expect(await everything()).toEqual(before);
    expect(done(await accept(ready)).statements).toBe(8);
  },
);

test('an assessment that fails after accepting is made good by the repeat of the request', async () => {
  const borrower = await withCovenant();
  const view = await staged(people.analyst, borrower, await pack());
  const send = () =>
    acceptImport(
      acting(people.analyst, RECEIVED, { key: `cut-${view.id}` }),
      { id: view.id, version: view.version },
      MANAGEMENT_GROUP,
    );
  await expect(whileFailing({ table: 'assessments', at: 'insert' }, send)).rejects.toThrow('fails in tests');
  expect(await assessmentCount(borrower)).toBe(0);
  done(await send());
  expect(await assessmentCount(borrower)).toBe(1);
  expect(await statementsOf(borrower)).toHaveLength(8);
});
