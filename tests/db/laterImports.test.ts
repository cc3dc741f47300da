/** Later files supersede figures, and imports are taken back: nothing on file is ever overwritten. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { ImportView } from '../../src/contracts/imports.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { answerImport } from '../../src/server/services/answerImport.ts';
import { showBorrower } from '../../src/server/services/showBorrower.ts';
import { withdrawImport } from '../../src/server/services/withdrawImport.ts';
import { acting, done, expectRefused } from '../support/acting.ts';
import type { BuiltBorrower } from '../support/factories.ts';
import {
  accepted,
  assessmentCountOf,
  borrowerWithCovenant,
  inputVersionOf,
  LEVERAGE,
  restatedPack,
  statementsOf,
  buildImportDesk,
  newBorrower,
  pack,
  QUARTERS,
  RECEIVED,
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

const alertKinds = async (borrower: BuiltBorrower) =>
  (
    await rows<{ kind: string }>(
      'select kind from alerts where borrower_id = :id and open_slot is not null',
      {
        id: borrower.id,
      },
    )
  ).map(({ kind }) => kind);

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
    expect(await statementsOf(people.analyst, borrower)).toHaveLength(10);
  });

  test('that restates a quarter makes a new version beside the old, and the borrower gets an alert', async () => {
    const borrower = await borrowerWithCovenant(people.desk);
    done(await accept(await staged(people.analyst, borrower, await pack())));
    const [first] = await quarter(borrower);
    expect(await alertKinds(borrower)).not.toContain('prior figures restated');

    const view = await staged(people.analyst, borrower, await restatedPack(), LATER);
    const outcome = done(await accept(view, people.analyst, LATER));
    expect(outcome).toMatchObject({ statements: 2, unchanged: 6 });
    expect(outcome.changes).toContainEqual({
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
    const ties = (await statementsOf(people.analyst, borrower))
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
    const borrower = await borrowerWithCovenant(people.desk);
    done(await accept(await staged(people.analyst, borrower, await pack())));
    const before = await statementsOf(people.analyst, borrower);
    const view = await staged(people.analyst, borrower, await restatedPack(), LATER);
    done(await accept(view, people.analyst, LATER));
    const between = await inputVersionOf(borrower);

    const after = new Date('2026-11-26T10:00:00Z');
    const gone = await withdrawImport(acting(people.colleague, after), {
      id: view.id,
      version: view.version + 1,
    });
    expect(done(gone)).toMatchObject({ id: view.id, hadCounted: true });
    expect(await statementsOf(people.analyst, borrower)).toEqual(before);
    expect(await inputVersionOf(borrower)).toBe(between + 1);
    expect(await assessmentCountOf(borrower)).toBe(3);
    const tested = done(
      await showBorrower(acting(people.analyst, after), borrower.id),
    ).covenants[0]?.tests.at(-1)?.tested;
    expect(Number(tested)).toBeCloseTo(LEVERAGE, 6);
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
    const version = await inputVersionOf(borrower);
    done(await withdrawImport(acting(people.analyst, LATER), { id: view.id, version: view.version }));
    expect(await inputVersionOf(borrower)).toBe(version);
    expect(await assessmentCountOf(borrower)).toBe(0);
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
