/** Figures are accepted: once, whole or not at all, and traceable to their cells. */
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
import { acting, done, expectRefused } from '../support/acting.ts';
import { buildPerson, type BuiltBorrower } from '../support/factories.ts';
import { whileFailing, type FailingStatement } from '../support/failingStatement.ts';
import {
  accepted,
  assessmentCountOf,
  borrowerWithCovenant,
  inputVersionOf,
  LEVERAGE,
  restatedPack,
  statementsOf,
  buildImportDesk,
  MANAGEMENT_GROUP,
  newBorrower,
  pack,
  RECEIVED,
  shown,
  staged,
  useOwnFolder,
  type ImportDesk,
} from '../support/importedFile.ts';
import { rows } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

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
  accepted(person, view, now);
const quarter = async (borrower: BuiltBorrower, end = '2026-06-30') =>
  (await statementsOf(people.analyst, borrower)).filter(
    ({ periodEnd, months }) => periodEnd === end && months === 3,
  );

describe('accepting', () => {
  test('makes a version of every period and assesses the borrower at once with the peers of last night', async () => {
    const borrower = await borrowerWithCovenant(people.desk);
    const view = await staged(people.analyst, borrower, await pack());
    const before = await inputVersionOf(borrower);
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
    const statements = await statementsOf(people.analyst, borrower);
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
    expect(await inputVersionOf(borrower)).toBe(before + 1);

    const page = done(await showBorrower(acting(people.analyst, RECEIVED), borrower.id));
    expect(page.computed).toMatchObject({
      peersAreLastNights: true,
      peersAsOf: '2026-11-19',
      asOf: '2026-11-20',
    });
    const latest = page.covenants[0]?.tests.at(-1);
    expect(latest).toMatchObject({ testDate: '2026-09-30', outcome: 'met' });
    expect(Number(latest?.tested)).toBeCloseTo(LEVERAGE, 6);
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
    expect(await statementsOf(people.analyst, borrower)).toEqual([]);
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
    expect(await statementsOf(people.analyst, borrower)).toHaveLength(8);
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
    const borrower = await borrowerWithCovenant(people.desk);
    const view = await staged(people.analyst, borrower, await pack());
    const send = () =>
      acceptImport(
        acting(people.analyst, RECEIVED, { key: `accept-${view.id}` }),
        { id: view.id, version: view.version },
        MANAGEMENT_GROUP,
      );
    const first = done(await send());
    expect(done(await send())).toEqual(first);
    expect(await statementsOf(people.analyst, borrower)).toHaveLength(8);
    expect(await assessmentCountOf(borrower)).toBe(1);
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
    expect((await statementsOf(people.analyst, borrower))[0]?.receivedOn).toBe('2026-11-21');
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
      statements: await statementsOf(people.analyst, borrower),
      import: await shown(people.analyst, view.id),
      inputVersion: await inputVersionOf(borrower),
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
  const borrower = await borrowerWithCovenant(people.desk);
  const view = await staged(people.analyst, borrower, await pack());
  const send = () =>
    acceptImport(
      acting(people.analyst, RECEIVED, { key: `cut-${view.id}` }),
      { id: view.id, version: view.version },
      MANAGEMENT_GROUP,
    );
  await expect(whileFailing({ table: 'assessments', at: 'insert' }, send)).rejects.toThrow('fails in tests');
  expect(await assessmentCountOf(borrower)).toBe(0);
  done(await send());
  expect(await assessmentCountOf(borrower)).toBe(1);
  expect(await statementsOf(people.analyst, borrower)).toHaveLength(8);
});
