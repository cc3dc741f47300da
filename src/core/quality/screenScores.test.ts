import { expect, test } from 'vitest';
import { fScreen, mScreen } from './screenScores.ts';
import {
  accountsOfFirm,
  CLOSING,
  OPENING,
  without,
  YEAR,
  YEAR_BEFORE,
  type Firm,
} from './twoYears.fixture.ts';

// Wahlen, Baginski & Bradshaw, problem 6.23, first year: the inputs of a public copy, laid out as statements.
const published: Firm = {
  closing: {
    receivables: 2060,
    current_assets: 5933,
    ppe_net: 10_657,
    total_assets: 29_350,
    current_liabilities: 6107,
    senior_debt: 7357,
  },
  opening: {
    receivables: 1697,
    current_assets: 4669,
    ppe_net: 9170,
    total_assets: 23_422,
    current_liabilities: 4412,
    senior_debt: 6254,
  },
  year: { revenue: 31_260, cogs: 26_381, sga: 2473, net_income: 703, cfo: 1640, depreciation: 563 },
  yearBefore: { revenue: 20_273, cogs: 17_311, sga: 1406, net_income: 105, cfo: 501, depreciation: 480 },
};

test('the M-score of the published exercise comes out of its statements', () => {
  const m = mScreen(accountsOfFirm(published), true);
  // Recomputed in Python from the same inputs; reference vector q-001.
  expect(m).toMatchObject({ form: 'M8', filled: [] });
  expect('score' in m && m.score).toBeCloseTo(-2.377743557807, 9);
});

test('depreciation, overheads and asset quality stand at one where they are missing', () => {
  const m = mScreen(
    accountsOfFirm({ ...published, year: without(published.year!, 'depreciation', 'sga') }),
    true,
  );
  expect(m).toMatchObject({ filled: ['depi', 'sgai'], indices: { depi: null, sgai: null } });
  const unclassified = mScreen(
    accountsOfFirm({ ...published, closing: without(published.closing!, 'ppe_net') }),
    true,
  );
  expect(unclassified).toMatchObject({ filled: ['aqi', 'depi'] });
});

test('without a cash flow statement it is the form of five variables', () => {
  const accounts = accountsOfFirm({ ...published, year: without(published.year!, 'cfo') });
  expect(mScreen(accounts, true)).toEqual({
    missing: 'no index of accruals over assets against the year before',
  });
  const m = mScreen(accounts, false);
  expect(m).toMatchObject({ form: 'M5', filled: [] });
  // By hand from the published weights and the indices of q-001.
  expect('score' in m && m.score).toBeCloseTo(
    -6.065 +
      0.823 * 0.787253182105 +
      0.906 * 0.936106345959 +
      0.593 * 1.062588367639 +
      0.717 * 1.541952350417 +
      0.107 * 0.991284661188,
    9,
  );
});

test.each([
  ['receivables', { closing: without(published.closing!, 'receivables') }, 'receivables over sales'],
  ['cost of sales, as in accounts by nature', { year: without(published.year!, 'cogs') }, 'gross margin'],
  ['current liabilities', { opening: without(published.opening!, 'current_liabilities') }, 'leverage'],
  ['a positive margin', { year: { ...published.year, cogs: 40_000 } }, 'gross margin'],
] as const)('without %s there is no M-score', (_, firm, index) => {
  expect(mScreen(accountsOfFirm({ ...published, ...firm }), true)).toEqual({
    missing: `no index of ${index} against the year before`,
  });
});

test('securities held for the long term are no soft assets', () => {
  const aqi = (investments: number) => {
    const m = mScreen(accountsOfFirm({ ...published, closing: { ...published.closing, investments } }), true);
    return 'indices' in m ? m.indices.aqi! : NaN;
  };
  expect(aqi(1000)).toBeLessThan(aqi(0));
});

test('securities that were carried and are blank now leave asset quality at one, those never carried are none', () => {
  const opening = { ...published.opening, investments: 1000 };
  expect(mScreen(accountsOfFirm({ ...published, opening }), true)).toMatchObject({
    filled: ['aqi'],
    indices: { aqi: null },
  });
  const none = mScreen(accountsOfFirm({ ...published, opening: { ...opening, investments: 0 } }), true);
  expect('indices' in none && none.indices.aqi).not.toBeNull();
});

test('the F-score of the invented firm comes out of its statements', () => {
  const f = fScreen(accountsOfFirm());
  // Reference vector q-025, computed in Python.
  expect(f).toMatchObject({ band: 'above normal', issueDerived: false });
  expect('f' in f && f.predicted).toBeCloseTo(-5.49689118757, 10);
  expect('f' in f && f.f).toBeCloseTo(1.1034483672, 9);
});

test('no inventory is nought for the F-score, an inventory that was carried and is blank now is missing', () => {
  const none = (lines: typeof CLOSING) => without(lines, 'inventory');
  expect(
    'f' in
      fScreen(accountsOfFirm({ closing: none(CLOSING), opening: none(OPENING), earlier: none(OPENING) })),
  ).toBe(true);
  expect(fScreen(accountsOfFirm({ closing: none(CLOSING) }))).toEqual({ missing: 'missing: inventories' });
});

test('whether money was raised is read off balance sheets where the cash flow statement does not say', () => {
  const silent = { year: without(YEAR, 'debt_drawn', 'equity_issued') };
  const asStated = fScreen(accountsOfFirm());
  const asDerived = fScreen(accountsOfFirm(silent));
  expect(asDerived).toMatchObject({ issueDerived: true });
  expect('f' in asDerived && asDerived.f).toBe('f' in asStated && asStated.f);
  // Debt no higher, equity up by what was earned and kept: nothing was issued.
  const flat = { ...CLOSING, short_term_debt: 5, senior_debt: 30 };
  const noIssue = fScreen(accountsOfFirm({ ...silent, closing: flat }));
  const issue = fScreen(accountsOfFirm({ ...silent, closing: { ...flat, equity: 42.7 } }));
  if (!('f' in noIssue) || !('f' in issue)) throw new Error('an F-score is missing');
  expect(issue.predicted - noIssue.predicted).toBeCloseTo(1.029, 10);
});

test('the F-score needs the balance sheet of two years ago and says so', () => {
  expect(fScreen(accountsOfFirm({ earlier: null }))).toEqual({
    missing: 'missing: the balance sheet two years ago',
  });
});

test('a screen that rests on accounts that do not tie is missing', () => {
  expect(fScreen(accountsOfFirm({ given: { tie: 'does-not-tie' } }))).toEqual({
    missing: 'rests on accounts that do not tie',
  });
  expect(mScreen(accountsOfFirm({ yearBefore: YEAR_BEFORE, given: { tie: 'does-not-tie' } }), true)).toEqual({
    missing: 'rests on accounts that do not tie',
  });
});
