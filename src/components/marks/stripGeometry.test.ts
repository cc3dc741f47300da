import type { StripTest } from '../../contracts/alerts.ts';
import { describe, expect, test } from 'vitest';
import { OUTCOMES, type Outcome } from '../../core/covenants/covenantTest.ts';
import { drawStrip, STRIP_FRAMES } from './stripGeometry.ts';

const aTest = (testDate: string, mayFall: string | null, more: Partial<StripTest> = {}): StripTest => ({
  testDate,
  outcome: 'met',
  mayFall,
  justPassing: false,
  level: '3.50',
  ...more,
});

const quarterEnds = (count: number): string[] =>
  Array.from({ length: count }, (_, quarter) => {
    const year = 2023 + Math.floor(quarter / 4);
    return `${year}-${['03-31', '06-30', '09-30', '12-31'][quarter % 4] ?? ''}`;
  });

const only = (test: StripTest, size: 'row' | 'panel' = 'row') => {
  const [mark] = drawStrip([test], size).marks;
  if (!mark) throw new Error('no mark was drawn');
  return mark;
};

describe('the limit', () => {
  test('is at the same height whatever the tests are', () => {
    const near = drawStrip([aTest('2026-09-30', '0.01')], 'row');
    const far = drawStrip(
      [aTest('2026-09-30', '5'), aTest('2026-06-30', '-0.9', { outcome: 'not met' })],
      'row',
    );
    expect(near.frame.limitY).toBe(STRIP_FRAMES.row.limitY);
    expect(far.frame.limitY).toBe(near.frame.limitY);
  });

  test('leaves room for the whole scale, from +30 % to -15 %, at both sizes', () => {
    for (const { limitY, pixelsPerPoint, newestRing, bedBottom } of Object.values(STRIP_FRAMES)) {
      expect(limitY - 30 * pixelsPerPoint).toBeGreaterThanOrEqual(newestRing);
      expect(limitY + 15 * pixelsPerPoint).toBeLessThanOrEqual(bedBottom);
    }
  });

  test('has the just-passing band of 2 % above it, to scale', () => {
    const { shoalY, frame } = drawStrip([], 'panel');
    expect(frame.limitY - shoalY).toBeCloseTo(2 * frame.pixelsPerPoint, 10);
  });

  test('has the band of the policy that the newest test was judged by', () => {
    const tests = [
      aTest('2026-06-30', '0.1', { band: '0.02' }),
      aTest('2026-09-30', '0.1', { band: '0.035' }),
    ];
    const { shoalY, frame } = drawStrip(tests, 'panel');
    expect(frame.limitY - shoalY).toBeCloseTo(3.5 * frame.pixelsPerPoint, 10);
  });
});

describe('the height of a result', () => {
  test('is what earnings may fall, on one scale', () => {
    expect(only(aTest('2026-09-30', '0.10')).y).toBeCloseTo(34 - 10 * 0.8, 10);
    expect(only(aTest('2026-09-30', '0')).y).toBe(34);
    expect(only(aTest('2026-09-30', '0.10'), 'panel').y).toBeCloseTo(82 - 10 * 2.2, 10);
  });

  test.each([
    ['just below the top', '0.2999', null],
    ['at the top', '0.30', null],
    ['just above the top', '0.3001', 'above'],
    ['far above the top', '4.2', 'above'],
  ])('%s of the scale', (_where, mayFall, cut) => {
    const mark = only(aTest('2026-09-30', mayFall));
    expect(mark.cut).toBe(cut);
    expect(mark.y).toBeGreaterThanOrEqual(34 - 30 * 0.8);
  });

  test.each([
    ['just above the bottom', '-0.1499', null],
    ['at the bottom', '-0.15', null],
    ['just below the bottom', '-0.1501', 'below'],
  ])('%s of the scale', (_where, mayFall, cut) => {
    const mark = only(aTest('2026-09-30', mayFall, { outcome: 'not met' }));
    expect(mark.cut).toBe(cut);
    expect(mark.y).toBeLessThanOrEqual(34 + 15 * 0.8);
  });

  test('is beyond the end of its side where the share has no meaning', () => {
    expect(only(aTest('2026-09-30', null, { outcome: 'met, net cash' })).cut).toBe('above');
    expect(only(aTest('2026-09-30', null, { outcome: 'not met, ratio has no meaning' })).cut).toBe('below');
  });

  test('is on the side of the outcome, also where rounding decides it', () => {
    const roundedUp = only(aTest('2026-09-30', '-0.0001', { outcome: 'met' }));
    expect(roundedUp.y).toBeLessThanOrEqual(34);
    const strict = only(aTest('2026-09-30', '0', { outcome: 'not met' }));
    expect(strict.y - strict.radius).toBeGreaterThan(34);
  });
});

describe('the shape of a result', () => {
  const shapes: Readonly<Record<Outcome, string>> = {
    met: 'ring',
    'met, thin': 'ring',
    'met, net cash': 'ring',
    'met, no charge to cover': 'ring',
    'not met': 'not met',
    'not met, ratio has no meaning': 'not met',
    'not met, waived': 'waived',
    'not met, in cure period': 'not met',
    cured: 'waived',
    'above our trigger': 'past our trigger',
    'below our trigger': 'past our trigger',
    'cannot be tested': 'cross',
    'not tested': 'gap',
    'awaiting figures': 'gap',
  };

  test.each(OUTCOMES)('follows the outcome: %s', (outcome) => {
    expect(only(aTest('2026-09-30', '0.05', { outcome })).shape).toBe(shapes[outcome]);
  });

  test('is filled where the result is just passing, and only then', () => {
    expect(only(aTest('2026-09-30', '0.014', { outcome: 'met, thin', justPassing: true })).shape).toBe(
      'just passing',
    );
    expect(only(aTest('2026-09-30', '0.014', { outcome: 'met, thin' })).shape).toBe('ring');
  });

  test('that cannot be tested stands on the limit, on neither side', () => {
    expect(only(aTest('2026-09-30', '0.2', { outcome: 'cannot be tested' })).y).toBe(34);
  });
});

describe('the order', () => {
  test('is by date, whatever order the tests come in, and the newest is larger and at the right', () => {
    const dates = quarterEnds(3);
    const { marks } = drawStrip(
      [2, 0, 1].map((at) => aTest(dates[at] ?? '', '0.1')),
      'row',
    );
    expect(marks.map((mark) => mark.test.testDate)).toEqual(dates);
    expect(marks.map((mark) => mark.newest)).toEqual([false, false, true]);
    expect(marks[2]?.radius).toBeGreaterThan(marks[1]?.radius ?? Infinity);
    expect(marks[2]?.x).toBeCloseTo(150 - 150 / 24, 10);
  });

  test('keeps the last twelve of thirteen', () => {
    const { marks } = drawStrip(
      quarterEnds(13).map((date) => aTest(date, '0.1')),
      'row',
    );
    expect(marks).toHaveLength(12);
    expect(marks[0]?.test.testDate).toBe('2023-06-30');
    expect(marks[0]?.x).toBeCloseTo(150 / 24, 10);
  });

  test('keeps the place of a test that was not made, so that the others do not move', () => {
    const dates = quarterEnds(4);
    const tests = dates.map((date, at) =>
      aTest(date, '0.1', at === 1 ? { outcome: 'not tested', mayFall: null } : {}),
    );
    const all = drawStrip(
      dates.map((date) => aTest(date, '0.1')),
      'row',
    ).marks.map((mark) => mark.x);
    expect(drawStrip(tests, 'row').marks.map((mark) => mark.x)).toEqual(all);
  });
});

describe('a step in the level', () => {
  test('stands between the two tests that it parts', () => {
    const [first = '', second = '', third = ''] = quarterEnds(3);
    const { steps, marks } = drawStrip(
      [aTest(first, '0.1', { level: '3.75' }), aTest(second, '0.1'), aTest(third, '0.1', { level: '3.5' })],
      'row',
    );
    expect(steps).toHaveLength(1);
    expect(steps[0]?.x).toBeCloseTo(((marks[0]?.x ?? 0) + (marks[1]?.x ?? 0)) / 2, 10);
  });

  test('is none where a level was not in force before', () => {
    const [first = '', second = ''] = quarterEnds(2);
    expect(
      drawStrip([aTest(first, null, { level: null, outcome: 'not tested' }), aTest(second, '0.1')], 'row')
        .steps,
    ).toEqual([]);
  });
});
