import { expect, test } from 'vitest';
import type { BorrowerInputs } from '../borrowerInputs.ts';
import { plainDate } from '../calendar/plainDate.ts';
import { POLICY_VERSION_1 } from '../policy.ts';
import { AS_OF, buildBook, buildBorrower } from './book.fixture.ts';
import { buildCrossSection, type CrossSection } from './crossSection.ts';
import { openBooks } from '../statements/statementBook.ts';
import type { PeerFigure, PeerInputs } from './peerFigures.ts';
import { peerInputsOfQuarters } from './peerInputs.ts';
import { scoreQuarter } from './quarterScore.ts';
import { reportingQuality } from './reportingQuality.ts';
import { QUALITY_BLOCKS } from './score.ts';

const book = [
  ...buildBook(16, 'metal goods', 1),
  ...buildBook(12, 'food', 100),
  ...buildBook(3, 'printing', 200),
];
const crossSection = JSON.parse(
  JSON.stringify(
    buildCrossSection(
      book.flatMap((borrower) => peerInputsOfQuarters(borrower, AS_OF)),
      1,
    ),
  ),
) as CrossSection;
const qualityOf = (borrower: BorrowerInputs) =>
  reportingQuality(borrower, openBooks(borrower, AS_OF), crossSection, POLICY_VERSION_1, AS_OF);

test('every borrower of an ordinary book is scored with 95 of 100 points of weight, and noise waits for quarters', () => {
  for (const borrower of book) {
    const quality = qualityOf(borrower);
    expect(quality.latest?.blocks.map(({ name }) => name)).toEqual(QUALITY_BLOCKS);
    expect(quality.latest?.coverage).toBe(95);
    expect(quality.latest?.blocks.at(-1)).toMatchObject({
      risk: null,
      reason: '10 usable quarters, 12 are needed',
    });
    expect(quality.headline).toBeGreaterThanOrEqual(0);
    expect(quality.headline).toBeLessThanOrEqual(100);
    expect(quality.history).toHaveLength(8);
  }
});

test('a borrower that gives plant only gross has no place in a group that is on net, and it is not called few peers alone', () => {
  const lacking = (peer: PeerInputs, figure: PeerFigure): PeerInputs => ({
    ...peer,
    figures: Object.fromEntries(Object.entries(peer.figures).filter(([name]) => name !== figure)),
  });
  const [first, second, ...rest] = buildBook(16, 'metal goods', 1).map((borrower) =>
    peerInputsOfQuarters(borrower, AS_OF).at(-1)!,
  );
  const onNet = buildCrossSection([lacking(first!, 'ppeGross'), second!, ...rest], 1);
  const blockOf = (peer: PeerInputs) =>
    scoreQuarter(peer, onNet).blocks.find(({ name }) => name === 'unexplained accruals')!;
  expect(blockOf(second!).risk).not.toBeNull();
  const onlyGross = blockOf(lacking(second!, 'ppeNet'));
  expect(onlyGross.risk).toBeNull();
  expect(onlyGross.reason).toMatch(/gross or net where this borrower gives the other$/);
});

test('with twenty-four quarters every point of weight is there', () => {
  const long = Array.from({ length: 14 }, (_, k) => buildBorrower(300 + k, { quarters: 24 }));
  const peers = buildCrossSection(
    long.flatMap((borrower) => peerInputsOfQuarters(borrower, AS_OF)),
    1,
  );
  const [first] = long;
  const quality = reportingQuality(first!, openBooks(first!, AS_OF), peers, POLICY_VERSION_1, AS_OF);
  expect(quality.latest?.coverage).toBe(100);
  expect(quality.latest?.blocks.at(-1)?.figures.accrualNoise).toBeGreaterThan(0);
});

test('the headline is the mean of the last three quarter ends', () => {
  const quality = qualityOf(book[0]!);
  const last = quality.history.slice(-3).map(({ score }) => score!);
  expect(quality.headline).toBeCloseTo(last.reduce((sum, score) => sum + score, 0) / 3, 10);
});

test('receivables drawn up for a year are named first, with both values and the number of peers', () => {
  const quality = qualityOf(buildBorrower(500, { receivablesUp: 0.25 }));
  expect(quality.band).toBe('weakly supported');
  expect(quality.explanations[0]).toMatch(
    /^Receivable days rose from \d+ to \d+ \(\+2\d\u00a0%\); peers [+−]?\d+\u00a0% \(16 peers\)\.$/,
  );
  expect(quality.explanations.length).toBeLessThanOrEqual(4);
  expect(quality.whatWouldChangeIt).toMatch(/receivables ageing/);
});

test('costs put on the balance sheet show as accruals that cash does not explain', () => {
  const quality = qualityOf(buildBorrower(501, { capitalised: 0.06 }));
  expect(quality.explanations.join(' ')).toMatch(
    /Accruals not explained by cash or growth are \d+\u00a0% of assets; the peer median is −?\d+\u00a0% \(16 peers\)\./,
  );
});

test('fast growth is said beside the number', () => {
  const quality = qualityOf(buildBorrower(502, { growth: 0.08 }));
  expect(quality.remarks).toContainEqual(expect.stringMatching(/fast growth alone doubles the chance/));
  expect(quality.explanations.at(-1)).toMatch(
    /^Revenue grew 3\d\u00a0%: screens built on growth are left out\.$/,
  );
  expect(quality.explanations.length).toBeLessThanOrEqual(4);
});

test('unaudited accounts and few peers are said beside the number', () => {
  expect(qualityOf(book.at(-1)!).remarks).toEqual([
    'The accounts of 30 Sep 2026 are management accounts, not audited.',
    'Only 2 peers in the sector: the comparison leans 80\u00a0% on the whole book (30 others).',
  ]);
  expect(qualityOf(buildBorrower(1, { given: { basis: 'audited' } })).remarks).toEqual([]);
});

test('without a cash flow statement coverage is 70 at most, and it is said', () => {
  const quality = qualityOf(buildBorrower(503, { leaveOut: ['cfo', 'capex', 'interest_paid', 'tax_paid'] }));
  expect(quality.latest).toMatchObject({ coverage: 70, derivedCashFlow: true });
  expect(quality.headline).not.toBeNull();
  expect(quality.remarks).toContainEqual(expect.stringMatching(/derived from the balance sheets/));
});

test('too little to go by gives no score, names what is missing and asks for it', () => {
  const quality = qualityOf(buildBorrower(504, { leaveOut: ['capex', 'interest_paid'] }));
  expect(quality).toMatchObject({ headline: null, band: null });
  expect(quality.noScoreReason).toBe(
    'Only 50 of 100 points of weight are available and 60 are needed. Not available: unexplained accruals (missing: capital expenditure over twelve months); cash conversion (missing: interest paid over twelve months); accrual noise (10 usable quarters, 12 are needed).',
  );
  expect(quality.whatWouldChangeIt).toBe('Ask for what is missing: capital expenditure over twelve months.');
});

test('a legal form that is never scored says so', () => {
  expect(qualityOf({ ...buildBorrower(1), legalForm: 'bank' })).toMatchObject({
    headline: null,
    noScoreReason: 'The legal form is bank; this form is not scored.',
    history: [],
  });
});

test('half-yearly accounts give a headline of two, annual accounts a provisional one', () => {
  const on = plainDate('2026-08-30');
  const halfYearly = buildBorrower(505, { everyMonths: 6, quarters: 20 });
  const annual = buildBorrower(506, { everyMonths: 12, quarters: 20 });
  const half = reportingQuality(halfYearly, openBooks(halfYearly, on), crossSection, POLICY_VERSION_1, on);
  expect(half.history.at(-1)?.quarterEnd).toBe('2026-06-30');
  const [before, latest] = half.history.slice(-2).map(({ score }) => score!);
  expect(half.headline).toBeCloseTo((before! + latest!) / 2, 10);
  expect(half.provisional).toBe(false);
  expect(reportingQuality(annual, openBooks(annual, on), crossSection, POLICY_VERSION_1, on)).toMatchObject({
    provisional: true,
  });
});

test('the band moves by five points past a line, and a small move is said to be no news', () => {
  const borrower = book[0]!;
  const { headline, band } = qualityOf(borrower);
  const previous = (quarterEnd: '2026-06-30' | '2026-09-30', offset: number, before: string) => ({
    ...borrower,
    previous: { quality: { quarterEnd, headline: headline! + offset, band: before } },
  });
  expect(qualityOf(previous('2026-06-30', 9.9, band!)).remarks).toContain(
    'Moved 9.9 points since 30 Jun 2026: under 10 points is not news.',
  );
  expect(qualityOf(previous('2026-06-30', 10.1, band!)).remarks.join(' ')).not.toMatch(/Moved/);
  expect(qualityOf(previous('2026-09-30', 5, band!)).remarks.join(' ')).not.toMatch(/Moved/);
});

test('no explanation accuses', () => {
  const words = book
    .map(qualityOf)
    .flatMap(({ explanations, remarks, whatWouldChangeIt }) => [
      ...explanations,
      ...remarks,
      whatWouldChangeIt,
    ]);
  expect(words.join(' ')).not.toMatch(/fraud|manipulat|misstat|breach|default|suspicio/i);
});

test('under a changed presentation of cash flows only what uses none is there, and it is said', () => {
  const borrower = buildBorrower(7);
  const changed = {
    ...borrower,
    statements: borrower.statements.map((statement) =>
      statement.periodEnd >= '2026-01-01' ? { ...statement, framework: 'IFRS 18' } : statement,
    ),
  };
  const quality = qualityOf(changed);
  expect(quality.latest).toMatchObject({ score: null, coverage: 50 });
  expect(quality.latest?.blocks.filter(({ risk }) => risk !== null).map(({ name }) => name)).toEqual([
    'sharpest stretch',
    'published screens',
  ]);
  expect(quality.latest?.blocks[3]?.figures.mScoreVariables).toBe(5);
  expect(quality.remarks).toContainEqual(expect.stringMatching(/until the year before is restated/));
  expect(quality.whatWouldChangeIt).toBe(
    'Ask for the year before under the same presentation of cash flows.',
  );
  const restated = {
    ...borrower,
    statements: borrower.statements.map((statement) => ({ ...statement, framework: 'IFRS 18' })),
  };
  expect(qualityOf(restated).headline).toBe(qualityOf(borrower).headline);
});

test('the figures of the latest quarter end lead back to the statements they were read from', () => {
  const borrower = buildBorrower(8);
  const { sources } = qualityOf(borrower);
  const revenue = sources.find(({ figure }) => figure === 'revenue')!;
  const quarters = borrower.statements.filter(({ months }) => months === 3).slice(-4);
  expect(revenue.cells).toEqual(
    quarters.map(({ id, periodEnd }) => ({ statementId: id, line: 'revenue', periodEnd, months: 3 })),
  );
  expect(revenue.amount).toBe(quarters.reduce((sum, { amounts }) => sum + amounts.revenue!.toNumber(), 0));
  expect(sources.find(({ figure }) => figure === 'cfo')?.cells.every(({ line }) => line === 'cfo')).toBe(
    true,
  );
});

test('what of earnings rests on accruals is in money, and never below nought', () => {
  const managed = qualityOf(buildBorrower(509, { receivablesUp: 0.25 })).latest!.earningsAtRisk!;
  expect(managed.unexplained).toBeGreaterThan(0);
  expect(managed.workingCapital).toBeGreaterThan(0);
  for (const borrower of book) {
    const atRisk = qualityOf(borrower).latest!.earningsAtRisk!;
    expect(Math.min(atRisk.unexplained, atRisk.workingCapital)).toBeGreaterThanOrEqual(0);
  }
});
