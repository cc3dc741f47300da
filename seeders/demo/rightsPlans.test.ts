import { describe, expect, test } from 'vitest';
import type { Scenario } from './borrowerTable.ts';
import { demoBook } from './demoBook.ts';
import type { DemoBorrower } from './demoBorrower.ts';
import { netDebt, netLeverage, yearEbitda } from './ratios.ts';

const book = demoBook('2026-12-01');
const oneOf = (scenario: Scenario, of: readonly DemoBorrower[] = book): DemoBorrower => {
  const found = of.find((borrower) => borrower.scenario === scenario);
  if (!found) throw new Error(`nobody is ${scenario}`);
  return found;
};
const levelOn = ({ covenants }: DemoBorrower, date: string): number =>
  covenants[0]?.levels.find(({ from, until }) => from <= date && (until === null || until >= date))?.level ??
  Number.NaN;

/** Each test of the leverage covenant: whether it is met. */
const metOf = (borrower: DemoBorrower): boolean[] =>
  borrower.quarters.flatMap(({ quarterEnd }, index) => {
    const value = netLeverage(borrower.quarters, index);
    const isTested = quarterEnd >= (borrower.covenants[0]?.firstTestOn ?? '');
    return isTested && value !== null ? [value <= levelOn(borrower, quarterEnd)] : [];
  });

describe('rights in use', () => {
  test.each(['in cure period', 'cured by its owners', 'our own triggers'] as const)(
    '%s: the latest test alone misses its level',
    (scenario) => {
      const met = metOf(oneOf(scenario));
      expect(met.at(-1)).toBe(false);
      expect(met.slice(0, -1)).toEqual(met.slice(1).map(() => true));
    },
  );

  test('the next test cures the one before it, under a level that was reset', () => {
    const borrower = oneOf('cured by the next test');
    expect(metOf(borrower).slice(-2)).toEqual([false, true]);
    expect(borrower.covenants[0]?.levels.at(-1)?.isReset).toBe(true);
    expect(borrower.covenants[0]?.cureRights?.curedByNextTest).toBe(true);
  });

  test('the owners’ money, as EBITDA, brings the latest test to its level and little further', () => {
    const borrower = oneOf('cured by its owners');
    const { quarters, covenants } = borrower;
    const [cure] = covenants[0]?.cures ?? [];
    const latest = quarters.at(-1);
    const ebitda = yearEbitda(quarters, quarters.length - 1);
    if (!cure || !latest || ebitda === null) throw new Error('a cure expected');
    const level = levelOn(borrower, latest.quarterEnd);
    expect(netDebt(latest) / (ebitda + cure.amount)).toBeLessThanOrEqual(level);
    expect(netDebt(latest) / (ebitda + cure.amount - 50)).toBeGreaterThan(level);
  });

  test('money that has not come in by the first night is not there', () => {
    const early = demoBook('2026-11-14', ({ scenario }) => scenario === 'cured by its owners');
    expect(oneOf('cured by its owners', early).covenants[0]?.cures).toEqual([]);
  });

  test('the revolver’s leverage covenant has a trigger that the latest drawings are not above', () => {
    const { furtherCovenants, quarters, facilities } = oneOf('springing revolver');
    const { lines } = quarters.at(-1)!;
    const springing = furtherCovenants.find(({ springingTrigger }) => springingTrigger !== undefined);
    expect(lines.revolver_drawn / lines.revolver_commitment).toBeLessThanOrEqual(
      Number(springing?.springingTrigger),
    );
    expect(facilities[1]?.kind).toBe('revolving credit');
  });

  test('a loan without covenants has triggers of our own, all of them marked', () => {
    const { covenants } = oneOf('our own triggers');
    expect(covenants.length).toBeGreaterThan(1);
    expect(covenants.every(({ isOurs }) => isOurs === true)).toBe(true);
  });
});
