/** A file comes in and its questions are answered: no figure counts yet, nothing is lost, nothing is there twice. */
import '../support/useDatabase.ts';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { ImportView } from '../../src/contracts/imports.ts';
import type { Person } from '../../src/server/auth/policy.ts';
import { closeDatabase } from '../../src/server/db/connection.ts';
import { storedFiles } from '../../src/server/files/storedFiles.ts';
import { acceptImport } from '../../src/server/services/acceptImport.ts';
import { answerImport } from '../../src/server/services/answerImport.ts';
import { listImports, showImport } from '../../src/server/services/listImports.ts';
import { stageImport } from '../../src/server/services/stageImport.ts';
import { withdrawImport } from '../../src/server/services/withdrawImport.ts';
import { acting, done, expectRefused, refused } from '../support/acting.ts';
import type { BuiltBorrower } from '../support/factories.ts';
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
let people: ImportDesk;

beforeAll(async () => {
  await useOwnDatabase();
  people = await buildImportDesk();
});
afterAll(async () => {
  await closeDatabase();
  clearFolder();
});

const upload = (borrower: BuiltBorrower, bytes: Buffer, fileName = 'Figures.xlsx') => ({
  borrowerId: borrower.id,
  fileName,
  bytes,
});
const importsOf = (borrower: BuiltBorrower) =>
  rows<{ id: number; state: string; sha256: string; mediaType: string }>(
    `select i.id, i.state, i.file_sha256 as sha256, f.media_type as mediaType
     from imports i join files f on f.sha256 = i.file_sha256 where i.borrower_id = :id order by i.id`,
    { id: borrower.id },
  );
const auditOf = (borrower: BuiltBorrower) =>
  rows<{ action: string; personId: number; summary: string }>(
    `select action, person_id as personId, summary from audit_entries where borrower_id = :id order by seq`,
    { id: borrower.id },
  );
const statementCount = async (borrower: BuiltBorrower) =>
  (await rows('select id from statements where borrower_id = :id', { id: borrower.id })).length;

describe('a file that is sent', () => {
  test('is kept byte for byte with its reading, as a draft, and no figure counts', async () => {
    const borrower = await newBorrower(people.desk);
    const bytes = await pack();
    const view = await staged(people.analyst, borrower, bytes);
    expect(view).toMatchObject({
      state: 'draft',
      openQuestions: 0,
      periods: 8,
      uploadedBy: people.analyst.name,
    });
    // 12.91 million of revenue in the last quarter, printed in thousands.
    expect(
      view.reading.facts.find((fact) => fact.code === 'revenue' && fact.periodEnd === '2026-09-30'),
    ).toMatchObject({
      amount: '12910000',
      sheet: 'Income statement',
      cell: 'E5',
      rawText: '12,910',
    });
    expect(Buffer.from((await storedFiles().get(view.sha256)) ?? []).equals(bytes)).toBe(true);
    expect(await statementCount(borrower)).toBe(0);
    expect(await auditOf(borrower)).toEqual([
      {
        action: 'stage-import',
        personId: people.analyst.id,
        summary: `Received Figures.xlsx for ${borrower.name}`,
      },
    ]);
  });

  test('as text is kept as text', async () => {
    const borrower = await newBorrower(people.desk);
    const text =
      'EUR thousand;30 Sep 2026;30 Jun 2026\nRevenue;12910;12400\nCost of sales;8004;7688\nGross profit;4906;4712\n';
    done(
      await stageImport(acting(people.analyst, RECEIVED), upload(borrower, Buffer.from(text), 'figures.csv')),
    );
    expect(await importsOf(borrower)).toMatchObject([{ state: 'draft', mediaType: 'text/csv' }]);
  });

  test('and cannot be read leaves nothing but an audit entry', async () => {
    const borrower = await newBorrower(people.desk);
    const refusal = refused(
      await stageImport(acting(people.analyst, RECEIVED), upload(borrower, Buffer.from('%PDF-1.7\n'))),
    );
    expect(refusal).toMatchObject({ kind: 'refused-file', code: 'not-a-workbook' });
    expect(await importsOf(borrower)).toEqual([]);
    expect(await auditOf(borrower)).toEqual([
      {
        action: 'refuse-file',
        personId: people.analyst.id,
        summary: `Refused a file for ${borrower.name}: not-a-workbook`,
      },
    ]);
  });

  test('a second time is one import, and the answer says where it is', async () => {
    const borrower = await newBorrower(people.desk);
    const bytes = await pack();
    const { id } = await staged(people.analyst, borrower, bytes);
    const again = await stageImport(
      acting(people.colleague, RECEIVED),
      upload(borrower, bytes, 'Copy of figures.xlsx'),
    );
    expectRefused(
      again,
      'conflict',
      'Figures.xlsx',
      '20 Nov 2026',
      people.analyst.name,
      `draft, import ${id}`,
    );
    expect(await importsOf(borrower)).toHaveLength(1);
  });

  test('twice at the same moment is one import', async () => {
    const borrower = await newBorrower(people.desk);
    const bytes = await pack();
    const both = await Promise.all(
      [people.analyst, people.colleague].map((person) =>
        stageImport(acting(person, RECEIVED), upload(borrower, bytes)),
      ),
    );
    expect(both.filter((outcome) => outcome.ok)).toHaveLength(1);
    const [one] = await importsOf(borrower);
    const second = both.find((outcome) => !outcome.ok);
    if (!second) throw new Error('one of the two is refused');
    expectRefused(second, 'conflict', `import ${one?.id}`);
    expect(await auditOf(borrower)).toHaveLength(1);
  });

  test('again with the same key, because its answer was lost, gets that answer', async () => {
    const borrower = await newBorrower(people.desk);
    const bytes = await pack();
    const send = () =>
      stageImport(acting(people.analyst, RECEIVED, { key: 'lost-answer' }), upload(borrower, bytes));
    const first = done(await send());
    expect(done(await send())).toEqual(first);
    expect(await importsOf(borrower)).toHaveLength(1);
    const otherKey = acting(people.analyst, RECEIVED, { key: 'another' });
    expectRefused(await stageImport(otherKey, upload(borrower, bytes)), 'conflict', `import ${first.id}`);
  });

  test('belongs to one borrower: the same bytes for another are another import', async () => {
    const bytes = await pack();
    const [one, other] = [await newBorrower(people.desk), await newBorrower(people.desk)];
    const first = await staged(people.analyst, one, bytes);
    expect((await staged(people.analyst, other, bytes)).id).not.toBe(first.id);
  });

  test('may be sent again once it is withdrawn', async () => {
    const borrower = await newBorrower(people.desk);
    const bytes = await pack();
    const { id, version } = await staged(people.analyst, borrower, bytes);
    done(await withdrawImport(acting(people.colleague, RECEIVED), { id, version }));
    await staged(people.analyst, borrower, bytes);
    expect((await importsOf(borrower)).map(({ state }) => state)).toEqual(['withdrawn', 'draft']);
  });

  test('is nothing that another desk’s analyst, or anybody but an analyst, can send or reach', async () => {
    const borrower = await newBorrower(people.desk);
    const bytes = await pack();
    const { id, version } = await staged(people.analyst, borrower, bytes);
    const outsiders: readonly Person[] = [
      people.stranger,
      people.desk.manager,
      { ...people.stranger, roles: ['auditor'] },
    ];
    for (const person of outsiders) {
      const actor = acting(person, RECEIVED);
      const answer = { questionKey: 'unit', answer: '1000' };
      for (const outcome of [
        await stageImport(actor, upload(borrower, bytes)),
        await answerImport(actor, { id, version }, answer),
        await acceptImport(actor, { id, version }, MANAGEMENT_GROUP),
        await withdrawImport(actor, { id, version }),
      ])
        expect(refused(outcome).kind).toBe('not-found');
    }
    expect(refused(await showImport(acting(people.stranger, RECEIVED), id))).toEqual({
      kind: 'not-found',
      what: 'import',
    });
    expect(done(await showImport(acting(people.desk.manager, RECEIVED), id)).mayEdit).toBe(false);
    const query = { page: 1, perPage: 50, borrowerId: borrower.id };
    expect(done(await listImports(acting(people.stranger, RECEIVED), query)).rows).toEqual([]);
    expect(done(await listImports(acting(people.analyst, RECEIVED), query)).rows).toMatchObject([{ id }]);
    expect((await shown(people.analyst, id)).version).toBe(version);
  });
});

describe('a question', () => {
  const unclear = () => pack({ unit: null, currency: null });
  const say = (view: ImportView, questionKey: string, answer: string | null, person = people.analyst) =>
    answerImport(acting(person, RECEIVED), view, { questionKey, answer });

  test('is answered by one person at one time, and the file is read anew with all answers', async () => {
    const view = await staged(people.analyst, await newBorrower(people.desk), await unclear());
    expect(view.reading.questions.map(({ key, answer }) => [key, answer])).toEqual([
      ['unit', null],
      ['currency', null],
    ]);
    done(await say(view, 'unit', '1000', people.colleague));
    const half = await shown(people.analyst, view.id);
    expect(half).toMatchObject({ openQuestions: 1, reading: { outcome: 'questions', unit: '1000' } });
    expect(half.answers).toEqual([
      {
        questionKey: 'unit',
        answer: '1000',
        holdsFor: 'layout',
        by: 'Colleague',
        at: RECEIVED.toISOString(),
      },
    ]);
    done(await say(half, 'currency', 'EUR'));
    expect(await shown(people.analyst, view.id)).toMatchObject({
      openQuestions: 0,
      reading: { outcome: 'ready', unit: '1000', currency: 'EUR' },
    });
  });

  test('is open again once its answer is taken back; what was answered stays on record', async () => {
    const view = await staged(people.analyst, await newBorrower(people.desk), await unclear());
    const first = done(await say(view, 'unit', '1000'));
    const second = done(await say({ ...view, ...first }, 'unit', '1'));
    done(await say({ ...view, ...second }, 'unit', null));
    expect(await shown(people.analyst, view.id)).toMatchObject({ openQuestions: 2, answers: [] });
    expect(
      await rows<{ answer: string; undone: number }>(
        'select answer, undone_at is not null as undone from import_answers where import_id = :id order by id',
        { id: view.id },
      ),
    ).toEqual([
      { answer: '1000', undone: 1 },
      { answer: '1', undone: 1 },
    ]);
  });

  test('takes an answer that it offers, and no question that the file does not ask', async () => {
    const view = await staged(people.analyst, await newBorrower(people.desk), await unclear());
    expect(refused(await say(view, 'unit', '12'))).toMatchObject({
      kind: 'invalid',
      errors: [{ field: 'answer' }],
    });
    expect(refused(await say(view, 'tone', 'kind'))).toMatchObject({
      kind: 'invalid',
      errors: [{ field: 'questionKey' }],
    });
    expect(await shown(people.analyst, view.id)).toEqual(view);
  });

  test('that two people answer at once is answered by one; the other is told and has changed nothing', async () => {
    const view = await staged(people.analyst, await newBorrower(people.desk), await unclear());
    const both = await Promise.all([
      say(view, 'unit', '1000'),
      say(view, 'unit', '1000000', people.colleague),
      say(view, 'currency', 'USD', people.colleague),
    ]);
    const late = both.filter((outcome) => !outcome.ok);
    expect(late).toHaveLength(2);
    for (const outcome of late) expectRefused(outcome, 'stale', 'Somebody answered', 'Nothing was changed');
    const after = await shown(people.analyst, view.id);
    expect(after.answers).toHaveLength(1);
    expect(after.version).toBe(view.version + 1);
    expect(after.reading.questions.filter(({ answer }) => answer !== null)).toHaveLength(1);
  });

  test('answered again with the same key is answered once', async () => {
    const view = await staged(people.analyst, await newBorrower(people.desk), await unclear());
    const send = () =>
      answerImport(acting(people.analyst, RECEIVED, { key: `answer-${view.id}` }), view, {
        questionKey: 'unit',
        answer: '1000',
      });
    const first = done(await send());
    expect(done(await send())).toEqual(first);
    expect(await shown(people.analyst, view.id)).toMatchObject({
      version: first.version,
      answers: [{ answer: '1000' }],
    });
  });

  const odd = (last: number) =>
    pack({
      currency: null,
      periods: [...QUARTERS.slice(1), tyingPeriod('2026-12-31', last, 2_400_000)],
      change: (workbook) =>
        workbook.getWorksheet('Balance sheet')?.eachRow((row) => {
          if (row.getCell(1).value === 'Trade payables') row.getCell(1).value = 'Xylograph provision';
        }),
    });

  test('answered once is not asked of the next file of that layout; another borrower’s file asks it', async () => {
    const borrower = await newBorrower(people.desk);
    const placement = 'placement:Balance sheet:Xylograph provision';
    const view = await staged(people.analyst, borrower, await odd(13_000_000));
    expect(view.reading.questions.map(({ key }) => key).sort()).toEqual(['currency', placement]);
    const first = done(await say(view, 'currency', 'EUR'));
    const second = done(await say({ ...view, ...first }, placement, 'payables'));
    expect(
      await rows('select id from placements where borrower_id = :id', { id: borrower.id }),
      'not before it is accepted',
    ).toEqual([]);
    done(await acceptImport(acting(people.analyst, RECEIVED), { ...view, ...second }, MANAGEMENT_GROUP));

    const next = await staged(people.colleague, borrower, await odd(13_100_000));
    expect(next).toMatchObject({ openQuestions: 0, reading: { outcome: 'ready', currency: 'EUR' } });
    expect(next.reading.placements.find(({ label }) => label === 'Xylograph provision')?.code).toBe(
      'payables',
    );
    expect(next.answers.find(({ questionKey }) => questionKey === 'currency')).toMatchObject({
      answer: 'EUR',
      by: `remembered from ${people.analyst.name}`,
    });

    const stranger = await staged(people.analyst, await newBorrower(people.desk), await odd(13_200_000));
    expect(stranger.openQuestions).toBe(2);
  });

  test('of an accepted or withdrawn import takes no answer', async () => {
    const view = await staged(people.analyst, await newBorrower(people.desk), await unclear());
    done(await withdrawImport(acting(people.analyst, RECEIVED), view));
    expectRefused(await say({ ...view, version: view.version + 1 }, 'unit', '1000'), 'conflict', 'withdrawn');
  });
});
