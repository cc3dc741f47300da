import { expect, test } from 'vitest';
import { buildInputs } from './alerts/rule.fixture.ts';
import { assess } from './assess.ts';
import type { PlainDate } from './calendar/plainDate.ts';
import { buildCovenant, buildLevel, buildYear } from './covenants/covenant.fixture.ts';
import { smallestHeadroomsAhead } from './covenants/smallestHeadroom.ts';
import { POLICY_VERSION_1 as policy } from './policy.ts';
import { bookCrossSection } from './bookCrossSection.ts';

const asOf: PlainDate = '2026-03-15';
const nobody = bookCrossSection([], 1);
const yearly = { firstTestOn: '2024-12-31', everyMonths: 12 } as const;
const inputs = buildInputs({
  statements: [
    ...buildYear('2024-12-31', { ebitda: 12, debt: 30, cash: 0 }),
    ...buildYear('2025-12-31', { ebitda: 10, debt: 34.5, cash: 0 }),
  ],
  covenants: [
    buildCovenant({
      ...yearly,
      id: 1,
      levels: [buildLevel('2024-01-01', '2026-05-31', '3.5'), buildLevel('2026-06-01', null, '3.25')],
    }),
    buildCovenant({
      ...yearly,
      id: 2,
      measure: 'current-ratio',
      operator: '>=',
      levels: [buildLevel('2024-01-01', null, '1.2')],
    }),
    buildCovenant({
      ...yearly,
      id: 3,
      measure: 'minimum-liquidity',
      operator: '>=',
      firstTestOn: '2023-12-31',
    }),
  ],
});

test('the walk goes from statements to findings', () => {
  const assessment = assess(inputs, nobody, policy, asOf);
  expect(
    assessment.tests.map(({ covenantId, testDate, outcome }) => [covenantId, testDate, outcome]),
  ).toEqual([
    [1, '2024-12-31', 'met'],
    [1, '2025-12-31', 'met, thin'],
    [2, '2024-12-31', 'met'],
    [2, '2025-12-31', 'met'],
    [3, '2024-12-31', 'not tested'],
    [3, '2025-12-31', 'not met'],
  ]);
  expect(assessment.patterns[0]).toMatchObject({ inBand: 1, ofLast: 2, run: 1 });
  expect(assessment.findings.map(({ kind, covenantId }) => [kind, covenantId])).toEqual([
    ['test not met', 3],
    ['thin headroom', 1],
    ['step-down ahead', 1],
  ]);
  expect(assessment.quality.headline).toBeNull();
});

test('the smallest headroom is over the latest live tests; later levels are kept apart', () => {
  const { tests, smallestHeadroom } = assess(
    { ...inputs, covenants: inputs.covenants.slice(0, 2) },
    nobody,
    policy,
    asOf,
  );
  expect(smallestHeadroom?.covenantId).toBe(1);
  expect(smallestHeadroom?.mayFall.toFixed(4)).toBe('0.0143');
  const [ahead] = smallestHeadroomsAhead(tests, [1, 2]);
  expect(ahead).toMatchObject({ covenantId: 1, from: '2026-06-01' });
  expect(ahead?.mayFall.toFixed(4)).toBe('-0.0615');
});

test('a covenant that goes on holiday has no headroom at a step that another one takes in it', () => {
  const [leverage, ratio] = inputs.covenants;
  const onHoliday = {
    ...leverage!,
    levels: [buildLevel('2024-01-01', '2026-05-31', '3.5'), buildLevel('2026-06-01', null, null)],
  };
  const steppingAt = (from: PlainDate) => ({
    ...ratio!,
    levels: [buildLevel('2024-01-01', null, '1.2'), buildLevel(from, null, '1.3')],
  });
  const ahead = (from: PlainDate) => {
    const covenants = [onHoliday, steppingAt(from)];
    const { tests } = assess({ ...inputs, covenants }, nobody, policy, asOf);
    return smallestHeadroomsAhead(tests, [1, 2]).map(({ covenantId }) => covenantId);
  };
  expect(ahead('2026-05-31')).toEqual([1]);
  expect(ahead('2026-06-01')).toEqual([2]);
});

test('a first period that ends a few days after its month end is tested on the month end', () => {
  const late = buildYear('2025-01-03', { ebitda: 12, debt: 30, cash: 0 });
  const { tests } = assess({ ...inputs, statements: late }, nobody, policy, asOf);
  expect(tests[0]).toMatchObject({ testDate: '2024-12-31', outcome: 'met' });
});

test('the same arguments give the same answer', () => {
  expect(assess(inputs, nobody, policy, asOf)).toEqual(assess(inputs, nobody, policy, asOf));
});

test('a borrower without figures awaits them and is told nothing else', () => {
  const { tests, smallestHeadroom, findings } = assess({ ...inputs, statements: [] }, nobody, policy, asOf);
  expect(new Set(tests.slice(0, 4).map(({ outcome }) => outcome))).toEqual(new Set(['awaiting figures']));
  expect(smallestHeadroom).toBeNull();
  expect(findings).toEqual([]);
});
