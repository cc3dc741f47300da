import { expect, test } from 'vitest';
import { buildCovenant, buildLevel, buildYear } from '../covenants/covenant.fixture.ts';
import { decimal } from '../money/decimal.ts';
import { buildContext, buildInputs, buildQuality } from './rule.fixture.ts';
import { withAccrualsTakenOut } from '../covenants/onAccruals.ts';
import { leavesOpen } from './unknownConditions.ts';

const asOf = '2026-03-15';
const holiday = [buildLevel('2024-01-01', '2025-06-30', '3.5'), buildLevel('2025-07-01', null, null)];
const always = [buildLevel('2024-01-01', null, '3.5')];
const covenants = [buildCovenant({ firstTestOn: '2024-12-31', everyMonths: 12, levels: always })];
const year = buildYear('2024-12-31', { ebitda: 12, debt: 30, cash: 0 });

const isOpen = (given: Parameters<typeof buildInputs>[0]) =>
  leavesOpen(buildContext(buildInputs({ covenants, ...given }), asOf))('thin headroom', 1);

test('figures that were all taken back say nothing, so nothing is closed by them', () => {
  expect(isOpen({ statements: [] })).toBe(true);
});

test('a day without a level before figures that were taken back says nothing either', () => {
  const levels = [buildLevel('2025-01-01', null, '3.5')];
  expect(isOpen({ statements: year, covenants: [{ ...covenants[0]!, levels }] })).toBe(true);
});

test('while the latest figures are awaited the test before them speaks', () => {
  expect(isOpen({ statements: year })).toBe(false);
});

test('a latest test that cannot be made leaves it open', () => {
  const noCash = year.map((statement) => ({
    ...statement,
    amounts: { ...statement.amounts, cash: undefined },
  }));
  expect(isOpen({ statements: noCash })).toBe(true);
});

test('a holiday, or a covenant that is no more, leaves nothing open', () => {
  expect(isOpen({ statements: year, covenants: [{ ...covenants[0]!, levels: holiday }] })).toBe(false);
  expect(isOpen({ statements: year, covenants: [] })).toBe(false);
});

test('without a score nothing about quality is known', () => {
  const context = buildContext(buildInputs({ covenants, statements: year }), asOf);
  const ask = (headline: number | null) =>
    leavesOpen({ ...context, quality: buildQuality({ headline }) })('reporting quality weak', null);
  expect([ask(null), ask(29)]).toEqual([true, false]);
});

test('without peers nothing about tests to come is known; with some of them it is', () => {
  const context = buildContext(buildInputs({ covenants, statements: year }), asOf);
  const coming = { testDate: '2026-12-31', quarters: 1 } as const;
  const withTests = (kinds: readonly ('too few peers' | 'nothing to project')[]) =>
    leavesOpen({
      ...context,
      projections: [
        {
          covenantId: 1,
          fromTestDate: '2026-09-30',
          reason: null,
          tests: kinds.map((kind) =>
            kind === 'too few peers'
              ? { ...coming, kind, level: decimal('3.5') }
              : { ...coming, kind, reason: 'covenant holiday' },
          ),
        },
      ],
    })('headroom shrinking', 1);
  expect(withTests(['too few peers'])).toBe(true);
  expect(withTests(['nothing to project'])).toBe(false);
  expect(withTests([])).toBe(false);
});

test('accruals that were not computed for a test leave open whether it is met only on them', () => {
  const context = buildContext(buildInputs({ covenants, statements: year }), asOf);
  const ask = (tests: typeof context.tests) => leavesOpen({ ...context, tests })('met only on accruals', 1);
  expect(ask(context.tests)).toBe(true);
  const computed = context.tests.map((one) =>
    withAccrualsTakenOut(one, covenants[0]!, { unexplained: 0, workingCapital: 0 }),
  );
  expect(ask(computed)).toBe(false);
});
