import { expect, test } from 'vitest';
import { monthsOfFlow } from './annualised.ts';

const quarterly = { firstTestOn: '2025-03-31', everyMonths: 3 } as const;

test.each([
  ['2024-12-31', 12],
  ['2025-03-31', 3],
  ['2025-06-30', 6],
  ['2025-09-30', 9],
  ['2025-12-31', 12],
  ['2026-03-31', 12],
] as const)('of three annualised quarterly tests the one on %s takes %s months', (date, months) => {
  expect(monthsOfFlow({ annualisedFirstTests: 3 }, quarterly, date)).toBe(months);
});

test('without annualised tests every test takes twelve months, and half-yearly ones begin with six', () => {
  expect(monthsOfFlow({ annualisedFirstTests: 0 }, quarterly, '2025-03-31')).toBe(12);
  const halfYearly = { firstTestOn: '2025-06-30', everyMonths: 6 } as const;
  expect(monthsOfFlow({ annualisedFirstTests: 1 }, halfYearly, '2025-06-30')).toBe(6);
  expect(monthsOfFlow({ annualisedFirstTests: 1 }, halfYearly, '2025-12-31')).toBe(12);
});
