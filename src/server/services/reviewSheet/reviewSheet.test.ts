import { describe, expect, test } from 'vitest';
import { REVIEW_SECTIONS, type ReviewSheet, type SheetCell } from '../../../contracts/reviewSheet.ts';
import { CAUTIONS } from '../../../core/cautions.ts';
import { decimal } from '../../../core/money/decimal.ts';
import { buildCovenant, buildLevel, buildYear } from '../../../core/covenants/covenant.fixture.ts';
import { buildMaterial, buildSignal, COVENANTS } from './material.fixture.ts';
import { reviewSheet } from './reviewSheet.ts';

const sheet = reviewSheet(buildMaterial());

const blocksOf = (of: ReviewSheet, number: number) => of.sections[number - 1]?.blocks ?? [];
const textsOf = (of: ReviewSheet, number: number): string[] =>
  blocksOf(of, number).flatMap((block) => {
    if (block.kind === 'list') return [...block.lines];
    return block.kind === 'paragraph' || block.kind === 'caution' ? [block.text] : [];
  });
const rowsOf = (of: ReviewSheet, number: number): Record<string, SheetCell>[] =>
  blocksOf(of, number).flatMap((block) =>
    block.kind === 'table'
      ? block.rows.map((row) => Object.fromEntries(block.columns.map(({ key }, place) => [key, row[place]!])))
      : [],
  );

test('twenty sections stand in their order, and what fills itself is filled', () => {
  expect(sheet.sections.map(({ title }) => title)).toEqual([...REVIEW_SECTIONS]);
  expect(sheet.sections.map(({ number }) => number)).toEqual(REVIEW_SECTIONS.map((_, place) => place + 1));
  expect(sheet.sections.filter(({ isRecorded }) => isRecorded).map(({ number }) => number)).toEqual([
    1, 3, 6, 7, 9, 11, 12, 16, 18,
  ]);
});

test('every caution stands in its section, also before the first assessment', () => {
  const unassessed = reviewSheet(buildMaterial({ covenants: [], view: { computed: null, quality: null } }));
  for (const each of [sheet, unassessed]) {
    const cautions = each.sections.flatMap(({ number, blocks }) =>
      blocks.flatMap((block) => (block.kind === 'caution' ? [[number, block.text]] : [])),
    );
    expect(cautions).toEqual([
      [6, CAUTIONS[2]],
      [11, CAUTIONS[0]],
      [12, CAUTIONS[1]],
      [20, CAUTIONS[3]],
    ]);
  }
});

test('the header dates the figures and names what they were computed with', () => {
  const facts = blocksOf(sheet, 1).flatMap((block) =>
    block.kind === 'facts' ? block.facts.map(({ label, value }) => [label, value.text] as const) : [],
  );
  expect(Object.fromEntries(facts)).toMatchObject({
    Borrower: 'Fathom Works Ltd',
    Group: 'not recorded',
    LEI: 'ZZ0000UKEEL000000A65',
    Sector: '25 Metal products (NACE 2.1)',
    'Data cut-off': '16 Mar 2026, 01:30 UTC',
    'Method version': '1.0',
    'Policy version': '1',
    'Input version': '3',
    Sheet: 'DRAFT, not signed: no version number yet',
  });
  expect(textsOf(sheet, 1)[0]).toMatch(/^Confidential/);
});

test('a listed borrower carries the private-side mark, another does not', () => {
  expect(sheet.privateSide).toBeNull();
  expect(reviewSheet(buildMaterial({ view: { isListed: true } })).privateSide).toMatch(/^Private side/);
});

describe('what changed', () => {
  test('begins with the outcome that changed, with number and date of both tests', () => {
    expect(textsOf(sheet, 3)).toEqual([
      'Since the previous test date (31 Dec 2024); no earlier sheet is recorded.',
      'Net leverage, 31 Dec 2025: 3.5004x, at most 3.50x: not met, earnings 0.01\u00a0% short. 31 Dec 2024: 3.00x, at most 3.50x: met, earnings may fall 14.3\u00a0%.',
      'Current ratio, 31 Dec 2025: 1.50x, at least 1.20x: met, the tested amount may fall 20.0\u00a0%. 31 Dec 2024: 1.50x, at least 1.20x: met, the tested amount may fall 20.0\u00a0%.',
    ]);
  });

  test('keeps to five lines, changed outcomes first, and says how many more there are', () => {
    const many = Array.from({ length: 6 }, (_, place) => ({
      ...COVENANTS[1]!,
      id: 10 + place,
      name: `Ratio ${place}`,
    }));
    const crowded = reviewSheet(
      buildMaterial({
        covenants: [...many, COVENANTS[0]!],
        signals: [
          buildSignal({ kind: 'prior figures restated', factDate: '2025-06-01', sentence: 'Restated.' }),
        ],
      }),
    );
    const [list] = blocksOf(crowded, 3).filter((block) => block.kind === 'list');
    expect(list?.lines).toHaveLength(5);
    expect(list?.lines[0]).toMatch(/^Net leverage/);
    expect(list?.lines.at(-1)).toBe('Received 1 Jun 2025: Restated.');
    expect(textsOf(crowded, 3).at(-1)).toBe('3 smaller moves stand in section 6.');
  });

  test('tells a watchlist entry since then, and not an older one', () => {
    const watchlist = {
      id: 1,
      borrowerId: 7,
      borrowerName: 'Fathom Works Ltd',
      deskName: 'Northern desk',
      grade: 'W2',
      reason: 'Leverage was not met.',
      ownerName: 'Maren Holtqvane',
      plan: 'A plan.',
      nextReviewOn: '2026-06-30',
      reviewOverdue: false,
      state: 'active',
      proposedBy: 'Maren Holtqvane',
      decidedBy: 'Agneta Lornby',
    } as const;
    const since = (enteredOn: string) =>
      textsOf(reviewSheet(buildMaterial({ view: { watchlist: { ...watchlist, enteredOn } } })), 3).filter(
        (line) => line.startsWith('On the watchlist'),
      );
    expect(since('2024-12-31')).toEqual([
      'On the watchlist since 31 Dec 2024 at W2 (act), proposed by Maren Holtqvane, decided by Agneta Lornby: Leverage was not met.',
    ]);
    expect(since('2024-12-30')).toEqual([]);
  });
});

describe('the covenant table', () => {
  test('shows a result on the side of the level that it is on', () => {
    const [leverage] = rowsOf(sheet, 6);
    expect(leverage?.['computed']).toMatchObject({
      kind: 'figure',
      unit: 'times',
      places: 4,
      text: '3.5004x',
    });
    expect(leverage?.['level']).toMatchObject({
      before: 'at most',
      value: '3.5',
      places: 2,
      text: 'at most 3.50x',
    });
    expect(leverage?.['status']).toMatchObject({ kind: 'outcome', outcome: 'not met' });
    expect(leverage?.['mayFall']).toMatchObject({ text: '−0.01\u00a0%', places: 2 });
  });

  test('gives the next step, the next test, and says what is not recorded', () => {
    const [leverage, ratio] = rowsOf(sheet, 6);
    expect(leverage?.['nextLevel']?.text).toBe('at most 3.25x');
    expect(leverage?.['nextFrom']?.text).toBe('1 Jun 2026');
    expect(leverage?.['nextTest']?.text).toBe('31 Dec 2026');
    expect(ratio?.['nextLevel']?.text).toBe('none agreed');
    for (const key of ['certified', 'difference', 'delivered'])
      expect(leverage?.[key], key).toEqual({ kind: 'absent', text: 'not recorded' });
    expect(textsOf(sheet, 6)[0]).toBe(
      'Current ratio has no earnings: the share by which the tested amount may fall stands in.',
    );
  });

  test('holds the certified figure against the computed one', () => {
    const certified = reviewSheet(
      buildMaterial({
        checks: [
          {
            covenantId: 1,
            testDate: '2025-12-31',
            certifiedValue: '3.480000000000',
            certifiedOutcome: 'met',
            acceptedOutcome: null,
            checking: 'disputed',
          },
        ],
      }),
    );
    const [leverage] = rowsOf(certified, 6);
    expect(leverage?.['certified']?.text).toBe('3.48x');
    expect(leverage?.['difference']?.text).toBe('0.02x');
    expect(leverage?.['status']?.text).toBe('not met; disputed');
  });

  test('a waiver is told with its conditions and the failure stays underneath', () => {
    const waived = reviewSheet(
      buildMaterial({
        covenants: [
          {
            ...COVENANTS[0]!,
            waivers: [
              {
                testDate: '2025-12-31',
                grantedOn: '2026-02-01',
                until: '2026-12-31',
                conditions: 'Monthly figures',
              },
            ],
          },
        ],
      }),
    );
    const [leverage] = rowsOf(waived, 6);
    expect(leverage?.['status']?.text).toBe(
      'not met, waived; waived on 1 Feb 2026 until 31 Dec 2026: Monthly figures; preliminary',
    );
  });

  test('a latest test without a ratio is not hidden behind an older one that had one', () => {
    const without = reviewSheet(
      buildMaterial({
        statements: [
          ...buildYear('2024-12-31', { ebitda: 12, debt: 36, cash: 0 }),
          ...buildYear('2025-12-31', { ebitda: -1, debt: 36, cash: 0 }),
        ],
        covenants: [{ ...COVENANTS[0]!, addBacks: [] }],
      }),
    );
    const [leverage] = rowsOf(without, 6);
    expect(leverage?.['testDate']?.text).toBe('31 Dec 2025');
    expect(leverage?.['computed']).toEqual({ kind: 'absent', text: 'n.m.' });
    expect(leverage?.['moneyLeft']).toEqual({ kind: 'absent', text: 'n.m.' });
    expect(leverage?.['status']?.text).toMatch(/^not met, ratio has no meaning/);
    expect(rowsOf(without, 9).find((row) => row['line']?.text === 'EBITDA')?.['amount']?.text).toBe('−1');
  });

  test('a late delivery is told', () => {
    const late = reviewSheet(buildMaterial({ signals: [buildSignal({ kind: 'statement late' })] }));
    expect(rowsOf(late, 6)[0]?.['delivered']?.text).toBe('late, see 16');
    const closed = reviewSheet(
      buildMaterial({ signals: [buildSignal({ kind: 'statement late', isOpen: 0 })] }),
    );
    expect(rowsOf(closed, 6)[0]?.['delivered']?.text).toBe('not recorded');
  });
});

test('break-even says what may fall, what may rise and the first later level that is not met', () => {
  const [leverage, ratio] = rowsOf(sheet, 7);
  expect(leverage?.['falls']?.text).toBe('EBITDA');
  expect(leverage?.['fallShare']?.text).toBe('−0.01\u00a0%');
  expect(leverage?.['rises']?.text).toBe('Net debt');
  expect(leverage?.['later']?.text).toBe('at most 3.25x, 7.7\u00a0% short');
  expect(leverage?.['laterFrom']?.text).toBe('1 Jun 2026');
  expect(leverage?.['projection']?.text).toBe('not recorded');
  expect(ratio?.['later']?.text).toBe('no later level agreed');
});

test('the bridge leads from net income to covenant EBITDA with cap, evidence and source cells', () => {
  const rows = rowsOf(sheet, 9);
  expect(rows.map((row) => [row['line']?.text, row['amount']?.text, row['kind']?.text])).toEqual([
    ['Net income', '2.2', 'reported'],
    ['Income tax', '1.6', 'reported'],
    ['Interest expense', '2.5', 'reported'],
    ['Depreciation and amortisation', '3.7', 'reported'],
    ['EBITDA', '10', 'subtotal'],
    ['Restructuring', '0.5', 'add-back, capped'],
    ['Adjusted EBITDA', '10.5', 'subtotal'],
  ]);
  expect(rows[5]?.['evidence']?.text).toBe(
    'plant closure; board paper of March; not approved by a second person yet; 3 months to 31 Dec 2025',
  );
  expect(rows[3]?.['cells']?.text).toBe("Figures 2025.xlsx: 'P&L ''25'!D6, D7");
  expect(textsOf(sheet, 9)).toEqual([
    'Cap on add-backs 25\u00a0% of EBITDA before the capped add-backs: EUR 3. Capped add-backs 1, taken 1: 20.0\u00a0% of the cap used.',
    'Without add-backs, EUR 1 taken out: 3.68x, would not have been met.',
  ]);
});

// Own arithmetic: half of 10 less 2 of rent, not half of 10.
test('the cap is taken of EBITDA after the rent that the rules at signing take from it', () => {
  const [leverage] = COVENANTS;
  const frozen = {
    ...leverage!,
    definition: { ...leverage!.definition, accounting: 'frozen', addBackCap: decimal('0.5') },
  } as const;
  const statements = buildYear('2025-12-31', { ebitda: 10, debt: 30, cash: 0 }).map((statement) =>
    statement.months === 0
      ? statement
      : { ...statement, amounts: { ...statement.amounts, rent_paid: decimal(-2) } },
  );
  const [cap] = textsOf(reviewSheet(buildMaterial({ covenants: [frozen], statements })), 9);
  expect(cap).toContain('Cap on add-backs 50\u00a0% of EBITDA before the capped add-backs: EUR 4.');
});

test('just passing is k of n tests with its days', () => {
  const near = reviewSheet(
    buildMaterial({
      covenants: [buildCovenant({ ...COVENANTS[0]!, levels: [buildLevel('2024-01-01', null, '3.52')] })],
    }),
  );
  const [row] = rowsOf(near, 12);
  expect([row?.['inBand']?.text, row?.['ofLast']?.text, row?.['run']?.text, row?.['dates']?.text]).toEqual([
    '1',
    '2',
    '1',
    '31 Dec 2025',
  ]);
  expect(textsOf(near, 12)[0]).toMatch(/^Just passing: within 2\u00a0% of the level/);
});

test('signals that are open, and closed ones with reason, words and name', () => {
  const signals = [
    buildSignal(),
    buildSignal({
      isOpen: 0,
      closedAt: new Date('2026-03-10T09:00:00Z'),
      closedBy: 'Ruben Astrelle',
      closingReason: 3,
      closingText: 'Stock was seen.',
    }),
    buildSignal({ isOpen: 0, closedAt: new Date('2026-03-09T01:30:00Z') }),
  ];
  const rows = rowsOf(reviewSheet(buildMaterial({ signals })), 16);
  expect(rows.map((row) => Object.values(row).map(({ text }) => text))).toEqual([
    [
      'test not met',
      'urgent',
      signals[0]?.sentence,
      '15 Mar 2026',
      'not taken yet',
      'Maren Holtqvane',
      '20 Mar 2026',
    ],
    [
      'test not met',
      signals[0]?.sentence,
      '15 Mar 2026',
      '10 Mar 2026',
      'Timing or seasonality, evidence seen',
      'Stock was seen.',
      'Ruben Astrelle',
    ],
    [
      'test not met',
      signals[0]?.sentence,
      '15 Mar 2026',
      '9 Mar 2026',
      'closed by itself: the condition is gone',
      '–',
      'nobody',
    ],
  ]);
});

test('every figure of the latest tests is listed once with its file, hash and cell, and so are the add-backs', () => {
  const lines = sheet.sources.map(({ line }) => line);
  expect(lines.filter((line) => line === 'Net income')).toHaveLength(1);
  expect(sheet.sources.find(({ line }) => line === 'Current assets')).toMatchObject({
    usedIn: 'Current ratio',
    amount: '30',
    currency: 'EUR',
    standing: 'management, version 1',
    fileName: 'Figures 2025.xlsx',
    sha256: 'a'.repeat(64),
    sheet: "P&L '25",
    cells: 'E4',
  });
  expect(sheet.sources.at(-1)).toMatchObject({
    line: 'Add-back: Restructuring',
    fileName: null,
    amount: '0.5',
  });
});

test('stored as text and read again, a sheet is the same', () => {
  expect(JSON.parse(JSON.stringify(sheet))).toEqual(sheet);
});

test('no decision word of the agreement is printed', () => {
  expect(JSON.stringify(sheet)).not.toMatch(/breach|default|fraud/i);
});

test('the desk’s own trigger is marked ours in every table and never reads not met', () => {
  const [agreed, other] = COVENANTS;
  const marked = reviewSheet(buildMaterial({ covenants: [{ ...agreed!, isOurs: true }, other!] }));
  const [row] = rowsOf(marked, 6);
  expect(row?.['covenant']?.text).toBe('Net leverage, ours, not in the agreement');
  expect(row?.['clause']?.text).toBe('Term loan A, ours, not in the agreement');
  expect(row?.['status']?.text).toMatch(/^above our trigger/);
  expect(rowsOf(marked, 7)[0]?.['covenant']?.text).toBe('Net leverage, ours, not in the agreement');
  expect(JSON.stringify(rowsOf(marked, 6))).not.toContain('not met');
});

test('waivers, resets and cures stand in their section, with how many cures are used', () => {
  const [agreed] = COVENANTS;
  const levels = [
    ...agreed!.levels.slice(0, 1),
    { ...buildLevel('2026-06-01', null, '3.25'), isReset: true },
  ];
  const cureRights = {
    method: 'debt',
    withinBusinessDays: 15,
    mostInFour: 2,
    mostInLife: 5,
    curedByNextTest: false,
  } as const;
  const cures = [
    { quarterEnd: '2025-12-31', method: 'debt', amount: decimal(1), receivedOn: '2026-02-20' } as const,
  ];
  const cured = reviewSheet(buildMaterial({ covenants: [{ ...agreed!, levels, cureRights, cures }] }));
  expect(rowsOf(cured, 18).map((row) => [row['what']?.text, row['of']?.text, row['terms']?.text])).toEqual([
    ['reset', '1 Jun 2026', 'at most 3.25x; past tests keep their level'],
    ['equity cure', '31 Dec 2025', 'EUR 1 as debt repaid'],
  ]);
  expect(textsOf(cured, 18)).toEqual([
    'Net leverage: 1 of 2 cures used in four quarters, 1 of 5 over the life.',
  ]);
  expect(rowsOf(cured, 6)[0]?.['status']?.text).toMatch(/^cured; .*with the money put in 3.50x/);
});
