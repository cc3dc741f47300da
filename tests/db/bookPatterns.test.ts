/** What the night finds over the book: kept with its cross-section, shown over all desks, naming only one's own. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { bookCrossSection } from '../../src/core/bookCrossSection.ts';
import { bookParts } from '../../src/core/patterns/bookParts.ts';
import { bookStanding } from '../../src/core/patterns/bookStanding.ts';
import { buildBook } from '../../src/core/patterns/headroomBook.fixture.ts';
import { patternStanding } from '../../src/core/patterns/patternStanding.ts';
import { statementDigits } from '../../src/core/patterns/statementDigits.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { inTransaction } from '../../src/server/db/inTransaction.ts';
import { storeBookPatterns } from '../../src/server/db/repositories/bookPatterns.ts';
import { storeCrossSection } from '../../src/server/db/repositories/crossSections.ts';
import { runNight } from '../../src/server/services/runNight.ts';
import { showBook } from '../../src/server/services/showBook.ts';
import { acting, done } from '../support/acting.ts';
import {
  buildBorrower,
  buildCovenant,
  buildDesk,
  buildPerson,
  type BuiltDesk,
} from '../support/factories.ts';
import { ACCEPTED, buildNightBook, rows, type NightBook } from '../support/nightBook.ts';
import { useOwnDatabase } from '../support/ownDatabase.ts';

let book: NightBook;

beforeAll(async () => {
  await useOwnDatabase();
  book = await buildNightBook();
});
afterAll(closeDatabase);

const NOW = new Date('2026-12-01T08:00:00Z');
const seenBy = async (person: Person, query: Parameters<typeof showBook>[1] = {}) =>
  done(await showBook(acting(person, NOW), query));

describe('the night', () => {
  test('has not been yet: the page has nothing to show', async () => {
    expect(await seenBy(book.desk.analyst)).toBeNull();
  });

  test('keeps the book and every part of it beside its cross-section', async () => {
    const night = await runNight({
      businessDate: '2026-11-30',
      kind: 'nightly',
      startedBy: null,
      now: new Date('2026-12-01T01:30:00Z'),
    });
    expect(night.outcome).not.toBe('skipped');
    const parts = await rows<{ measure: string; sector: string }>(
      `select p.measure, p.sector from book_patterns p join cross_sections c on c.id = p.cross_section_id
       join book_standings s on s.cross_section_id = c.id order by p.measure, p.sector`,
    );
    expect(parts.map(({ measure, sector }) => [measure, sector === ''])).toEqual([
      ['', true],
      ['', false],
      ['total-leverage', true],
      ['total-leverage', false],
    ]);
  });

  test('refuses a book of three borrowers, and lists nobody', async () => {
    const view = await seenBy(book.desk.analyst);
    expect(view).toMatchObject({
      asOf: '2026-11-30',
      pattern: { ok: false, error: { kind: 'too few borrowers', needed: 5, given: 3 } },
      measures: [{ code: 'total-leverage', name: 'Total leverage' }],
      listed: [],
      standing: { gates: [], digits: { first: { ok: false } } },
    });
  });

  test('counts no test of a part that is not there', async () => {
    expect((await seenBy(book.desk.analyst, { measure: 'debt-yield' }))?.pattern).toBeNull();
    expect((await seenBy(book.desk.analyst, { sector: 'none' }))?.pattern).toBeNull();
  });
});

describe('a published list', () => {
  let other: BuiltDesk;
  let ownCovenant: number;
  let otherCovenant: number;
  let published: number;
  let auditor: Person;
  let administrator: Person;

  beforeAll(async () => {
    const lifted = buildBook({ seed: 3, borrowers: 300, quarters: 20, lifters: 0.35, lifting: 0.9 });
    const standing = patternStanding(lifted);
    const parts = bookParts(lifted, 1);
    const [night] = await rows<{ id: number }>('select id from runs order by id limit 1');
    await inTransaction(async (tx) => {
      other = await buildDesk(tx, ACCEPTED);
      auditor = await buildPerson(tx, { roles: ['auditor'], now: ACCEPTED });
      administrator = await buildPerson(tx, { roles: ['administrator'], now: ACCEPTED });
      const covenantOf = async (desk: BuiltDesk) =>
        buildCovenant(tx, await buildBorrower(tx, desk, { now: ACCEPTED }), { knownFrom: ACCEPTED });
      ownCovenant = await covenantOf(book.desk);
      otherCovenant = await covenantOf(other);
      const listed = standing.nearLine.filter(({ isPublished }) => isPublished);
      published = listed.length;
      const real = new Map([
        [listed[0]!.covenantId, ownCovenant],
        [listed[1]!.covenantId, otherCovenant],
      ]);
      const named = {
        ...standing,
        // Those of the invented book that stand for no covenant of this database are of desks nobody reads.
        nearLine: standing.nearLine.map((each) => ({
          ...each,
          covenantId: real.get(each.covenantId) ?? 1_000_000 + each.covenantId,
        })),
      };
      const { version } = await storeCrossSection(
        tx,
        {
          runId: night!.id,
          asOf: '2026-12-01',
          knownAt: new Date('2026-12-02T01:30:00Z'),
          methodVersion: '2.0',
        },
        (id) => bookCrossSection([], id),
      );
      await storeBookPatterns(tx, version, bookStanding(named, statementDigits([]), parts), parts);
    });
  });

  test('names the own desk’s borrowers only; the others are a count', async () => {
    const view = await seenBy(book.desk.analyst);
    expect(view?.listed.map(({ covenantId }) => covenantId)).toEqual([ownCovenant]);
    expect(view).toMatchObject({ readsAll: false, listedElsewhere: published - 1 });
    expect((await seenBy(other.analyst))?.listed.map(({ covenantId }) => covenantId)).toEqual([
      otherCovenant,
    ]);
  });

  test('is whole for who reads every desk, and names nobody to who reads none', async () => {
    const all = await seenBy(auditor);
    expect(all?.readsAll).toBe(true);
    expect(all?.listed.map(({ covenantId }) => covenantId).toSorted()).toEqual(
      [ownCovenant, otherCovenant].toSorted(),
    );
    expect((await seenBy(administrator))?.listed).toEqual([]);
  });

  test('shows the part that is asked for, as the night kept it', async () => {
    const whole = await seenBy(auditor);
    const part = await seenBy(auditor, { sector: 'sector 1' });
    expect(whole?.pattern).toMatchObject({ ok: true, value: { borrowers: 300 } });
    expect(part?.pattern).toMatchObject({ ok: true, value: { borrowers: 75 } });
    expect((await seenBy(auditor, { measure: 'net-leverage' }))?.pattern).toEqual(whole?.pattern);
  });
});
