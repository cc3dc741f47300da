import { describe, expect, test } from 'vitest';
import { addMonthsToMonthEnd, type PlainDate } from '../calendar/plainDate.ts';
import { buildCovenant, buildYear } from '../covenants/covenant.fixture.ts';
import { fdrAfterShortfall, type NearLineFigures } from '../patterns/nearLine.ts';
import { formatProbability } from '../patterns/patternWording.ts';
import { justPassingRepeated } from './justPassingRepeated.ts';
import { pattern } from './pattern.ts';
import { buildContext, buildInputs } from './rule.fixture.ts';
import type { AlertContext } from './rule.ts';

const on: PlainDate = '2025-12-31';
const FIGURES: NearLineFigures = {
  near: 7,
  passing: 6,
  expectedPassing: 2.31,
  share: 0.33,
  pAtLeast: 0.0064,
  localFdr: 0.071,
  peers: 'sector',
  peerCount: 31,
  isPublished: true,
  latestNear: '2025-09-30',
  priorShare: 0.05,
  window: { band: 0.02, gap: 0.04 },
  gateP: 0.004,
};
/** Net leverage of 3.50x at most, met with 3.45x. */
const context = (figures: NearLineFigures | null): AlertContext => ({
  ...buildContext(
    buildInputs({
      covenants: [buildCovenant({ firstTestOn: on })],
      statements: buildYear(on, { ebitda: 12, debt: 41.4, cash: 0 }),
    }),
    '2026-03-15',
  ),
  nearLine: [{ covenantId: 1, figures }],
});

describe('a pattern', () => {
  test('is raised soon for a covenant on the published list, with the figures', () => {
    expect(pattern(context(FIGURES))).toMatchObject([
      {
        kind: 'pattern',
        covenantId: 1,
        severity: 'soon',
        factDate: '2025-09-30',
        sentence:
          'Net leverage: 6 of 7 tests that ended near the limit are on the passing side; about 2.3 would be expected.',
      },
    ]);
  });

  test('is not raised where the list is not published, however low the rate', () => {
    expect(pattern(context({ ...FIGURES, isPublished: false, localFdr: 0.001 }))).toEqual([]);
    expect(pattern(context(null))).toEqual([]);
    expect(pattern({ ...context(FIGURES), nearLine: [] })).toEqual([]);
  });

  test('says what would change it, as a number', () => {
    const [finding] = pattern(context(FIGURES));
    const after = formatProbability(fdrAfterShortfall(FIGURES));
    expect(finding?.wouldChange).toContain(`from 0.071 to ${after}.`);
    expect(fdrAfterShortfall(FIGURES)).toBeGreaterThan(FIGURES.localFdr);
  });

  test('says nothing stronger, and nothing of why', () => {
    const said = JSON.stringify([...pattern(context(FIGURES)), ...repeated(FIGURES)]);
    expect(said).not.toMatch(/manipulat|manag|lift|fraud|misconduct|intent|deliberate|suspicio|breach/i);
  });
});

const repeated = (figures: NearLineFigures | null) => {
  const dates = [0, 1, 2].map((back) => addMonthsToMonthEnd(on, -3 * back));
  const observed = { covenantId: 1, inBand: 3, ofLast: 6, run: 3, testDates: dates };
  return justPassingRepeated({ ...context(figures), patterns: [observed] });
};
const labels = (figures: NearLineFigures | null) => repeated(figures)[0]?.evidence.map(({ label }) => label);

describe('the observation of tests just passing', () => {
  test('carries the evidence where it is published', () => {
    expect(labels(FIGURES)).toContain('Pattern');
    expect(labels(FIGURES)).toContain('Local false-discovery rate');
  });

  test('stays an observation where it is not', () => {
    for (const figures of [null, { ...FIGURES, isPublished: false }]) {
      expect(labels(figures)).not.toContain('Pattern');
      expect(labels(figures)).toContain('Just passing');
    }
  });
});
