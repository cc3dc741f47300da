import { renderToStaticMarkup } from 'react-dom/server';
import { expect, test } from 'vitest';
import { buildQuality, buildQuarterScore } from '../../core/alerts/rule.fixture.ts';
import { QualitySummary } from './QualitySummary.tsx';

test('a headline over a latest quarter end without score says why that one has none', () => {
  const latest = {
    ...buildQuarterScore('2026-09-30', null),
    noScoreReason: 'The accounts do not tie, so they are not scored.',
  };
  const quality = buildQuality({
    headline: 69.5,
    band: 'well supported',
    latest,
    history: [buildQuarterScore('2026-06-30', 69.5), latest],
  });
  const page = renderToStaticMarkup(<QualitySummary borrower={{ quality, computed: null }} />);
  expect(page).toContain(
    'The accounts do not tie, so they are not scored. The headline is of the quarter ends',
  );
});
