import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, test } from 'vitest';
import { ALERT_KINDS } from '../../core/alerts/alert.ts';
import { OUTCOMES } from '../../core/covenants/covenantTest.ts';
import { AlertKindLabel, AlertMark } from './AlertMark.tsx';
import { HeadroomText, OutcomeText } from './OutcomeText.tsx';
import { QualityBar } from './QualityBar.tsx';
import { SoundingStrip } from './SoundingStrip.tsx';
import type { StripTest } from '../../contracts/alerts.ts';

const TESTS: readonly StripTest[] = [
  { testDate: '2026-03-31', outcome: 'met', mayFall: '0.123', justPassing: false, level: '3.75' },
  { testDate: '2026-06-30', outcome: 'cannot be tested', mayFall: null, justPassing: false, level: '3.75' },
  { testDate: '2026-09-30', outcome: 'met, thin', mayFall: '0.014', justPassing: true, level: '3.50' },
  { testDate: '2026-12-31', outcome: 'not met', mayFall: '-0.04', justPassing: false, level: '3.50' },
];

describe('the sounding strip', () => {
  const row = renderToStaticMarkup(<SoundingStrip tests={TESTS} size="row" label="Net leverage" />);

  test('reads every test with its outcome and its number', () => {
    expect(row).toContain('role="img"');
    expect(row).toContain(
      'aria-label="Net leverage, the last 4 tests, oldest first: 31 Mar 2026 met, may fall 12.3\u00a0%; 30 Jun 2026 cannot be tested; 30 Sep 2026 met, thin, just passing, may fall 1.4\u00a0%; 31 Dec 2026 not met, short by 4.0\u00a0%."',
    );
  });

  test('says that there is no test yet, and still draws the bed and the limit', () => {
    const empty = renderToStaticMarkup(<SoundingStrip tests={[]} size="row" label="Liquidity" />);
    expect(empty).toContain('aria-label="Liquidity: no test yet."');
    expect(empty).toContain('strip-bed');
    expect(empty).toContain('strip-limit');
  });

  test('fills what is just passing, hangs a diamond where not met, crosses what cannot be tested', () => {
    expect(row.match(/strip-just-passing/g)).toHaveLength(1);
    expect(row.match(/strip-not-met/g)).toHaveLength(1);
    expect(row.match(/class="strip-cross"/g)).toHaveLength(1);
    expect(row.match(/class="strip-ring"/g)).toHaveLength(1);
  });

  test('prints the first and the last day at panel size only', () => {
    const panel = renderToStaticMarkup(<SoundingStrip tests={TESTS} size="panel" label="Net leverage" />);
    expect(panel).toContain('>31 Mar 2026</text>');
    expect(panel).toContain('>31 Dec 2026</text>');
    expect(row).not.toContain('<text');
  });
});

describe('alert marks', () => {
  test('are nine different drawings', () => {
    const drawings = ALERT_KINDS.map((kind) =>
      renderToStaticMarkup(<AlertMark kind={kind} />).replace(/class="mark[^"]*"/, ''),
    );
    expect(new Set(drawings).size).toBe(ALERT_KINDS.length);
  });

  test('carry the warning colour only where a test is not met or just passing', () => {
    const coloured = ALERT_KINDS.filter((kind) =>
      renderToStaticMarkup(<AlertMark kind={kind} />).includes('mark-magenta'),
    );
    expect(coloured).toEqual(['test not met', 'just passing, repeated']);
  });

  test('are hidden from a screen reader, because the word stands beside them', () => {
    const label = renderToStaticMarkup(<AlertKindLabel kind="statement late" />);
    expect(label).toContain('aria-hidden="true"');
    expect(label).toContain('Statement late');
  });
});

describe('outcome and headroom', () => {
  test.each(OUTCOMES)('%s is printed as a word beside its mark', (outcome) => {
    const printed = renderToStaticMarkup(<OutcomeText outcome={outcome} />);
    expect(printed).toContain('<svg');
    expect(printed).toContain(outcome);
  });

  test('only not met and just passing carry the warning colour; a waived test and thin headroom do not', () => {
    const coloured = OUTCOMES.filter((outcome) =>
      renderToStaticMarkup(<OutcomeText outcome={outcome} />).includes('figure-magenta'),
    );
    expect(coloured).toEqual(['not met', 'not met, ratio has no meaning', 'not met, in cure period']);
    expect(renderToStaticMarkup(<OutcomeText outcome="met, thin" justPassing />)).toContain('figure-magenta');
    expect(renderToStaticMarkup(<HeadroomText mayFall="0.03" outcome="met, thin" />)).not.toContain(
      'figure-magenta',
    );
    expect(renderToStaticMarkup(<HeadroomText mayFall="0.014" outcome="met, thin" justPassing />)).toContain(
      'figure-magenta',
    );
  });

  test('no headroom figure is said to be none, with the outcome that says why', () => {
    const printed = renderToStaticMarkup(<HeadroomText mayFall={null} outcome="cannot be tested" />);
    expect(printed).toContain('no headroom figure: cannot be tested');
    expect(printed).not.toMatch(/\d/);
  });
});

describe('the quality bar', () => {
  test('is as long as the score, with the number and the word', () => {
    const printed = renderToStaticMarkup(<QualityBar score={25} band="weakly supported" />);
    expect(printed).toContain('>25</span>');
    expect(printed).toContain('weakly supported');
    expect(printed).toContain('class="bar-ink" x="1" y="1" width="16"');
  });

  test('prints the reason where there is no score, and draws no bar', () => {
    const printed = renderToStaticMarkup(
      <QualityBar score={null} band={null} noScoreReason="natural person" />,
    );
    expect(printed).toContain('No score: natural person');
    expect(printed).not.toContain('<svg');
  });
});

test('nothing is styled inline', () => {
  const all = renderToStaticMarkup(
    <>
      <SoundingStrip tests={TESTS} size="panel" label="Net leverage" />
      <QualityBar score={25} band="weakly supported" />
      {ALERT_KINDS.map((kind) => (
        <AlertKindLabel key={kind} kind={kind} />
      ))}
      {OUTCOMES.map((outcome) => (
        <OutcomeText key={outcome} outcome={outcome} />
      ))}
    </>,
  );
  expect(all).not.toMatch(/\sstyle=/);
});
