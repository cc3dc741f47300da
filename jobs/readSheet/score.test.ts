import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, describe, expect, test } from 'vitest';
import { z } from 'zod';
import type { Reading, ReadingContext } from '../../src/core/statements/workbookReading.ts';
import { readingPool, readWorkbook } from '../../src/server/sheets/read/readWorkbook.ts';
import { answersTo } from './answers.ts';
import { expectedAnswers, expectedReading, printed, type ExpectedReading } from './expected.ts';
import { isGoodEnough, scoreFile, totalsLine } from './score.ts';

const FOLDER = join(import.meta.dirname, '../../tests/fixtures/workbooks/examples');
const NOTHING_KNOWN: ReadingContext = {
  fiscalYearEndMonth: null,
  reportingCurrency: null,
  answers: {},
  lastQuarterRevenue: null,
};
const json = (name: string): unknown => JSON.parse(readFileSync(join(FOLDER, name), 'utf8'));
const examples = z.array(expectedReading).parse(json('expected.json'));
const answers = expectedAnswers.parse(json('answers.json'));

afterAll(() => readingPool().close());

test.each(examples)('$file is read as expected', async (example) => {
  const bytes = readFileSync(join(FOLDER, example.file));
  const before = await readWorkbook(bytes, example.file, NOTHING_KNOWN);
  const given = answersTo(before, answers[example.file] ?? {});
  const after = await readWorkbook(bytes, example.file, { ...NOTHING_KNOWN, answers: given });
  const score = scoreFile(example, before, after);
  expect(score).toMatchObject({
    found: example.facts.length,
    missed: [],
    wrong: [],
    questionsMissed: [],
    questionsTooMany: [],
    refusalRight: true,
    remarks: [],
  });
});

describe('the score itself', () => {
  const expected: ExpectedReading = {
    file: 'x.xlsx',
    outcome: 'ready',
    refusal: null,
    currency: 'EUR',
    unit: 1000,
    periods: [],
    questions: [],
    not_questions: ['unit'],
    notes: [],
    checks: [],
    facts: [{ code: 'revenue', end: '2026-09-30', months: 3, amount: '1000', cell: 'P&L!B5' }],
  };
  const fact: Reading['facts'][number] = {
    code: 'revenue',
    periodEnd: '2026-09-30',
    months: 3,
    periodStart: '2026-07-01',
    amount: '1000',
    sheet: 'P&L',
    cell: 'B5',
    rawText: '1',
    label: 'Revenue',
    fromFormula: false,
    waitsFor: [],
    borrower: null,
  };
  const reading = (facts: Reading['facts'], more: Partial<Reading> = {}): Reading => ({
    outcome: 'ready',
    refusal: null,
    currency: 'EUR',
    unit: '1000',
    sheets: [],
    placements: [],
    facts,
    questions: [],
    notes: [],
    checks: [],
    layoutKey: '',
    ...more,
  });
  const of = (got: Reading) => scoreFile(expected, got, got);

  test('counts a fact as found, missed, or wrong by amount or by period', () => {
    expect(of(reading([fact]))).toMatchObject({ found: 1, missed: [], wrong: [] });
    expect(of(reading([]))).toMatchObject({ found: 0, wrong: [], missed: [expect.any(String)] });
    expect(of(reading([{ ...fact, amount: '1001' }])).wrong).toHaveLength(1);
    expect(of(reading([{ ...fact, months: 9 }])).wrong).toHaveLength(1);
    expect(of(reading([{ ...fact, waitsFor: ['unit'] }]))).toMatchObject({ found: 0, wrong: [] });
  });

  test('is not good enough with a wrong fact, with 5 % missed and more, or with a refusal too many', () => {
    const hostile = reading([], {
      outcome: 'refused',
      refusal: { code: 'hostile', where: null, message: '' },
    });
    expect(isGoodEnough([of(reading([fact]))])).toBe(true);
    expect(isGoodEnough([of(reading([{ ...fact, amount: '1001' }]))])).toBe(false);
    expect(isGoodEnough([of(reading([]))])).toBe(false);
    expect(isGoodEnough([of(hostile)])).toBe(false);
    const twenty = { ...of(reading([fact])), found: 19, expected: 20 };
    expect([isGoodEnough([twenty]), isGoodEnough([{ ...twenty, found: 18 }])]).toEqual([true, false]);
    expect(totalsLine([twenty])).toBe(
      'facts found 19 / 20, wrong facts 0, questions missed 0, questions too many 0, refusals right 0 / 0',
    );
  });

  test('a question that the file answers is one too many', () => {
    const asked = reading([fact], {
      questions: [
        { key: 'unit', kind: 'unit', holdsFor: 'layout', text: '', where: [], options: [], answer: null },
      ],
    });
    expect(of(asked).questionsTooMany).toEqual(['unit']);
    expect(printed('x.xlsx', asked).questions).toEqual(['unit']);
  });
});
