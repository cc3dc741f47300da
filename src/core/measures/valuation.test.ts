import { expect, test } from 'vitest';
import { valuationAgeMonths, valuationTooOld } from './valuation.ts';

// cov-051: 30 months between the end of June 2023 and the end of 2025.
test('the age of a valuation counts whole months', () => {
  expect(valuationAgeMonths('2023-06-30', '2025-12-31')).toBe(30);
  expect(valuationAgeMonths('2025-06-30', '2025-12-29')).toBe(5);
  expect(valuationAgeMonths('2025-06-30', '2025-12-30')).toBe(6);
});

test('a valuation may be used up to the last day of its age', () => {
  const on = (testDate: '2025-06-30' | '2025-07-01') =>
    valuationTooOld({ valuationDate: '2023-06-30', testDate, mostMonths: 24 });
  expect(on('2025-06-30')).toBeNull();
  expect(on('2025-07-01')).toBe('valuation older than 24 months');
});
