import { describe, expect, test } from 'vitest';
import {
  HUMAN_DECISION_REQUIRED,
  NO_FINDING_OF_MISCONDUCT,
  POPULATION_NOT_BORROWER,
  THE_AGREEMENT_GOVERNS,
} from '../../core/cautions.ts';
import {
  digestMail,
  DIGEST_BLOCKS,
  MOST_ITEMS,
  oneClickHeaders,
  type Digest,
  type DigestItem,
} from './digest.ts';
import { heartbeatMail, type Heartbeat } from './heartbeat.ts';

const item = (alertId: number, facts: Partial<DigestItem> = {}): DigestItem => ({
  alertId,
  borrowerName: `Marrowby & Fen <${alertId}>`,
  exposure: 'limit EUR 12.4m',
  kind: 'thin headroom',
  severity: 'soon',
  isWarning: false,
  sentence: 'Net leverage 3.38x, at most 3.50x.',
  since: '30 Sep 2026',
  asked: 'Take it, assess by 15 Dec 2026, decide by 29 Dec 2026.',
  url: `https://desk.example/alerts/${alertId}`,
  ...facts,
});

const items = (count: number, from = 1): DigestItem[] =>
  Array.from({ length: count }, (_, index) => item(from + index));

const digest = (
  blocks: Partial<Record<(typeof DIGEST_BLOCKS)[number], DigestItem[]>>,
  facts: Partial<Digest> = {},
): Digest => ({
  deskNames: ['Northern desk'],
  day: '1 Dec 2026',
  blocks: DIGEST_BLOCKS.map((name) => ({ name, items: blocks[name] ?? [] })),
  stillOverdue: 0,
  newFigures: 0,
  unchanged: 0,
  knownAt: '1 Dec 2026, 02:30 CET',
  runAt: '1 Dec 2026, 02:30 CET',
  tested: 59,
  total: 60,
  failures: [],
  alertsUrl: 'https://desk.example/alerts',
  unsubscribeUrl: 'https://desk.example/unsubscribe?token=abc',
  ...facts,
});

/** What a reader of the HTML form reads; a link reads as its words and where it leads. */
const readHtml = (html: string): string =>
  html
    .replace(/<head>.*<\/head>/s, '')
    .replaceAll(/<a href="([^"]*)"[^>]*>([^<]*)<\/a>/g, '$2: $1')
    .replaceAll(/<\/?(?:b|span)[^>]*>/g, '')
    .replaceAll(/<[^>]+>/g, ' ')
    .replaceAll('&lt;', '<')
    .replaceAll('&gt;', '>')
    .replaceAll('&quot;', '"')
    .replaceAll('&#39;', "'")
    .replaceAll('&amp;', '&');
const words = (text: string): string => text.split(/\s+/).filter(Boolean).join(' ');

describe('the subject', () => {
  test('counts what needs a decision and what is due today, with the desk and the day', () => {
    expect(digestMail(digest({ New: items(2), Worse: items(1, 5), 'Due today': items(2, 8) })).subject).toBe(
      '[Northern desk] 3 need a decision, 2 due today - 1 Dec 2026',
    );
  });

  test('speaks of one as of one', () => {
    expect(digestMail(digest({ Overdue: items(1) })).subject).toBe(
      '[Northern desk] 1 needs a decision - 1 Dec 2026',
    );
  });

  test('says that something improved only where nothing is asked', () => {
    expect(digestMail(digest({ Improved: items(2) })).subject).toBe(
      '[Northern desk] 2 improved - 1 Dec 2026',
    );
    expect(digestMail(digest({ New: items(1), Improved: items(2, 4) })).subject).not.toContain('improved');
  });

  test('names no borrower, even where only the computing failed', () => {
    const { subject } = digestMail(digest({}, { failures: ['Marrowby (a figure is missing)'] }));
    expect(subject).toBe('[Northern desk] 1 not computed - 1 Dec 2026');
  });
});

describe('the body', () => {
  test('reads the same in both of its forms', () => {
    const mail = digestMail(
      digest(
        { New: items(3), 'Due today': items(1, 7), Improved: items(12, 20) },
        { failures: ['Quill & Sons (a "figure" is missing)'], unchanged: 4, stillOverdue: 1, newFigures: 2 },
      ),
    );
    expect(words(readHtml(mail.html))).toBe(words(mail.text));
  });

  test('keeps the blocks in their order and leaves empty ones out', () => {
    const { text } = digestMail(
      digest({ Improved: items(1, 5), Overdue: items(1, 4), Worse: items(1, 2), New: items(1) }),
    );
    const places = ['New (1)', 'Worse (1)', 'Overdue (1)', 'Improved (1)'].map((head) => text.indexOf(head));
    expect(places).toEqual([...places].sort((a, b) => a - b));
    expect(places).not.toContain(-1);
    expect(text).not.toContain('Due today');
  });

  test.each([
    [MOST_ITEMS - 1, null],
    [MOST_ITEMS, null],
    [MOST_ITEMS + 1, '1 more: open the list of alerts: https://desk.example/alerts'],
  ])('of %i items, the rest beyond ten is a count with a link', (count, rest) => {
    const { text } = digestMail(digest({ New: items(count) }));
    expect(text.match(/Open alert \d+: /g)).toHaveLength(Math.min(count, MOST_ITEMS));
    if (rest) expect(text).toContain(rest);
    else expect(text).not.toContain('more: open the list');
  });

  test('says of each item who, how much, what, since when, what is asked by when, and where', () => {
    const { text } = digestMail(digest({ New: items(1) }));
    for (const part of [
      'Marrowby & Fen <1> (limit EUR 12.4m)',
      'thin headroom, soon',
      'Net leverage 3.38x, at most 3.50x.',
      'Since 30 Sep 2026.',
      'Asked: Take it, assess by 15 Dec 2026, decide by 29 Dec 2026.',
      'https://desk.example/alerts/1',
    ])
      expect(text).toContain(part);
  });

  test('dates its figures, says how many were tested and what could not be', () => {
    const { text } = digestMail(digest({ New: items(1) }, { failures: ['Quill (no statement)'] }));
    expect(text).toContain('Figures known at 1 Dec 2026, 02:30 CET. Run at 1 Dec 2026, 02:30 CET.');
    expect(text).toContain('Tested 59 of 60 borrowers');
    expect(text).toContain('Quill (no statement)');
  });

  test('counts what is unchanged and does not repeat it', () => {
    const { text } = digestMail(digest({ New: items(1) }, { unchanged: 7, stillOverdue: 2, newFigures: 1 }));
    expect(text).toContain(
      '7 open alerts not repeated here; of them 2 are overdue from before, 1 has new figures of the same severity.',
    );
  });

  test.each([
    ['no finding of misconduct', NO_FINDING_OF_MISCONDUCT],
    ['population, not borrower', POPULATION_NOT_BORROWER],
    ['the agreement governs', THE_AGREEMENT_GOVERNS],
    ['a person decides', HUMAN_DECISION_REQUIRED],
  ])('carries the caution: %s', (_name, caution) => {
    const mail = digestMail(digest({ New: items(1) }));
    expect(mail.text).toContain(caution);
    expect(readHtml(mail.html)).toContain(caution);
  });

  test('never says what only counsel may say', () => {
    const mail = digestMail(digest({ New: items(1), Worse: items(1, 3), Improved: items(1, 4) }));
    expect(`${mail.subject} ${mail.text}`).not.toMatch(/breach|default|fraud|snooze/i);
  });

  test('runs nothing and loads nothing: markup in a name is text', () => {
    const { html } = digestMail(digest({ New: [item(1, { borrowerName: '<img src=x onerror=alert(1)>' })] }));
    expect(html).not.toContain('<img');
    expect(html).not.toContain('<script');
    expect(html).toContain('&lt;img src=x onerror=alert(1)&gt;');
  });

  test('shows the one warning colour only on a test not met', () => {
    const warning = '#A2145F';
    expect(digestMail(digest({ New: items(1) })).html).not.toContain(warning);
    expect(
      digestMail(digest({ New: [item(1, { kind: 'test not met', severity: 'urgent', isWarning: true })] }))
        .html,
    ).toContain(warning);
  });
});

// RFC 8058 section 3.1: both fields, the second with this one value, and an HTTPS address in the first.
test('one click to unsubscribe is offered over https and never over http', () => {
  expect(oneClickHeaders('https://desk.example/u?token=abc')).toEqual({
    'List-Unsubscribe': '<https://desk.example/u?token=abc>',
    'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click',
  });
  expect(oneClickHeaders('http://desk.example/u?token=abc')).toEqual({});
});

describe('the heartbeat', () => {
  const heartbeat = (facts: Partial<Heartbeat> = {}): Heartbeat => ({
    lenderName: 'Harbour Lending',
    day: '1 Dec 2026',
    attempt: 1,
    isLookBack: false,
    knownAt: '1 Dec 2026, 02:30 CET',
    runAt: '1 Dec 2026, 02:30 CET',
    tested: 60,
    total: 60,
    alerts: { raised: 4, worsened: 1, closed: 2 },
    digests: 2,
    mailsWaiting: 0,
    failures: [],
    auditHead: { seq: 1204, hash: 'c0ffee'.padEnd(64, '0') },
    runsUrl: 'https://desk.example/desk-settings/runs',
    ...facts,
  });

  test('comes on a quiet night too and says that nothing failed', () => {
    const mail = heartbeatMail(heartbeat({ alerts: { raised: 0, worsened: 0, closed: 0 }, digests: 0 }));
    expect(mail.subject).toBe('[Harbour Lending] Nightly run: tested 60 of 60 - 1 Dec 2026');
    expect(mail.text).toContain('What failed to run\n\nNothing.');
    expect(words(readHtml(mail.html))).toBe(words(mail.text));
  });

  test('says how many failed in its subject and each with its reason in its body', () => {
    const mail = heartbeatMail(
      heartbeat({ tested: 59, failures: ['Borrower 17 (Northern desk), scores: no'] }),
    );
    expect(mail.subject).toContain('tested 59 of 60, 1 failed');
    expect(mail.text).toContain('Borrower 17 (Northern desk), scores: no');
  });

  test('says where the audit log ends, so that a log that was cut can be told', () => {
    expect(heartbeatMail(heartbeat()).text).toContain(`entry 1204, hash ${'c0ffee'.padEnd(64, '0')}`);
  });

  test('says that a look back raises nothing', () => {
    expect(heartbeatMail(heartbeat({ isLookBack: true })).text).toContain('raise no alert');
  });
});
