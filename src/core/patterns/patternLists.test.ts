import { describe, expect, test } from 'vitest';
import { approximateSignTest } from '../statistics/approximateSignTest.ts';
import { buildBook, buildEvenBook } from './headroomBook.fixture.ts';
import { patternGates } from './patternGate.ts';
import { patternLists } from './patternLists.ts';

const lifted = buildBook({ seed: 3, borrowers: 300, quarters: 20, lifters: 0.35, lifting: 0.9 });
const smooth = buildBook({ seed: 8, borrowers: 300, quarters: 20, lifters: 0, lifting: 0 }).map((row) => ({
  ...row,
  measure: 'interest-cover' as const,
  covenantId: row.covenantId + 1_000,
}));

describe('the gate of a type of covenant', () => {
  test('takes the standardized difference from 1,000 tests on, the sign test below', () => {
    const gateAt = (count: number) => patternGates(buildEvenBook(count)).gates[0];
    expect(gateAt(999)).toMatchObject({ n: 999, test: 'approximate sign test', hasLowPower: true });
    expect(gateAt(1_000)).toMatchObject({ n: 1_000, test: 'standardized difference', hasLowPower: false });
    expect(gateAt(1_001)).toMatchObject({ n: 1_001, test: 'standardized difference' });
  });

  test('is one-sided: too few just inside the limit open nothing', () => {
    const without = buildEvenBook(3_000).filter(({ headroom }) => headroom! < 0 || headroom! >= 0.02);
    const [gate] = patternGates(without).gates;
    expect(gate!.pValue).toBeGreaterThan(0.99);
    expect(gate!.isOpen).toBe(false);
    const few = buildEvenBook(900).filter(({ headroom }) => headroom! < 0 || headroom! >= 0.02);
    const sign = approximateSignTest(
      few.map(({ headroom }) => headroom!),
      0,
      0.05,
      'one-sided',
    );
    expect(patternGates(few).gates[0]!.pValue).toBe(sign.ok ? sign.value.pAtLeast : null);
  });

  test('is corrected for the number of types by Holm', () => {
    const { gates } = patternGates([...lifted, ...smooth]);
    const [leverage, cover] = gates;
    expect(leverage!.adjusted).toBeCloseTo(Math.min(1, 2 * leverage!.pValue), 12);
    expect(cover!.adjusted).toBeCloseTo(Math.max(leverage!.adjusted, cover!.pValue), 12);
  });

  test('stays shut, and takes no part in the correction, with too few tests near the limit', () => {
    const few = buildEvenBook(200, { measure: 'current-ratio' });
    const { gates, refused } = patternGates([...lifted, ...few]);
    expect(refused).toMatchObject([{ measure: 'current-ratio', error: { given: 66 } }]);
    expect(gates).toHaveLength(1);
    expect(gates[0]!.adjusted).toBe(gates[0]!.pValue);
  });
});

describe('lists', () => {
  const lists = patternLists([...lifted, ...smooth]);

  test('are published only of types whose gate is open', () => {
    expect(lists.gates.map(({ measure, isOpen }) => [measure, isOpen])).toEqual([
      ['net-leverage', true],
      ['interest-cover', false],
    ]);
    expect(lists.published.map(({ measure }) => measure)).toEqual(['net-leverage']);
    const ranking = lists.rankings.find(({ measure }) => measure === 'net-leverage')!.ranking;
    expect(lists.published[0]!.series).toEqual(
      ranking.series.filter(({ listed }) => listed).map(({ id }) => id),
    );
    expect(lists.published[0]!.series.length).toBeGreaterThan(5);
  });

  test('rank every type all the same: the evidence of one covenant can always be read', () => {
    expect(lists.rankings.map(({ measure, ranking }) => [measure, ranking.n])).toEqual([
      ['net-leverage', 300],
      ['interest-cover', 300],
    ]);
  });

  test('take no removed test and no test without headroom', () => {
    const rows = lifted.map((row, k) =>
      k % 20 === 0
        ? { ...row, removal: 'first test' as const }
        : k % 20 === 1
          ? { ...row, headroom: null }
          : row,
    );
    const kept = rows.filter(({ removal, headroom }) => removal === null && headroom !== null);
    expect(patternLists(rows).rankings).toEqual(patternLists(kept).rankings);
  });
});
