import { describe, expect, test } from 'vitest';
import { chartRange, chartText, dayOf, levelSegments, type LimitChartFigures } from './limitChartFigures.ts';

const FIGURES: LimitChartFigures = {
  label: 'Net leverage',
  unit: 'times',
  maximum: true,
  results: [
    { testDate: '2026-03-31', tested: '3.2', outcome: 'met', justPassing: false },
    { testDate: '2026-06-30', tested: '3.62', outcome: 'not met', justPassing: false },
    { testDate: '2026-09-30', tested: '3.45', outcome: 'met, thin', justPassing: true },
  ],
  levels: [
    { from: '2025-01-01', until: '2026-12-30', level: '3.5' },
    { from: '2026-12-31', until: null, level: '3.25' },
  ],
  second: { name: 'without add-backs', values: [{ testDate: '2026-09-30', tested: '3.71' }] },
};

describe('levels', () => {
  test('begin at the first test, and the coming one says from when', () => {
    const [inForce, coming] = levelSegments(FIGURES);
    expect(inForce?.start).toEqual({ x: dayOf('2026-03-31'), y: 3.5 });
    expect(inForce?.text).toBe('at most 3.50x');
    expect(coming?.start).toEqual({ x: dayOf('2026-12-31'), y: 3.25 });
    expect(coming?.text).toBe('3.25x from 31 Dec 2026');
  });

  test('meet at the day of the step, so that the line steps and does not slope', () => {
    const [inForce, coming] = levelSegments(FIGURES);
    expect(inForce?.end.x).toBe(coming?.start.x);
  });

  test('leave a holiday open', () => {
    const segments = levelSegments({
      ...FIGURES,
      levels: [
        { from: '2025-01-01', until: '2026-04-30', level: '3.5' },
        { from: '2026-05-01', until: '2026-07-31', level: null },
        { from: '2026-08-01', until: null, level: '3.5' },
      ],
    });
    expect(segments).toHaveLength(2);
    expect(segments[0]?.end.x).toBe(dayOf('2026-05-01'));
    expect(segments[1]?.start.x).toBe(dayOf('2026-08-01'));
  });

  test('of a minimum read "at least"', () => {
    const [segment] = levelSegments({
      ...FIGURES,
      unit: 'money',
      maximum: false,
      levels: [{ from: '2025-01-01', until: null, level: '4000000' }],
    });
    expect(segment?.text).toBe('at least 4.0m');
  });
});

test('the range holds every result, level and second line, with air', () => {
  const range = chartRange(FIGURES);
  expect(range.low).toBeLessThan(3.2);
  expect(range.high).toBeGreaterThan(3.71);
  expect(range.first).toBe(dayOf('2026-03-31'));
  expect(range.last).toBeGreaterThan(dayOf('2026-12-31'));
});

describe('in words', () => {
  test('the chart says the latest result, its limit, how many were not met or just passing, and the second line', () => {
    expect(chartText(FIGURES)).toBe(
      'Net leverage over 3 tests. Latest 3.45x on 30 Sep 2026, at most 3.50x: met, thin. 1 not met, 1 just passing. 3.71x without add-backs.',
    );
  });

  test('a chart without a result says so', () => {
    expect(chartText({ ...FIGURES, results: [] })).toBe('Net leverage: no test result yet.');
  });
});
