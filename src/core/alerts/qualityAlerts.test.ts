import { describe, expect, test } from 'vitest';
import type { PlainDate } from '../calendar/plainDate.ts';
import type { PreviousAssessment } from '../borrowerInputs.ts';
import { bandOf, headlineOf } from '../quality/headline.ts';
import { qualityFell } from './qualityFell.ts';
import { qualityWeak } from './qualityWeak.ts';
import { buildContext, buildInputs, buildQuality, buildQuarterScore } from './rule.fixture.ts';

const quarterEnds: readonly PlainDate[] = ['2025-12-31', '2026-03-31', '2026-06-30', '2026-09-30'];

function context(scores: readonly number[], previous: PreviousAssessment | null = null) {
  const history = scores.map((score, k) => buildQuarterScore(quarterEnds[k]!, score));
  const headline = headlineOf(scores).headline!;
  const quality = buildQuality({
    headline,
    band: bandOf(headline),
    latest: history.at(-1)!,
    history,
    explanations: ['Receivable days rose from 61 to 72.'],
  });
  return buildContext(buildInputs({ covenants: [], previous }), '2026-11-30', quality);
}

describe('reporting quality fell', () => {
  // Headlines are means of three: 70, 70, 70 is 70; with 40 after it 60, a fall of exactly 10 into a lower band.
  test('is raised at ten points into a lower band', () => {
    expect(qualityFell(context([70, 70, 70, 40]))).toMatchObject([
      {
        severity: 'soon',
        factDate: '2026-09-30',
        sentence:
          'Reporting quality 70 to 60: well supported to broadly supported. Receivable days rose from 61 to 72.',
        wouldChange: 'A headline of 65 or more instead of 60.',
      },
    ]);
  });

  test('is not raised under ten points, nor within a band', () => {
    expect(qualityFell(context([70, 70, 70, 40.1]))).toEqual([]);
    expect(qualityFell(context([95, 95, 95, 65]))).toEqual([]);
  });

  test('takes the earlier quarter end as the last assessment stated it', () => {
    const stated = (headline: number, quarterEnd: PlainDate) => ({
      quality: { quarterEnd, headline, band: 'well supported' },
    });
    expect(qualityFell(context([66, 66, 66, 60], stated(75, '2026-06-30')))).toHaveLength(1);
    expect(qualityFell(context([66, 66, 66, 60], stated(75, '2026-09-30')))).toEqual([]);
  });

  test('needs an earlier quarter end', () => {
    expect(qualityFell(context([20]))).toEqual([]);
  });
});

describe('reporting quality weak', () => {
  test('is soon where the headline is under 30, and never printed as 30', () => {
    expect(qualityWeak(context([29.6, 29.6, 29.6]))).toMatchObject([
      { severity: 'soon', sentence: expect.stringContaining('Reporting quality 29.6, below 30.') as string },
    ]);
  });

  test('is a note where one quarter end is, and nothing at 30', () => {
    expect(qualityWeak(context([50, 50, 29.9]))).toMatchObject([
      { severity: 'note', sentence: expect.stringContaining('at one quarter end, 30 Jun 2026') as string },
    ]);
    expect(qualityWeak(context([30, 30, 30]))).toEqual([]);
  });

  test('is nothing where there is no score', () => {
    expect(qualityWeak(buildContext(buildInputs({ covenants: [] }), '2026-11-30'))).toEqual([]);
  });
});
