import { describe, expect, test } from 'vitest';
import { buildCovenant } from '../covenants/covenant.fixture.ts';
import { buildBook } from './headroomBook.fixture.ts';
import { fdrAfterShortfall, nearLinesOf } from './nearLine.ts';
import { nearLineEvidence } from './nearLineEvidence.ts';
import { posterior } from './nearLineRanking.ts';
import { patternStanding } from './patternStanding.ts';
import { nearLineFacts } from './patternWording.ts';

const standing = patternStanding(
  buildBook({ seed: 3, borrowers: 300, quarters: 20, lifters: 0.35, lifting: 0.9 }),
);
const [published] = standing.nearLine.filter(({ isPublished }) => isPublished);
if (!published) throw new Error('nobody is listed');
const covenantOf = (id: number) => buildCovenant({ id, measure: 'net-leverage' });

describe('what is said of a covenant', () => {
  test('is what the night kept, with prior, window and the gate of its type', () => {
    const [found] = nearLinesOf([covenantOf(published.covenantId)], standing);
    const [type] = standing.types;
    expect(found?.figures).toMatchObject({
      near: published.near,
      passing: published.passing,
      localFdr: published.localFdr,
      isPublished: true,
      priorShare: type!.priorShare,
      window: { band: 0.02, gap: 0.04 },
      gateP: standing.gates[0]!.adjusted,
    });
  });

  test('is nothing below three tests near the line', () => {
    expect(nearLinesOf([covenantOf(999_999)], standing)).toEqual([{ covenantId: 999_999, figures: null }]);
  });

  test('is not said before the first night, and never of the desk’s own triggers', () => {
    expect(nearLinesOf([covenantOf(published.covenantId)], null)).toEqual([]);
    const ours = { ...covenantOf(published.covenantId), isOurs: true };
    expect(nearLinesOf([ours], standing)).toEqual([]);
  });

  test('a type with too few tests near the limit has no p-value of its own', () => {
    const [found] = nearLinesOf([covenantOf(published.covenantId)], { ...standing, gates: [] });
    expect(found?.figures?.gateP).toBeNull();
  });
});

describe('what one more shortfall would do', () => {
  // By hand: without lifting one in three passes; BF = mean of (1 + 2 pi)^4 (1 - pi) over the five shares.
  test('is the local false-discovery rate with one more test on the failing side', () => {
    const shares = [0.2, 0.4, 0.6, 0.8, 0.95];
    const factor = shares.reduce((sum, pi) => sum + (1 + 2 * pi) ** 4 * (1 - pi), 0) / 5;
    const expected = 1 - (0.1 * factor) / (0.9 + 0.1 * factor);
    const found = fdrAfterShortfall({ near: 4, passing: 4, share: 1 / 3, priorShare: 0.1 });
    expect(found).toBeCloseTo(expected, 12);
    const now = nearLineEvidence({ passing: 4, failing: 0 }, { passing: 1, failing: 2 });
    expect(found).toBeGreaterThan(1 - posterior(0.1, now.bayesFactor));
  });
});

test('the facts print the test, the rate with its prior, with whom, the settings and the gate', () => {
  const [{ figures }] = nearLinesOf([covenantOf(published.covenantId)], standing) as [
    ReturnType<typeof nearLinesOf>[0],
  ];
  const facts = new Map(
    nearLineFacts({
      ...figures!,
      pAtLeast: 0.0123,
      localFdr: 0.06,
      priorShare: 0.04,
      gateP: 0.0004,
    }).map(({ label, value }) => [label, value]),
  );
  expect(facts.get('Exact test, given how many ended near')).toBe('p 0.012');
  expect(facts.get('Local false-discovery rate')).toBe('0.060, prior 0.96');
  expect(facts.get('Fitted with')).toBe('75 covenants of the sector');
  expect(facts.get('Near the limit')).toBe(
    'up to 2\u00a0% of the level on the passing side, 4\u00a0% on the failing side',
  );
  expect(facts.get('The book’s own test of this type')).toBe('p below 0.001: on the list');
});

test.each([
  [0.049, true, 'on the list'],
  [0.05, false, 'not on the list'],
  [0.051, false, 'no list is shown'],
])('at a gate of %s', (gateP, isPublished, words) => {
  const [{ figures }] = nearLinesOf([covenantOf(published.covenantId)], standing) as [
    ReturnType<typeof nearLinesOf>[0],
  ];
  const last = nearLineFacts({ ...figures!, gateP, isPublished }).at(-1);
  expect(last?.value.endsWith(words)).toBe(true);
});
