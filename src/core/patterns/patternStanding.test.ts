import { describe, expect, test } from 'vitest';
import { buildBook, buildRow } from './headroomBook.fixture.ts';
import { patternLists } from './patternLists.ts';
import { patternStanding } from './patternStanding.ts';

const lifted = buildBook({ seed: 3, borrowers: 300, quarters: 20, lifters: 0.35, lifting: 0.9 });
const standing = patternStanding(lifted);
const { rankings, published } = patternLists(lifted);
const [{ ranking }] = rankings as [(typeof rankings)[0]];

describe('what is kept for every covenant', () => {
  test('only of those with three tests near the line or more: of the others nothing can be said', () => {
    expect(standing.nearLine.map(({ covenantId }) => covenantId)).toEqual(
      ranking.series.filter(({ near }) => near >= 3).map(({ id }) => id.covenantId),
    );
    expect(standing.nearLine.length).toBeLessThan(ranking.n);
  });

  test('counts as they are, figures to six digits', () => {
    for (const kept of standing.nearLine) {
      const full = ranking.series.find(({ id }) => id.covenantId === kept.covenantId)!;
      expect(kept).toMatchObject({ near: full.near, passing: full.passing, peerCount: 75, peers: 'sector' });
      for (const figure of ['expectedPassing', 'share', 'pAtLeast', 'localFdr'] as const)
        expect(Math.abs(kept[figure] / full[figure] - 1)).toBeLessThan(1e-5);
    }
  });

  test('published are those that the gate lets through', () => {
    expect(standing.nearLine.filter(({ isPublished }) => isPublished).length).toBeGreaterThan(5);
    expect(
      standing.nearLine.filter(({ isPublished }) => isPublished).map(({ covenantId }) => covenantId),
    ).toEqual(published[0]!.series.map(({ covenantId }) => covenantId));
  });

  test('the latest of them, by day, within the window and not removed', () => {
    const on = (testDate: `${number}-09-30`, headroom: number) =>
      buildRow({ testDate, headroom, covenantId: 5 });
    const rows = [on('2021-09-30', 0), on('2022-09-30', -0.04), on('2023-09-30', 0.0199)];
    const later = [
      on('2024-09-30', 0.02),
      on('2025-09-30', -0.0401),
      { ...on('2026-09-30', 0.01), removal: 'waived' as const },
    ];
    expect(patternStanding([...rows, ...later]).nearLine).toMatchObject([
      { covenantId: 5, near: 3, latestNear: '2023-09-30' },
    ]);
  });
});

test('what is kept is plain JSON', () => {
  expect(JSON.parse(JSON.stringify(standing))).toEqual(standing);
});

test('a covenant takes less than 350 bytes: ten thousand borrowers of three covenants ten megabytes at most', () => {
  for (const each of standing.nearLine) expect(JSON.stringify(each).length).toBeLessThan(350);
});
