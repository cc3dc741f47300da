import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, test } from 'vitest';
import type { CovenantView } from '../../contracts/borrowers.ts';
import type { ComingTestView, SensitivityView } from '../../contracts/outlook.ts';
import { FACTORS } from '../../core/outlook/sensitivity.ts';
import { ComingTests } from './ComingTests.tsx';
import { breakEvenText, NO_FORECAST, sizesText, wholeShare } from './outlookWords.ts';
import { ReliabilityPanel, ReliabilityTables } from './ReliabilityTable.tsx';
import { SensitivityPanel } from './SensitivityPanel.tsx';

const textOf = (markup: string): string =>
  markup
    .replaceAll(/<[^>]+>/g, ' ')
    .replaceAll('&#x27;', "'")
    .replaceAll(/\s+/g, ' ');

const covenant = {
  id: 1,
  name: 'Net leverage',
  unit: 'times',
  operator: '<=',
  isOurs: false,
  tests: [{ testDate: '2026-09-30', tested: '3.2', level: '3.5', outcome: 'met, thin', justPassing: false }],
} as unknown as CovenantView;

const comingText = (tests: readonly ComingTestView[], reason: string | null = null): string =>
  textOf(
    renderToStaticMarkup(
      <ComingTests
        covenants={[covenant]}
        projections={[{ covenantId: 1, fromTestDate: '2026-09-30', reason, tests }]}
      />,
    ),
  );

describe('tests to come', () => {
  test('stand with their word, share, n and borrowers, and the caution', () => {
    const text = comingText([
      {
        testDate: '2026-12-31',
        quarters: 1,
        kind: 'projected',
        level: '3.25',
        word: 'likely',
        notMet: 264,
        share: 264 / 368,
        n: 368,
        borrowers: 48,
        peers: 'book',
        check: 0.81,
        openAt: 3.1,
      },
    ]);
    for (const said of [
      '31 Dec 2026',
      'at most 3.25x',
      'likely',
      '72 %',
      '264 of 368',
      '48 borrowers, whole book',
      '81 %',
    ])
      expect(text).toContain(said);
    expect(text).toContain(NO_FORECAST);
  });

  test('with too few peers say nothing but that', () => {
    const text = comingText([{ testDate: '2026-12-31', quarters: 1, kind: 'too few peers', level: '3.25' }]);
    expect(text).toContain('too few peers');
    expect(text).not.toMatch(/unlikely|possible|likely|\d\s?%/);
  });

  test('that cannot be projected say why', () => {
    expect(comingText([], 'net cash: there is no ratio to carry on')).toContain(
      'Not projected: net cash: there is no ratio to carry on.',
    );
  });
});

describe('what was said and what came', () => {
  const record = (said: number, notMet: number) =>
    ({
      asOf: '2026-11-30',
      record: {
        from: '2025-09-30',
        until: '2026-06-30',
        horizons: [
          {
            quarters: 1,
            said,
            notMet,
            tooFewPeers: 4,
            brier: 0.2,
            brierOfBaseRate: 0.25,
            words: [{ word: 'open', said, notMet, meanSaid: 0.5, afterMet: { said, notMet } }],
          },
        ],
      },
    }) as const;
  const shown = (said: number, notMet: number): string =>
    textOf(renderToStaticMarkup(<ReliabilityTables record={record(said, notMet)} />));

  test('prints no share and no score below thirty, only the count', () => {
    expect(shown(29, 10)).toContain('10 of 29');
    expect(shown(29, 10)).not.toContain('0.200');
    expect(shown(30, 12)).toContain('40 %');
    expect(shown(30, 12)).toContain('0.200');
  });

  test('says that there is nothing to look back at', () => {
    expect(textOf(renderToStaticMarkup(<ReliabilityPanel record={null} />))).toContain(
      'Nothing to look back at yet',
    );
  });
});

describe('how far figures may move', () => {
  const never = Object.fromEntries(FACTORS.map((factor) => [factor, { kind: 'never' }]));
  const failed = Object.fromEntries(FACTORS.map((factor) => [factor, { kind: 'not met already' }]));
  const view = (breakEvens: object, first: SensitivityView['first']['together']): string =>
    textOf(
      renderToStaticMarkup(
        <SensitivityPanel
          covenants={[covenant]}
          sensitivity={
            {
              variableCostShare: '0.65',
              floatingDebtShare: '1',
              sizes: {},
              tests: [{ covenantId: 1, testDate: '2026-09-30', breakEvens, scenarios: {} }],
              first: Object.fromEntries(FACTORS.map((factor) => [factor, first])),
              every: null,
            } as unknown as SensitivityView
          }
        />,
      ),
    );

  test('prints the assumptions, and the test that is used up first', () => {
    const text = view(
      { ...never, together: { kind: 'at', share: '0.05', amount: null } },
      {
        covenantId: 1,
        share: '0.05',
        amount: null,
      },
    );
    expect(text).toContain('65 % of sales is variable cost');
    expect(text).toContain('At 5.0 % the first of those with room is used up: Net leverage.');
  });

  test('says of what nothing is left', () => {
    expect(view(failed, null)).toContain('Nothing is left already of Net leverage.');
  });

  test('says that there is no test', () => {
    expect(textOf(renderToStaticMarkup(<SensitivityPanel covenants={[]} sensitivity={null} />))).toContain(
      'No test with a result',
    );
  });
});

test('words of movements and sizes', () => {
  expect(breakEvenText('rates', { kind: 'at', share: '0.0312', amount: null })).toBe('3.1 points');
  expect(breakEvenText('sales', { kind: 'at', share: '0.0938', amount: null })).toBe('9.4\u00a0%');
  expect(breakEvenText('sales', { kind: 'unknown', reason: 'no sales of twelve months' })).toBe(
    'no sales of twelve months',
  );
  expect(sizesText({ salesFall: '0.1', workingCapitalLoss: '0', rateRise: '0.02' })).toBe(
    'sales fall 10\u00a0%, interest rises 2.0 points',
  );
  expect(sizesText({ salesFall: '0', workingCapitalLoss: '0', rateRise: '0' })).toBe('nothing moves');
  expect(wholeShare(0)).toBe('0\u00a0%');
  expect(wholeShare(1e-9)).toBe('under 0.1\u00a0%');
  expect(wholeShare(1 - 1e-9)).toBe('over 99.9\u00a0%');
  expect(wholeShare(0.004)).toBe('0.4\u00a0%');
});
