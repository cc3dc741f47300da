import { describe, expect, test } from 'vitest';
import { BOOK_PATTERN_SETTINGS, bookPattern, type BookPattern } from './bookPattern.ts';
import { buildBook, buildEvenBook, buildRow } from './headroomBook.fixture.ts';
import type { HeadroomRow } from './headroomRow.ts';

const SETTINGS = { ...BOOK_PATTERN_SETTINGS, draws: 60, seed: 1 };

function patternOf(rows: readonly HeadroomRow[], given: Partial<typeof SETTINGS> = {}): BookPattern {
  const found = bookPattern(rows, { ...SETTINGS, ...given });
  if (!found.ok) throw new Error(`${found.error.kind}: ${found.error.given}`);
  return found.value;
}

const nearRows = (count: number) => Array.from({ length: count }, () => buildRow({ headroom: -0.1 }));

describe('refusal', () => {
  test('below 100 tests within 10 % of the limit', () => {
    const far = buildRow({ headroom: 0.1 });
    expect(bookPattern([...nearRows(99), far], SETTINGS)).toEqual({
      ok: false,
      error: { kind: 'too few tests near the limit', needed: 100, given: 99 },
    });
    expect(bookPattern([...nearRows(100), far], SETTINGS).ok).toBe(true);
    expect(bookPattern([...nearRows(101), far], SETTINGS).ok).toBe(true);
  });

  test('does not count removed tests as near', () => {
    const rows = nearRows(100).map((row, k) => (k === 0 ? { ...row, removal: 'waived' as const } : row));
    expect(bookPattern(rows, SETTINGS)).toMatchObject({ ok: false, error: { given: 99 } });
  });
});

describe('what is counted', () => {
  const rows: HeadroomRow[] = [
    ...buildEvenBook(600),
    buildRow({ headroom: null }),
    buildRow({ headroom: null }),
    ...(['waived', 'waived', 'reset', 'cured', 'first test'] as const).map((removal) =>
      buildRow({ headroom: 0.01, removal }),
    ),
  ];

  test('tests without meaning count among all and lie outside every window; removed ones are told apart', () => {
    const pattern = patternOf(rows);
    expect(pattern).toMatchObject({
      n: 602,
      withoutHeadroom: 2,
      nearLimit: 200,
      removed: { waived: 2, reset: 1, cured: 1, 'first test': 1 },
    });
    // 600 evenly over 60 % of the level: 20 to each 2 %.
    expect(pattern.headline.bins).toEqual({ farLeft: 20, left: 20, right: 20, farRight: 20 });
    expect(pattern.headline.n).toBe(602);
  });

  test('an even book shows nothing at any width or placebo point', () => {
    const { headline, otherWidths, placebos, isScaleDependent } = patternOf(rows);
    for (const sides of [headline, ...otherWidths, ...placebos]) {
      expect(Math.abs(sides.right.zMultinomial!)).toBeLessThan(0.5);
      expect(sides.contrast.difference).toBeCloseTo(0, 12);
    }
    expect([headline.width, ...otherWidths.map(({ width }) => width)]).toEqual([0.02, 0.01, 0.03]);
    expect(placebos.map(({ cutoff }) => cutoff)).toEqual([0.06, 0.1, 0.14, 0.2]);
    expect(isScaleDependent).toBe(false);
  });
});

describe('a book in which a third lift their shortfalls', () => {
  const lifted = buildBook({ seed: 3, borrowers: 300, quarters: 20, lifters: 0.35, lifting: 0.9 });
  const pattern = patternOf(lifted);

  test('has too many just inside the limit, too few just outside, and nothing at the placebo points', () => {
    expect(pattern.headline.pRight).toBeLessThan(0.001);
    expect(pattern.headline.left.zMultinomial).toBeLessThan(-2);
    expect(pattern.headline.contrast.pValue).toBeLessThan(0.001);
    for (const placebo of pattern.placebos) expect(placebo.pRight).toBeGreaterThan(0.01);
  });

  test('is confirmed by the density at half the bandwidth and by the second scale', () => {
    const { defaultBandwidth, halfBandwidth } = pattern.densityBreak;
    if (!defaultBandwidth.ok || !halfBandwidth.ok) throw new Error('no density');
    expect(halfBandwidth.value.bandwidth).toBeCloseTo(defaultBandwidth.value.bandwidth / 2, 12);
    expect(halfBandwidth.value.binWidth).toBe(defaultBandwidth.value.binWidth);
    expect(halfBandwidth.value.pAtLeast).toBeLessThan(0.001);
    expect(pattern.secondScale.pRight).toBeLessThan(0.001);
    expect(pattern.isScaleDependent).toBe(false);
  });

  test('has an excess whose interval over borrowers is above nought, repeated by the seed', () => {
    const { bins } = pattern.headline;
    if (!pattern.excess.ok) throw new Error('no interval');
    expect(pattern.excess.value.estimate).toBe(bins.right - (bins.left + bins.farRight) / 2);
    expect(pattern.excess.value.low).toBeGreaterThan(0);
    expect(pattern.excess.value.n).toBe(300);
    expect(patternOf(lifted).excess).toEqual(pattern.excess);
    expect(patternOf(lifted, { seed: 2 }).excess).not.toEqual(pattern.excess);
  });
});

test('low power is said below 1,000 tests', () => {
  const at = (count: number) => patternOf(buildEvenBook(count)).hasLowPower;
  expect([at(999), at(1_000), at(1_001)]).toEqual([true, false, false]);
});

test('flags what shows on one scale only', () => {
  // Levels differ tenfold: what is just inside on the share scale is spread or crowded on the other.
  const rows = buildEvenBook(800).map((row, k) => {
    const level = row.headroom! >= 0 && row.headroom! < 0.02 ? 0.35 : k % 2 ? 3.5 : 3.4;
    return { ...row, distance: row.headroom! * level, tested: level * (1 - row.headroom!) };
  });
  const crowd = Array.from({ length: 40 }, (_, k) => ({
    ...buildRow({ headroom: 0.025 + k / 1e4 }),
    borrowerId: 900 + k,
    distance: 0.004,
    tested: 0.1,
  }));
  const pattern = patternOf([...rows, ...crowd]);
  expect(pattern.headline.pRight).toBeGreaterThan(0.05);
  expect(pattern.secondScale.pRight).toBeLessThan(0.05);
  expect(pattern.isScaleDependent).toBe(true);
});

test('counts ratios on the agreements’ own step by Frandsen’s test, where an agreement rounds', () => {
  const onStep = (steps: number, count: number, ratioStep: number | null) =>
    Array.from({ length: count }, (_, k) =>
      buildRow({
        borrowerId: k,
        headroom: (steps * 0.01) / 3.5,
        distance: steps * 0.01,
        tested: 3.5 - steps * 0.01,
        ratioStep,
      }),
    );
  const rowsAt = (ratioStep: number | null) => [
    ...onStep(-1, 40, ratioStep),
    ...onStep(0, 90, ratioStep),
    ...onStep(1, 45, ratioStep),
  ];
  expect(patternOf(rowsAt(null)).discrete).toBeNull();
  const { discrete } = patternOf([...rowsAt(0.01), ...onStep(0, 30, null)]);
  expect(discrete).toMatchObject({ n: 175, counts: { previous: 40, at: 90, next: 45 }, rounded: 175 });
  expect(discrete!.pAtLeast).toBeLessThan(0.001);
});

test('says of how many borrowers and of which days it speaks, and counts them at every width', () => {
  const rows = buildEvenBook(600).map((row, k) => ({
    ...row,
    testDate: k % 2 ? ('2024-12-31' as const) : ('2026-09-30' as const),
  }));
  const pattern = patternOf(rows);
  expect(pattern).toMatchObject({ borrowers: 150, from: '2024-12-31', until: '2026-09-30' });
  expect(pattern.histograms.map(({ width, from, counts }) => [width, from, counts.length])).toEqual([
    [0.02, -0.3, 45],
    [0.01, -0.3, 90],
    [0.03, -0.3, 30],
  ]);
  for (const { counts, below, above } of pattern.histograms)
    expect(counts.reduce((sum, count) => sum + count, below + above)).toBe(600);
  const { bins } = pattern.headline;
  expect(pattern.histograms[0]!.counts.slice(13, 17)).toEqual([
    bins.farLeft,
    bins.left,
    bins.right,
    bins.farRight,
  ]);
});

describe('parts of the book', () => {
  const rows = [
    ...buildEvenBook(600, { sector: 'paper', measure: 'interest-cover' }),
    ...buildEvenBook(240, { sector: 'glass' }),
  ];

  test('are by name, each refused by itself where it is too small', () => {
    const { bySector, byMeasure } = patternOf(rows);
    expect(bySector.map(({ name, sides }) => [name, sides.ok])).toEqual([
      ['glass', false],
      ['paper', true],
    ]);
    expect(bySector[0]!.sides).toMatchObject({ ok: false, error: { given: 80 } });
    expect(byMeasure.map(({ name }) => name)).toEqual(['interest-cover', 'net-leverage']);
  });

  test('by run: 0, 1 to 3, 4 to 7, 8 or more', () => {
    const runs = [0, 1, 3, 4, 7, 8, 30];
    const { byRun } = patternOf(buildEvenBook(840).map((row, k) => ({ ...row, metBefore: runs[k % 7]! })));
    expect(byRun.parts.map(({ name }) => name)).toEqual(['0', '1 to 3', '4 to 7', '8 or more']);
    // 840 over 60 %: 280 near the limit, of which one run in seven or two.
    expect(byRun.parts.map(({ sides }) => (sides.ok ? sides.value.n : sides.error.given))).toEqual([
      40, 80, 80, 80,
    ]);
  });

  const atLimit = (metBefore: number, left: number, right: number) => [
    ...Array.from({ length: left }, () => buildRow({ headroom: -0.01, metBefore })),
    ...Array.from({ length: right }, () => buildRow({ headroom: 0.01, metBefore })),
  ];

  test('the trend over runs needs ten tests at the limit in every group', () => {
    const trendWith = (last: number) =>
      patternOf([
        ...buildEvenBook(400, { headroom: 0.05 }),
        ...atLimit(0, 8, 4),
        ...atLimit(2, 7, 5),
        ...atLimit(5, 5, 8),
        ...atLimit(9, 2, last),
      ]).byRun.trend;
    // The even part has run 0 and lies outside the two bins.
    expect(trendWith(7)).toEqual({ ok: false, error: { kind: 'too-few-points', needed: 10, given: 9 } });
    expect(trendWith(8)).toMatchObject({ ok: true, value: { n: 12 + 12 + 13 + 10 } });
    const rising = trendWith(12);
    expect(rising.ok && rising.value.pValue).toBeLessThan(0.02);
  });
});
