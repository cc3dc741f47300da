import { expect, test } from 'vitest';
import { plainDate } from '../calendar/plainDate.ts';
import { AS_OF, buildBorrower, LAST_QUARTER_END } from './book.fixture.ts';
import { peerInputs, peerInputsOfQuarters } from './peerInputs.ts';

const latest = (...args: Parameters<typeof buildBorrower>) =>
  peerInputs(buildBorrower(...args), LAST_QUARTER_END, AS_OF)!;

test('flows are those of twelve months, paid items positive, balances those of the day and of a year before', () => {
  const borrower = buildBorrower(1);
  const flows = borrower.statements.filter(({ months }) => months === 3).slice(-4);
  const sheets = borrower.statements.filter(({ months }) => months === 0);
  const total = (line: 'revenue' | 'capex'): number =>
    flows.reduce((sum, { amounts }) => sum + amounts[line]!.toNumber(), 0);
  const { figures } = peerInputs(borrower, LAST_QUARTER_END, AS_OF)!;
  expect(figures.revenue).toBe(total('revenue'));
  expect(figures.capex).toBe(-total('capex'));
  expect(figures.revenueQuarter).toBe(flows.at(-1)!.amounts.revenue!.toNumber());
  expect(figures.cogsTwoQuarters).toBe(
    flows.at(-1)!.amounts.cogs!.plus(flows.at(-2)!.amounts.cogs!).toNumber(),
  );
  expect(figures.assets).toBe(sheets.at(-1)!.amounts.total_assets!.toNumber());
  expect(figures.assetsPrior).toBe(sheets.at(-5)!.amounts.total_assets!.toNumber());
  const opening = sheets.at(-5)!.amounts;
  expect(figures.nwcPrior).toBe(
    opening.receivables!.plus(opening.inventory!).minus(opening.payables!).toNumber(),
  );
});

test('EBITDA is built from the bottom', () => {
  const { figures } = latest(1);
  const sum = (line: 'net_income' | 'income_tax' | 'interest_expense' | 'depreciation'): number =>
    buildBorrower(1)
      .statements.filter(({ months }) => months === 3)
      .slice(-4)
      .reduce((total, { amounts }) => total + amounts[line]!.toNumber(), 0);
  expect(figures.ebitda).toBe(
    sum('net_income') + sum('income_tax') + sum('interest_expense') + sum('depreciation'),
  );
});

test('a missing line stays missing and is not filled in', () => {
  const { figures, derivedCashFlow } = latest(1, { leaveOut: ['interest_paid'] });
  expect(derivedCashFlow).toBe(false);
  expect(figures.interestPaid).toBeUndefined();
  expect(figures.cfo).toBeDefined();
});

test('a cash flow derived from the balance sheets agrees with the statement where there is nothing else', () => {
  const stated = latest(1);
  const derived = latest(1, { leaveOut: ['cfo', 'capex', 'interest_paid', 'tax_paid'] });
  expect(derived.derivedCashFlow).toBe(true);
  expect(derived.figures.cfo).toBeCloseTo(stated.figures.cfo!, 2);
  expect(derived.figures.capex).toBeCloseTo(stated.figures.capex!, 2);
});

test('no cash flow is derived in a year with an acquisition', () => {
  const borrower = buildBorrower(1, { leaveOut: ['cfo', 'capex', 'interest_paid', 'tax_paid'] });
  const lastSheet = borrower.statements.at(-1)!;
  const statements = [
    ...borrower.statements.slice(0, -1),
    { ...lastSheet, amounts: { ...lastSheet.amounts, goodwill: lastSheet.amounts.total_assets! } },
  ];
  const peer = peerInputs({ ...borrower, statements }, LAST_QUARTER_END, AS_OF)!;
  expect(peer).toMatchObject({
    acquisitionInYear: true,
    acquisitionThisQuarter: true,
    derivedCashFlow: false,
  });
  expect(peer.figures.cfo).toBeUndefined();
});

test.each(['bank', 'natural person', 'sole trader', 'insurer', 'property or project vehicle'] as const)(
  'a %s is never compared',
  (legalForm) => {
    expect(peerInputs({ ...buildBorrower(1), legalForm }, LAST_QUARTER_END, AS_OF)).toBeNull();
    expect(peerInputsOfQuarters({ ...buildBorrower(1), legalForm }, AS_OF)).toEqual([]);
  },
);

test('statements received later are not known yet', () => {
  const peers = peerInputsOfQuarters(buildBorrower(1), plainDate('2026-10-15'));
  expect(peers.at(-1)?.quarterEnd).toBe('2026-06-30');
  expect(peers).toHaveLength(8);
});

test('a statement that does not tie marks every figure that rests on it', () => {
  const borrower = buildBorrower(1);
  const statements = borrower.statements.map((statement) =>
    statement.months === 3 && statement.periodEnd === '2026-03-31'
      ? { ...statement, tie: 'does-not-tie' as const }
      : statement,
  );
  const ties = peerInputsOfQuarters({ ...borrower, statements }, AS_OF).map((peer) => peer.ties);
  expect(ties).toEqual([true, true, true, true, true, false, false, false]);
});

test('a year that mixes two presentations of cash flow is marked, restated comparatives heal it', () => {
  const borrower = buildBorrower(1);
  const underNewRule = (from: string) =>
    borrower.statements.map((statement) =>
      statement.periodEnd >= from ? { ...statement, framework: 'IFRS 18' } : statement,
    );
  const changed = (from: string) =>
    peerInputs({ ...borrower, statements: underNewRule(from) }, LAST_QUARTER_END, AS_OF)!
      .cashFlowPresentationChanged;
  expect(changed('2026-01-01')).toBe(true);
  expect(changed('2024-01-01')).toBe(false);
  expect(changed('2027-01-01')).toBe(false);
});

test('an annual reporter has days on the flows of the year', () => {
  const borrower = buildBorrower(1, { everyMonths: 12, quarters: 18 });
  const peer = peerInputs(borrower, plainDate('2025-12-31'), AS_OF)!;
  expect(peer.daysOnYear).toBe(true);
  expect(peer.figures.revenueQuarter).toBe(peer.figures.revenue! / 4);
});

test('a borrower with goodwill and no balance sheet a year ago has made no acquisition for that', () => {
  const young = buildBorrower(1, { quarters: 3 });
  const statements = young.statements.map((statement) =>
    statement.months === 0
      ? { ...statement, amounts: { ...statement.amounts, goodwill: statement.amounts.total_assets! } }
      : statement,
  );
  const peer = peerInputs({ ...young, statements }, LAST_QUARTER_END, AS_OF)!;
  expect(peer).toMatchObject({ acquisitionInYear: false, acquisitionThisQuarter: false });
});

test('a forecast of another scope does not hide the accounts there are', () => {
  const alone = buildBorrower(1, { given: { scope: 'stand-alone' } });
  const forecast = {
    ...alone.statements.at(-1)!,
    id: -1,
    scope: 'group' as const,
    basis: 'forecast' as const,
  };
  const statements = [...alone.statements, forecast];
  expect(peerInputsOfQuarters({ ...alone, statements }, AS_OF)).toHaveLength(8);
});
