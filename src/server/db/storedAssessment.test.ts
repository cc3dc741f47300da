import { expect, test } from 'vitest';
import { NO_BOOK } from '../../core/bookCrossSection.ts';
import { assess, type Assessment } from '../../core/assess.ts';
import type { BorrowerInputs } from '../../core/borrowerInputs.ts';
import { addMonthsToMonthEnd } from '../../core/calendar/plainDate.ts';
import { buildCovenant } from '../../core/covenants/covenant.fixture.ts';
import { decimal } from '../../core/money/decimal.ts';
import { POLICY_VERSION_1 } from '../../core/policy.ts';
import { buildStatement } from '../../core/statements/statement.fixture.ts';
import { readCrossSection } from './stored/crossSection.ts';
import { readAssessment, storedAssessment } from './storedAssessment.ts';

const quarterEnds = Array.from({ length: 8 }, (_, index) => addMonthsToMonthEnd('2026-09-30', -3 * index));

/** A third of a million a quarter leaves leverage without an end of digits. */
const inputs: BorrowerInputs = {
  borrowerId: 7,
  name: 'Marrowby',
  legalForm: 'company',
  sector: '25.6',
  currency: 'EUR',
  fiscalYearEndMonth: 12,
  inputVersion: 3,
  statements: quarterEnds.flatMap((end) => [
    buildStatement(end, 3, {
      revenue: 900_000,
      net_income: 70_000,
      income_tax: 20_000,
      interest_expense: 10_000,
      depreciation: 233_333.3333,
      cfo: 150_000,
    }),
    buildStatement(end, 0, {
      cash: 100_000,
      short_term_debt: 0,
      senior_debt: 4_600_000,
      total_assets: 9_000_000,
      current_assets: 3_000_000,
      current_liabilities: 2_000_000,
    }),
  ]),
  covenants: [
    buildCovenant({ firstTestOn: '2026-03-31' }),
    buildCovenant({ id: 2, measure: 'interest-cover', operator: '>=' }),
  ],
  undertakings: [],
  rates: [],
  previous: null,
};

const assessed = (): Assessment => assess(inputs, NO_BOOK, POLICY_VERSION_1, '2026-11-30');

test('an assessment read back is the one that was stored, to the last digit', () => {
  const assessment = assessed();
  expect(assessment.tests.some(({ tested }) => (tested?.dp() ?? 0) > 20)).toBe(true);
  expect(readAssessment(storedAssessment(assessment))).toEqual(assessment);
});

test('a decimal is stored as text, an absent one as nothing and not as zero', () => {
  const [first, ...rest] = assessed().tests;
  if (!first) throw new Error('no test');
  const changed = { ...assessed(), tests: [{ ...first, tested: null, level: decimal('0') }, ...rest] };
  const stored = JSON.parse(storedAssessment(changed)) as { tests: { tested: unknown; level: unknown }[] };
  expect(stored.tests[0]).toMatchObject({ tested: null, level: '0' });
  expect(readAssessment(storedAssessment(changed)).tests[0]?.level?.isZero()).toBe(true);
});

test.each([NaN, Infinity])('%s is no figure and is not stored as none', (headline) => {
  const assessment = assessed();
  const broken = { ...assessment, quality: { ...assessment.quality, headline } };
  expect(() => storedAssessment(broken)).toThrow('headline');
});

test('text that is no assessment is refused', () => {
  const stored = JSON.parse(storedAssessment(assessed())) as { tests: { outcome: string }[] };
  for (const one of stored.tests) one.outcome = 'passed';
  expect(() => readAssessment(JSON.stringify(stored))).toThrow();
  expect(() => readAssessment('{}')).toThrow();
});

test('coming tests and movements come back in every form, and an older result has none', () => {
  const coming = { testDate: '2026-12-31', quarters: 1 } as const;
  const projected = {
    ...coming,
    kind: 'projected',
    level: decimal('3.25'),
    word: 'open',
    notMet: 20,
    share: 0.5,
    n: 40,
    borrowers: 9,
    peers: 'book',
    check: null,
    openAt: null,
  } as const;
  const assessment: Assessment = {
    ...assessed(),
    projections: [
      {
        covenantId: 1,
        fromTestDate: '2026-09-30',
        reason: null,
        tests: [
          projected,
          { ...coming, kind: 'too few peers', level: decimal('3.25') },
          { ...coming, kind: 'nothing to project', reason: 'covenant holiday' },
        ],
      },
    ],
  };
  expect(assessment.sensitivity?.tests.length).toBeGreaterThan(0);
  expect(readAssessment(storedAssessment(assessment))).toEqual(assessment);
  const older = JSON.stringify(assessment, (key, value: unknown) =>
    key === 'projections' || key === 'sensitivity' ? undefined : value,
  );
  expect(readAssessment(older)).toMatchObject({ projections: [], sensitivity: null });
});

test('a night stored before patterns and changes were kept reads as one without them', () => {
  const before = readCrossSection(JSON.stringify({ version: 7, quarters: [] }));
  expect(before).toEqual({ ...NO_BOOK, version: 7 });
  expect(assess(inputs, before, POLICY_VERSION_1, '2026-11-30').projections).not.toEqual([]);
});
