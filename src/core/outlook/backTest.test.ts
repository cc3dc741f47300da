import { describe, expect, test } from 'vitest';
import { addMonthsToMonthEnd } from '../calendar/plainDate.ts';
import { linearPercentile } from '../statistics/percentile.ts';
import { brierScore, projectionRecord } from './backTest.ts';
import { bookOfRatios } from './outlookBook.fixture.ts';
import { HORIZONS } from './ratioGrid.ts';
import type { RatioAt, RatioSeries } from './ratioSeries.ts';

const isNotMet = ({ bound }: RatioSeries, { ratio, hasEarnings, level }: RatioAt): boolean =>
  !hasEarnings || (bound === 'most' ? ratio > level! : ratio < level!);

type Change = number | 'gone';

/** Every change of a series that had ended by a quarter, in its last eight. */
const changesUpTo = (series: RatioSeries, place: number, h: number): Change[] => {
  const found: Change[] = [];
  for (let end = Math.max(h, place - 7); end <= place; end += 1) {
    const [before, after] = [series.points[end - h]!, series.points[end]!];
    if (!before.hasEarnings) continue;
    found.push(after.hasEarnings ? after.ratio / before.ratio : 'gone');
  }
  return found;
};

const isNumber = (change: Change): change is number => change !== 'gone';

/** The outer hundredths out of the whole group, itself included, then itself left out. */
function drawsOf(group: readonly RatioSeries[], self: RatioSeries, place: number, h: number) {
  const numbers = group
    .flatMap((one) => changesUpTo(one, place, h))
    .filter(isNumber)
    .sort((a, b) => a - b);
  if (numbers.length === 0) return { draws: [] as Change[], borrowers: 0 };
  const [low, high] = [linearPercentile(numbers, 0.01), linearPercentile(numbers, 0.99)];
  const others = group.filter((one) => one !== self);
  return {
    draws: others
      .flatMap((one) => changesUpTo(one, place, h))
      .filter((change) => change === 'gone' || (change >= low && change <= high)),
    borrowers: others.filter((one) => changesUpTo(one, place, h).length > 0).length,
  };
}

/** The same sector and third of its leverage at that quarter end. */
function thirdOf(all: readonly RatioSeries[], self: RatioSeries, place: number): readonly RatioSeries[] {
  const leverageOf = (one: RatioSeries) => one.points[place]!.leverage!;
  const sector = all.filter((one) => one.sector === self.sector);
  const sorted = sector.map(leverageOf).sort((a, b) => a - b);
  const lines = [linearPercentile(sorted, 1 / 3), linearPercentile(sorted, 2 / 3)];
  const third = (one: RatioSeries) => lines.filter((line) => leverageOf(one) > line).length;
  return sector.filter((one) => third(one) === third(self));
}

/** Nothing shared with the product but the percentile: each projection by going over every change. */
function byBruteForce(book: readonly RatioSeries[], quarters: number, h: number) {
  const said: { share: number; cameNotMet: boolean; wasMet: boolean }[] = [];
  let tooFew = 0;
  for (const self of book) {
    const all = book.filter(({ measure }) => measure === self.measure);
    for (let place = h; place + h < quarters; place += 1) {
      const [now, then] = [self.points[place]!, self.points[place + h]!];
      if (!now.hasEarnings) continue;
      const near = drawsOf(thirdOf(all, self, place), self, place, h);
      const isNear = near.draws.length >= 30 && near.borrowers >= 5;
      const { draws, borrowers } = isNear ? near : drawsOf(all, self, place, h);
      if (draws.length < 30 || borrowers < 5) {
        tooFew += 1;
        continue;
      }
      const notMet = draws.filter(
        (change) =>
          change === 'gone' || isNotMet(self, { ...now, ratio: now.ratio * change, level: then.level }),
      );
      said.push({
        share: notMet.length / draws.length,
        cameNotMet: isNotMet(self, then),
        wasMet: !isNotMet(self, now),
      });
    }
  }
  return { said, tooFew };
}

const WORDS = [
  ['unlikely', (share: number) => share < 0.1],
  ['possible', (share: number) => share >= 0.1 && share < 0.33],
  ['open', (share: number) => share >= 0.33 && share <= 0.66],
  ['likely', (share: number) => share > 0.66],
] as const;

describe('looking back at what was said', () => {
  test.each([
    { borrowers: 14, quarters: 11, sectors: 2 },
    // Thirds of five borrowers have four others: the whole book stands in.
    { borrowers: 15, quarters: 9, sectors: 1 },
    // Thirds of six and more are peers by themselves.
    { borrowers: 40, quarters: 9, sectors: 1 },
  ])('agrees with going over every change of a small book: %o', (shape) => {
    const book = bookOfRatios({ ...shape, swing: 0.35 });
    const record = projectionRecord(book);
    for (const h of HORIZONS) {
      const { said, tooFew } = byBruteForce(book, shape.quarters, h);
      const horizon = record.horizons.find(({ quarters }) => quarters === h)!;
      expect([horizon.said, horizon.tooFewPeers]).toEqual([said.length, tooFew]);
      expect(horizon.notMet).toBe(said.filter(({ cameNotMet }) => cameNotMet).length);
      if (said.length === 0) continue;
      const squares = said.map(({ share, cameNotMet }) => (share - Number(cameNotMet)) ** 2);
      expect(horizon.brier).toBeCloseTo(squares.reduce((sum, one) => sum + one, 0) / said.length, 12);
      for (const [word, holds] of WORDS) {
        const own = said.filter(({ share }) => holds(share));
        const afterMet = own.filter(({ wasMet }) => wasMet);
        expect(horizon.words.find((one) => one.word === word)).toMatchObject({
          said: own.length,
          notMet: own.filter(({ cameNotMet }) => cameNotMet).length,
          afterMet: {
            said: afterMet.length,
            notMet: afterMet.filter(({ cameNotMet }) => cameNotMet).length,
          },
        });
      }
    }
    expect(record.horizons[0]!.said).toBeGreaterThan(100);
  });

  test('what comes later changes nothing of what was said before', () => {
    const book = bookOfRatios({ borrowers: 20, quarters: 8 });
    const last = (one: RatioSeries): RatioSeries => ({
      ...one,
      points: one.points.map((point, place) =>
        place === 7 ? { ...point, ratio: point.ratio * 3, leverage: 99 } : point,
      ),
    });
    const horizonOf = (series: RatioSeries[]) => projectionRecord(series).horizons[0]!;
    const [before, after] = [horizonOf(book), horizonOf(book.map(last))];
    expect(after.words.map(({ said, meanSaid }) => [said, meanSaid])).toEqual(
      before.words.map(({ said, meanSaid }) => [said, meanSaid]),
    );
    expect(after.notMet).not.toBe(before.notMet);
  });

  test('nothing is said from a quarter end without thirty changes before it', () => {
    // Each quarter brings one change of every other borrower: 30 others have 30 by the second quarter end.
    const saidOf = (borrowers: number) => {
      const book = bookOfRatios({ borrowers, quarters: 3, swing: 0 }).filter(
        ({ measure }) => measure === 'net-leverage',
      );
      const still = book.map((one) => ({
        ...one,
        points: one.points.map((point) => ({ ...point, ratio: 2, leverage: 2, hasEarnings: true })),
      }));
      const { said, tooFewPeers } = projectionRecord(still).horizons[0]!;
      return [said, tooFewPeers];
    };
    expect(saidOf(30)).toEqual([0, 30]);
    expect(saidOf(31)).toEqual([31, 0]);
    expect(saidOf(32)).toEqual([32, 0]);
  });

  test('an empty book says nothing', () => {
    const { from, horizons } = projectionRecord([]);
    expect(from).toBeNull();
    expect(horizons.map(({ said, brier }) => [said, brier])).toEqual(Array(4).fill([0, null]));
  });

  test('says from when to when it speaks', () => {
    const { from, until } = projectionRecord(bookOfRatios({ borrowers: 60, quarters: 10 }));
    expect([from, until]).toEqual([addMonthsToMonthEnd('2026-09-30', -24), '2026-06-30']);
  });
});

test('the Brier score is the mean squared distance from what came', () => {
  const said = (share: number, cameNotMet: boolean) => ({ share, cameNotMet, wasMet: true });
  expect(brierScore([])).toBeNull();
  // (0.01 + 0.04 + 1) / 3 by hand.
  expect(brierScore([said(0.9, true), said(0.2, false), said(0, true)])).toBeCloseTo(0.35, 12);
});
