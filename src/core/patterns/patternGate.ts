import type { MeasureCode } from '../measures/measure.ts';
import { adjustedPValues } from '../statistics/adjustedPValues.ts';
import { approximateSignTest } from '../statistics/approximateSignTest.ts';
import { LOW_POWER_BELOW, SIGNIFICANCE } from './bookPattern.ts';
import { groupedBy } from './groupedBy.ts';
import type { HeadroomRow } from './headroomRow.ts';
import { keptRows, type KeptRows, type TooFewNearLimit } from './nearLimit.ts';
import { sidesOfLimit } from './sidesOfLimit.ts';

/** The book's own test of one type of covenant: without it no list of borrowers is shown. */
export interface Gate {
  readonly measure: MeasureCode;
  readonly n: number;
  readonly test: 'standardized difference' | 'approximate sign test';
  /** One-sided. */
  readonly pValue: number;
  /** Holm's, over all types that could be tested. */
  readonly adjusted: number;
  readonly isOpen: boolean;
  /** Fewer than 1,000 tests: even a closed gate says little. */
  readonly hasLowPower: boolean;
}

export interface PatternGates {
  readonly gates: readonly Gate[];
  /** Types with too few tests near the limit: not tested, closed. */
  readonly refused: readonly { readonly measure: MeasureCode; readonly error: TooFewNearLimit }[];
}

const GATE_WIDTH = 0.02;

/**
 * For which types of covenant the book shows more tests just inside the limit than a smooth pattern implies, at 5 %
 * over all types together (Holm).
 *
 * From 1,000 tests on by the standardized difference with the multinomial variance, below by the approximate sign
 * test. Source: methods.md Part C 5.4.
 *
 * @example patternGates([]) // => { gates: [], refused: [] }
 */
export function patternGates(rows: readonly HeadroomRow[]): PatternGates {
  const tested: Omit<Gate, 'adjusted' | 'isOpen'>[] = [];
  const refused: { measure: MeasureCode; error: TooFewNearLimit }[] = [];
  for (const [measure, ofMeasure] of groupedBy(rows, (row) => row.measure)) {
    const kept = keptRows(ofMeasure);
    if (kept.ok) tested.push({ measure, ...testOf(kept.value) });
    else refused.push({ measure, error: kept.error });
  }
  const adjusted = adjustedPValues(
    tested.map(({ pValue }) => pValue),
    'holm',
  );
  const gates = tested.map((each, k) => ({
    ...each,
    adjusted: adjusted[k]!,
    isOpen: adjusted[k]! <= SIGNIFICANCE,
  }));
  return { gates, refused };
}

function testOf({ headrooms, n }: KeptRows): Pick<Gate, 'n' | 'test' | 'pValue' | 'hasLowPower'> {
  if (n >= LOW_POWER_BELOW) {
    // Without a single test in three bins nothing speaks for a pattern: the gate stays closed.
    const pValue = sidesOfLimit(headrooms, n, GATE_WIDTH, 0).pRight ?? 1;
    return { n, test: 'standardized difference', pValue, hasLowPower: false };
  }
  const sign = approximateSignTest(headrooms, 0, SIGNIFICANCE, 'one-sided');
  const pValue = sign.ok ? sign.value.pAtLeast : 1;
  return { n, test: 'approximate sign test', pValue, hasLowPower: true };
}
