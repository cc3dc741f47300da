import { describe, expect, test } from 'vitest';
import { statements } from '../example.fixture.ts';
import { buildCovenant } from '../covenants/covenant.fixture.ts';
import type { CovenantTest } from '../covenants/covenantTest.ts';
import { testCovenant } from '../covenants/testCovenant.ts';
import type { MeasureCode } from '../measures/measure.ts';
import { decimal } from '../money/decimal.ts';
import { POLICY_VERSION_1 } from '../policy.ts';
import { bookOf } from '../statements/statementBook.ts';
import { ratioSeries } from './ratioSeries.ts';

const book = bookOf(statements, 12);
const borrower = { borrowerId: 1, sector: 'glass' };
const tested = testCovenant(buildCovenant(), book, '2026-09-30', POLICY_VERSION_1, '2026-11-30');

const withSides = (
  measure: MeasureCode,
  numerator: number | null,
  denominator: number | null,
): CovenantTest => ({
  ...tested,
  measure,
  operator: measure === 'net-leverage' ? '<=' : '>=',
  numerator: numerator === null ? null : decimal(numerator),
  denominator: denominator === null ? null : decimal(denominator),
});
const pointOf = (...sides: Parameters<typeof withSides>) =>
  ratioSeries(borrower, [withSides(...sides)], book)?.points[0];

test('a series has the ratio, its level and the borrower’s leverage of the day', () => {
  expect(ratioSeries(borrower, [tested], book)).toEqual({
    ...borrower,
    covenantId: 1,
    measure: 'net-leverage',
    bound: 'most',
    // Net debt 45 - 6 over EBITDA of 13.
    points: [{ testDate: '2026-09-30', ratio: 3, hasEarnings: true, level: 3.5, leverage: 3 }],
  });
});

describe('what has no meaning', () => {
  test('earnings of nought or below that carry debt', () => {
    expect(pointOf('net-leverage', 39, 0)).toMatchObject({ hasEarnings: false });
    expect(pointOf('net-leverage', 39, 0.01)).toMatchObject({ hasEarnings: true, ratio: 3900 });
    expect(pointOf('net-leverage', -2, -1)).toMatchObject({ hasEarnings: false });
  });

  test('earnings of nought or below that should cover a charge', () => {
    expect(pointOf('interest-cover', 0, 4)).toMatchObject({ hasEarnings: false });
    expect(pointOf('interest-cover', 1, 4)).toMatchObject({ hasEarnings: true, ratio: 0.25 });
  });

  test('no charge to cover is no point: it is met, and no multiple of anything', () => {
    expect(pointOf('interest-cover', 12, 0)).toBeUndefined();
    expect(pointOf('current-ratio', 12, -1)).toBeUndefined();
  });

  test('net cash stays a point, below nought, with earnings', () => {
    expect(pointOf('net-leverage', -13, 13)).toMatchObject({ hasEarnings: true, ratio: -1 });
  });

  test('figures that are missing are no point', () => {
    expect(pointOf('net-leverage', null, 13)).toBeUndefined();
    expect(pointOf('net-leverage', 39, null)).toBeUndefined();
  });
});

test('an amount is its own series', () => {
  expect(pointOf('minimum-liquidity', 6e6, null)).toMatchObject({ ratio: 6e6, hasEarnings: true });
});
