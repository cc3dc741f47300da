import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { nextTest } from './nextTest.ts';
import { ownChanges, peerChanges, type RatioHistory, type RatioPoint } from './peerChanges.ts';
import { peerDraws } from './peerDraws.ts';

const at = (ratio: number): RatioPoint => ({ ratio, hasEarnings: true });
const GONE: RatioPoint = { ratio: -4, hasEarnings: false };

const history = (
  borrowerId: number,
  points: RatioHistory['points'],
  given: Partial<RatioHistory> = {},
): RatioHistory => ({
  borrowerId,
  sector: 'glass',
  leverage: 3,
  points,
  ...given,
});

/** `count` borrowers whose ratio went from 2 to the given ones, one each. */
const moved = (count: number, to: (k: number) => number, given: Partial<RatioHistory> = {}) =>
  Array.from({ length: count }, (_, k) => history(k + 100, [at(2), at(to(k))], given));

const asked = { borrowerId: 1, bound: 'most', ratio: 2, level: 2.5 } as const;

describe('peers', () => {
  test('below 30 changes even over the whole book there is no figure', () => {
    const countOf = (count: number) =>
      nextTest(
        peerChanges(
          moved(count, () => 2),
          1,
        ),
        asked,
      );
    expect(countOf(29)).toEqual({ ok: false, error: { kind: 'too few peers', needed: 30, given: 29 } });
    expect(countOf(30)).toMatchObject({ ok: true, value: { n: 30, share: 0 } });
    expect(countOf(31)).toMatchObject({ ok: true, value: { n: 31 } });
  });

  test('are the sector and third of leverage, the book where those have fewer than 30 changes', () => {
    const own = history(1, [null, null]);
    const peersOf = (count: number) => {
      const sector = moved(count, () => 2);
      const others = moved(60, () => 3, { sector: 'paper' }).map((each) => ({
        ...each,
        borrowerId: each.borrowerId + 500,
      }));
      const found = nextTest(peerChanges([own, ...sector, ...others], 1), asked);
      if (!found.ok) throw new Error(found.error.kind);
      return [found.value.peers, found.value.n, found.value.notMet];
    };
    expect(peersOf(29)).toEqual(['book', 89, 60]);
    expect(peersOf(30)).toEqual(['sector and third of leverage', 30, 0]);
  });

  test('of one sector are told apart by thirds of leverage', () => {
    const thirds = [1, 3, 6].flatMap((leverage, third) =>
      moved(40, () => (third === 2 ? 3 : 2), { leverage }).map((each) => ({
        ...each,
        borrowerId: each.borrowerId + 100 * third,
      })),
    );
    const shareOf = (borrowerId: number) => {
      const found = nextTest(peerChanges(thirds, 1), { ...asked, borrowerId });
      return found.ok && [found.value.n, found.value.share];
    };
    expect([shareOf(100), shareOf(200), shareOf(300)]).toEqual([
      [39, 0],
      [39, 0],
      [39, 1],
    ]);
  });

  test('never include the borrower itself', () => {
    const own = history(1, [at(2), at(9)]);
    const found = nextTest(peerChanges([own, ...moved(40, (k) => (k % 2 ? 2 : 9))], 1), asked);
    expect(found).toMatchObject({ ok: true, value: { n: 40, notMet: 20 } });
  });
});

describe('changes', () => {
  test('over two quarters are taken over two, not compounded from single ones', () => {
    const histories = Array.from({ length: 31 }, (_, k) => history(k + 10, [at(2), at(8), at(2.2)]));
    const shareAt = (horizon: number) => {
      const found = nextTest(peerChanges(histories, horizon), asked);
      return found.ok && [found.value.n, found.value.share, found.value.horizonQuarters];
    };
    expect(shareAt(1)).toEqual([62, 0.5, 1]);
    expect(shareAt(2)).toEqual([31, 0, 2]);
  });

  test('end in the last eight quarters', () => {
    const countOf = (quarters: number) => {
      const points = Array.from({ length: quarters }, () => at(2));
      return peerChanges([history(1, points)], 1).own.get(1)!.length;
    };
    expect([countOf(8), countOf(9), countOf(10)]).toEqual([7, 8, 8]);
    const early = [at(1), ...Array.from({ length: 9 }, () => at(3))];
    const others = Array.from({ length: 400 }, (_, k) => history(k + 10, [at(1), at(1 + k / 40)]));
    expect(peerChanges([history(1, early), ...others], 1).own.get(1)).toEqual(Array(8).fill(1));
  });

  test('to earnings of nought or below count as not met; such a ratio is no start', () => {
    const histories = Array.from({ length: 32 }, (_, k) =>
      history(k + 10, [at(2), k < 8 ? GONE : at(2), at(2)]),
    );
    const found = nextTest(peerChanges(histories, 1), asked);
    // 32 first changes, of which 8 to no earnings; 24 second ones.
    expect(found).toMatchObject({ ok: true, value: { n: 56, notMet: 8 } });
  });

  test('skip a quarter without figures', () => {
    expect(peerChanges([history(1, [at(2), null, at(3), at(6)])], 1).own.get(1)).toEqual([2]);
  });
});

test('the figure is that of the peers’ draws, each once', () => {
  const ratio = fc.double({ min: 0.5, max: 8, noNaN: true });
  const bound = fc.constantFrom('most' as const, 'least' as const);
  fc.assert(
    fc.property(
      fc.array(ratio, { minLength: 40, maxLength: 70 }),
      ratio,
      ratio,
      bound,
      (to, own, level, side) => {
        const peers = peerChanges(
          moved(to.length, (k) => to[k]!),
          1,
        );
        const found = nextTest(peers, { borrowerId: 1, bound: side, ratio: own, level });
        const draws = [...peers.own.values()]
          .flatMap((changes) => ownChanges(peers.book, changes))
          .map((change) => [change]);
        const drawn = peerDraws([{ bound: side, ratio: own, level }], draws);
        expect(found).toMatchObject({
          ok: true,
          value: { n: drawn.n, notMet: drawn.notMet, share: drawn.share },
        });
        expect(drawn.n).toBeGreaterThanOrEqual(to.length - 2);
      },
    ),
    { numRuns: 60 },
  );
});

test('a ratio of nought or below has no multiple', () => {
  const peers = peerChanges(
    moved(40, () => 2),
    1,
  );
  for (const ratio of [0, -1])
    expect(nextTest(peers, { ...asked, ratio })).toEqual({
      ok: false,
      error: { kind: 'ratio without meaning' },
    });
});
