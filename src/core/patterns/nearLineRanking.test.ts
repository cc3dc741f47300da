import { expect, test } from 'vitest';
import { buildBook } from './headroomBook.fixture.ts';
import { groupedBy } from './groupedBy.ts';
import { rankNearLine, type HeadroomSeries } from './nearLineRanking.ts';

const seriesOf = (seed: number, lifters: number, borrowers = 150): readonly HeadroomSeries<number>[] =>
  [
    ...groupedBy(
      buildBook({ seed, borrowers, quarters: 20, lifters, lifting: 0.9 }),
      ({ borrowerId }) => borrowerId,
    ),
  ].map(([id, rows]) => ({
    id,
    sector: rows[0]!.sector,
    headrooms: rows.map(({ headroom }) => headroom!),
  }));

test('lists the lowest rates whose mean is at most 10 %, and no more', () => {
  const { series } = rankNearLine(seriesOf(1, 0.3));
  const enough = series.filter(({ hasEnoughNear }) => hasEnoughNear);
  const listed = enough.filter((each) => each.listed).sort((a, b) => a.localFdr - b.localFdr);
  const others = enough.filter((each) => !each.listed).sort((a, b) => a.localFdr - b.localFdr);
  expect(listed.length).toBeGreaterThan(3);
  const mean = (rates: readonly number[]) => rates.reduce((sum, rate) => sum + rate, 0) / rates.length;
  const rates = listed.map(({ localFdr }) => localFdr);
  expect(mean(rates)).toBeLessThanOrEqual(0.1);
  expect(mean([...rates, others[0]!.localFdr])).toBeGreaterThan(0.1);
  expect(rates.at(-1)!).toBeLessThanOrEqual(others[0]!.localFdr);
});

test('lists those who lift far more often than those who do not', () => {
  const ranked = [1, 2, 3].flatMap((seed) =>
    rankNearLine(seriesOf(seed, 0.3)).series.filter(({ listed }) => listed),
  );
  const lifting = ranked.filter(({ id }) => id < 0.3 * 150).length;
  expect(lifting / ranked.length).toBeGreaterThan(0.8);
});

test('takes hardly anything for lifting in a book without', () => {
  expect(rankNearLine(seriesOf(4, 0)).priorShare).toBeLessThan(0.12);
  expect(rankNearLine(seriesOf(4, 0.3)).priorShare).toBeGreaterThan(0.15);
});

test('lists nobody with fewer than three tests near the line, whatever the book', () => {
  const two = Array.from({ length: 40 }, (_, id) => ({
    id,
    sector: 'glass',
    headrooms: [0.01, 0.005, ...Array.from({ length: 10 }, (_, k) => 0.1 + k / 50)],
  }));
  const three = two.map((each) => ({ ...each, headrooms: [...each.headrooms, 0.012] }));
  const [few, enough] = [two, three].map((book) => rankNearLine(book).series);
  expect(few!.some(({ hasEnoughNear, listed }) => hasEnoughNear || listed)).toBe(false);
  expect(enough!.every(({ hasEnoughNear }) => hasEnoughNear)).toBe(true);
  expect(new Set(enough!.map(({ listed }) => listed)).size).toBe(1);
});

test('leans on the whole book below twenty series of a sector', () => {
  const peersWith = (count: number) => {
    const book = seriesOf(5, 0, 60).map((each, k) => ({ ...each, sector: k < count ? 'glass' : 'paper' }));
    return rankNearLine(book).series[0]!.peers;
  };
  expect([peersWith(19), peersWith(20), peersWith(21)]).toEqual(['book', 'sector', 'sector']);
});

test('does not mind in which order the series come', () => {
  const series = seriesOf(6, 0.2);
  const forward = new Map(rankNearLine(series).series.map((each) => [each.id, each]));
  for (const each of rankNearLine([...series].reverse()).series) {
    expect(each.localFdr).toBeCloseTo(forward.get(each.id)!.localFdr, 9);
    expect(each.listed).toBe(forward.get(each.id)!.listed);
  }
});

test('leaves out a series without any headroom', () => {
  const [first, ...others] = seriesOf(7, 0, 30);
  const { series, n } = rankNearLine([{ ...first!, headrooms: [] }, ...others]);
  expect([n, series.some(({ id }) => id === first!.id)]).toEqual([29, false]);
  expect(rankNearLine([])).toMatchObject({ n: 0, series: [] });
});
