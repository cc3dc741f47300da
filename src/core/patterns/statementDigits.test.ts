import { describe, expect, test } from 'vitest';
import { decimal } from '../money/decimal.ts';
import type { Amounts } from '../statements/statement.ts';
import { benfordShares } from '../statistics/leadingDigits.ts';
import { digitTests, statementDigits, sumOfDigits, type StatementDigits } from './statementDigits.ts';

const sheet = (amounts: Record<string, number>, unit = 1_000) => ({
  amounts: Object.fromEntries(
    Object.entries(amounts).map(([line, amount]) => [line, decimal(amount)]),
  ) as Amounts,
  roundingUnit: decimal(unit),
});
const counted = ({ first }: StatementDigits): number => first.reduce((sum, count) => sum + count, 0);

describe('which amounts are counted', () => {
  test('signs do not matter, missing and nil amounts have no digits', () => {
    const { first, second } = statementDigits([
      sheet({ revenue: 345_000, other_non_operating: -31_000, inventory: 0 }),
    ]);
    expect(first).toEqual([0, 0, 2, 0, 0, 0, 0, 0, 0]);
    expect(second).toEqual([0, 1, 0, 0, 1, 0, 0, 0, 0, 0]);
  });

  test('sums and memorandum lines are left out', () => {
    expect(counted(statementDigits([sheet({ total_assets: 5e6, ebit: 4e5, revolver_drawn: 3e5 })]))).toBe(0);
  });

  test('an amount counts from ten rounding units on', () => {
    const of = (amount: number) => counted(statementDigits([sheet({ revenue: amount })]));
    expect([of(9_000), of(10_000), of(11_000), of(-10_000)]).toEqual([0, 1, 1, 1]);
    expect(counted(statementDigits([sheet({ revenue: 9_000 }, 1)]))).toBe(1);
  });
});

describe('the book’s test', () => {
  /** As many of each digit as Benford's law has, of so many amounts. */
  const lawful = (n: number): StatementDigits => ({
    first: wholeCounts(benfordShares('first'), n),
    second: wholeCounts(benfordShares('second'), n),
  });
  const wholeCounts = (shares: readonly number[], n: number) => {
    const counts = shares.map((share) => Math.floor(share * n));
    counts[0]! += n - counts.reduce((sum, count) => sum + count, 0);
    return counts;
  };

  test('is refused below 1,000 amounts', () => {
    expect(digitTests(lawful(999)).first).toEqual({
      ok: false,
      error: { kind: 'too-few-points', needed: 1_000, given: 999 },
    });
    for (const n of [1_000, 1_001]) {
      const { first, second } = digitTests(lawful(n));
      expect(first).toMatchObject({ ok: true, value: { n, meanDeviation: { conformity: 'close' } } });
      expect(second.ok).toBe(true);
    }
  });

  test('takes the members’ counts together', () => {
    const sum = sumOfDigits([lawful(600), lawful(400)]);
    expect(sum.first[0]).toBe(lawful(600).first[0]! + lawful(400).first[0]!);
    expect(digitTests(sum).first.ok).toBe(true);
  });
});
