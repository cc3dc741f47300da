import { describe, expect, test } from 'vitest';
import { decimal } from '../money/decimal.ts';
import * as example from '../example.fixture.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { headroomRows, removedRows } from './headroomRow.ts';

const testOn = (testDate: CovenantTest['testDate'], given: Partial<CovenantTest> = {}): CovenantTest => ({
  ...example.test,
  testDate,
  ...given,
});
const rowsOf = (
  tests: readonly CovenantTest[],
  given: { reset?: string[]; cured?: string[]; roundingPlaces?: number } = {},
) =>
  headroomRows({
    borrowerId: 7,
    sector: 'metal goods',
    roundingPlaces: given.roundingPlaces ?? null,
    tests,
    resetOn: new Set(given.reset as CovenantTest['testDate'][]),
    curedOn: new Set(given.cured as CovenantTest['testDate'][]),
  });

const notMet = { outcome: 'not met', underlyingOutcome: 'not met' } as const;
const waived = { outcome: 'not met, waived', underlyingOutcome: 'not met' } as const;

describe('rows of a covenant', () => {
  test('carry the headroom as a share of the level and in its own unit', () => {
    // Net leverage of 3.00x against 3.50x: a seventh of the level.
    const [row] = rowsOf([testOn('2026-03-31')]);
    expect(row).toMatchObject({ borrowerId: 7, measure: 'net-leverage', distance: 0.5, tested: 3 });
    expect(row?.headroom).toBeCloseTo(1 / 7, 12);
  });

  test('carry the step to which the agreement rounds', () => {
    const steps = [{}, { roundingPlaces: 2 }, { roundingPlaces: 1 }].map(
      (given) => rowsOf([testOn('2026-03-31')], given)[0]?.ratioStep,
    );
    expect(steps).toEqual([null, 0.01, 0.1]);
  });

  test('leave out, each with its reason, waived, reset, cured and first tests', () => {
    const rows = rowsOf(
      [
        testOn('2025-12-31'),
        testOn('2026-03-31', waived),
        testOn('2026-06-30'),
        testOn('2026-09-30', notMet),
        testOn('2026-12-31'),
      ],
      { reset: ['2026-06-30'], cured: ['2026-09-30'] },
    );
    expect(rows.map(({ removal }) => removal)).toEqual(['first test', 'waived', 'reset', 'cured', null]);
    expect(removedRows(rows)).toEqual({ waived: 1, reset: 1, cured: 1, 'first test': 1 });
  });

  test('leave out a test that meeting the next one cured', () => {
    const deemed = testOn('2026-03-31', { outcome: 'cured', underlyingOutcome: 'not met' });
    const rows = rowsOf([testOn('2025-12-31'), deemed, testOn('2026-06-30')]);
    expect(rows.map(({ removal }) => removal)).toEqual(['first test', 'cured', null]);
    expect(rows.map(({ metBefore }) => metBefore)).toEqual([0, 1, 0]);
  });

  test('count the tests met in a row before each, a waived one as not met', () => {
    const rows = rowsOf([
      testOn('2025-09-30'),
      testOn('2025-12-31', { outcome: 'met, thin', underlyingOutcome: 'met, thin' }),
      testOn('2026-03-31', waived),
      testOn('2026-06-30'),
      testOn('2026-09-30'),
    ]);
    expect(rows.map(({ metBefore }) => metBefore)).toEqual([0, 1, 2, 0, 1]);
  });

  test('are none for tests without a result, and the first with one is the first test', () => {
    const rows = rowsOf([
      testOn('2026-03-31', { outcome: 'awaiting figures' }),
      testOn('2026-06-30', { outcome: 'not tested' }),
      testOn('2026-09-30'),
    ]);
    expect(rows.map(({ testDate, removal }) => [testDate, removal])).toEqual([['2026-09-30', 'first test']]);
  });

  test('stay, without a headroom, where the ratio has no meaning', () => {
    const noHeadroom = { ...example.test.headroom, absolute: null, shareOfLevel: null };
    const rows = rowsOf([
      testOn('2026-06-30'),
      testOn('2026-09-30', {
        outcome: 'not met, ratio has no meaning',
        underlyingOutcome: 'not met, ratio has no meaning',
        tested: decimal('-4'),
        headroom: noHeadroom,
      }),
    ]);
    expect(rows[1]).toMatchObject({ headroom: null, distance: null, removal: null });
  });
});
