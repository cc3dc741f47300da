import fc from 'fast-check';
import { expect, test } from 'vitest';
import { nearLineEvidence } from './nearLineEvidence.ts';

/** One part in three on the passing side: a flat density over the window. */
const FLAT = { passing: 1, failing: 2 };

test('the smallest p that all tests passing can give falls by a third each', () => {
  // methods.md Part C 5.2: .333 .111 .037 .0123 .0041 .0014
  const smallest = [1, 2, 3, 4, 5, 6].map(
    (passing) => nearLineEvidence({ passing, failing: 0 }, FLAT).pAtLeast,
  );
  smallest.forEach((p, k) => expect(p).toBeCloseTo(3 ** -(k + 1), 12));
});

test('is the share of all ways in which the near tests can lie', () => {
  const shares = fc.double({ min: 0.06, max: 0.94, noNaN: true });
  fc.assert(
    fc.property(
      shares,
      fc.integer({ min: 0, max: 7 }),
      fc.integer({ min: 0, max: 7 }),
      (share, near, seen) => {
        const passing = Math.min(near, seen);
        let [atLeast, more] = [0, 0];
        for (let ways = 0; ways < 2 ** near; ways += 1) {
          const count = ways.toString(2).replaceAll('0', '').length;
          const chance = share ** count * (1 - share) ** (near - count);
          if (count >= passing) atLeast += chance;
          if (count > passing) more += chance;
        }
        const found = nearLineEvidence(
          { passing, failing: near - passing },
          { passing: share, failing: 1 - share },
        );
        expect(found.pAtLeast).toBeCloseTo(atLeast, 11);
        expect(found.pMid).toBeCloseTo((atLeast + more) / 2, 11);
        expect(found.expectedPassing).toBeCloseTo(near * share, 12);
      },
    ),
  );
});

test('no tests near the line speak for nothing', () => {
  expect(nearLineEvidence({ passing: 0, failing: 0 }, FLAT)).toMatchObject({
    near: 0,
    pAtLeast: 1,
    pMid: 0.5,
    bayesFactor: 1,
  });
});

test('keeps the expected share within 5 % and 95 %, and takes a third where neither side can be reached', () => {
  const shareAt = (passing: number, failing: number) =>
    nearLineEvidence({ passing: 1, failing: 1 }, { passing, failing }).share;
  expect([shareAt(4.9, 95.1), shareAt(5.1, 94.9), shareAt(95.1, 4.9)]).toEqual([0.05, 0.051, 0.95]);
  expect(shareAt(0, 0)).toBe(1 / 3);
});

test('more passing of as many near ones speaks for more', () => {
  const factors = [0, 1, 2, 3, 4, 5].map(
    (passing) => nearLineEvidence({ passing, failing: 5 - passing }, FLAT).bayesFactor,
  );
  expect(factors).toEqual([...factors].sort((a, b) => a - b));
  expect(factors[0]).toBeLessThan(1);
  expect(factors[5]).toBeGreaterThan(1);
});
