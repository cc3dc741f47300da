/** The further covenants by the product's core, held against plain arithmetic over the same quarters. */
import { expect, test } from 'vitest';
import { addDays, addMonthsToMonthEnd } from '../../src/core/calendar/plainDate.ts';
import type { Covenant } from '../../src/core/covenants/covenant.ts';
import { isMet, type CovenantTest } from '../../src/core/covenants/covenantTest.ts';
import { testDates } from '../../src/core/covenants/levels.ts';
import { testCovenant } from '../../src/core/covenants/testCovenant.ts';
import { MEASURE_CODES } from '../../src/core/measures/measure.ts';
import { decimal } from '../../src/core/money/decimal.ts';
import { POLICY_VERSION_1 } from '../../src/core/policy.ts';
import { isLineItemCode, lineItem } from '../../src/core/statements/lineItems.ts';
import type { Amounts, Statement } from '../../src/core/statements/statement.ts';
import { bookOf } from '../../src/core/statements/statementBook.ts';
import { levelsOf, termsOf } from './agreedTerms.ts';
import { demoBook } from './demoBook.ts';
import type { DemoBorrower } from './demoBorrower.ts';
import type { DemoCovenant } from './demoCovenant.ts';
import { BALANCE_LINES } from './demoLines.ts';
import { demoRates } from './demoRates.ts';
import {
  annualisedLeverage,
  capexOfYear,
  debtYield,
  fixedChargeCover,
  frozenLeverage,
  gearing,
  leverageInEuro,
  leverageWithLeases,
  loanToValue,
  quickRatio,
  seniorLeverage,
  debtServiceCover,
  tangibleNetWorth,
  type ReadingOf,
} from './furtherRatios.ts';
import { yearEbitda } from './ratios.ts';

const book = demoBook('2026-12-01');
const further = book.flatMap((borrower) =>
  borrower.furtherCovenants.map(
    (agreed) => [`${agreed.name} of ${borrower.name}`, borrower, agreed] as const,
  ),
);

const isBalance = (line: string): boolean => (BALANCE_LINES as readonly string[]).includes(line);

/** A line that a borrower has at no quarter is no row of its sheets. */
function statementsOf({ quarters, currency }: DemoBorrower): Statement[] {
  const carried = (line: string): boolean =>
    lineItem(isLineItemCode(line) ? line : 'revenue').part !== 'memo' ||
    quarters.some(({ lines }) => lines[line as keyof typeof lines] !== 0);
  return quarters.flatMap(({ quarterEnd, lines }, index) => {
    const amounts = (ofBalance: boolean): Amounts =>
      Object.fromEntries(
        Object.entries(lines)
          .filter(([line]) => isBalance(line) === ofBalance && carried(line))
          .map(([line, thousands]) => [line, decimal(thousands).times(1_000)]),
      );
    const common = {
      periodEnd: quarterEnd,
      basis: 'management',
      scope: 'group',
      framework: 'local GAAP',
      currency,
      roundingUnit: decimal(1_000),
      tie: 'ties',
      version: 1,
      receivedOn: addDays(quarterEnd, 30),
      importId: null,
    } as const;
    return [
      {
        ...common,
        id: 2 * index,
        months: 3,
        periodStart: addDays(addMonthsToMonthEnd(quarterEnd, -3), 1),
        amounts: amounts(false),
      },
      { ...common, id: 2 * index + 1, months: 0, periodStart: quarterEnd, amounts: amounts(true) },
    ];
  });
}

function covenantOf(borrower: DemoBorrower, agreed: DemoCovenant): Covenant {
  return {
    ...termsOf(agreed, borrower.currency),
    id: 1,
    facilityId: 1,
    levels: levelsOf(agreed),
    addBacks: agreed.addBacks.map((addBack, id) => ({
      ...addBack,
      id,
      months: 3,
      amount: decimal(addBack.amount).times(1_000),
      approvedBy: null,
    })),
    waivers: [],
    cures: [],
  };
}

function testsBy(borrower: DemoBorrower, agreed: DemoCovenant): CovenantTest[] {
  const last = borrower.quarters.at(-1)?.quarterEnd ?? '2026-09-30';
  const covenant = covenantOf(borrower, agreed);
  const statements = bookOf(statementsOf(borrower), borrower.fiscalYearEndMonth);
  const rates = borrower.quarters.flatMap(({ quarterEnd }) => demoRates(quarterEnd));
  return testDates(covenant, last).map((date) =>
    testCovenant(covenant, statements, date, POLICY_VERSION_1, '2026-11-30', rates),
  );
}

test('between them the borrowers have covenants of every measure', () => {
  const agreed = book.flatMap(({ covenants, furtherCovenants }) => [...covenants, ...furtherCovenants]);
  expect(new Set(agreed.map(({ measure }) => measure))).toEqual(new Set(MEASURE_CODES));
});

/** One that is tested only above a share of drawings tells a story of its own. */
const alwaysTested = further.filter(([, , { springingTrigger }]) => springingTrigger === undefined);

test.each(alwaysTested)('%s is met with room on every test date', (name, borrower, agreed) => {
  const tests = testsBy(borrower, agreed);
  expect(tests.length).toBeGreaterThan(1);
  for (const { testDate, outcome, reason, headroom } of tests) {
    if (name.startsWith('Loan to value of Kaldermarrow') && testDate > '2024-12-31') {
      expect([outcome, reason]).toEqual(['cannot be tested', 'valuation older than 24 months']);
      continue;
    }
    expect(isMet(outcome), `${testDate}: ${outcome} ${reason}`).toBe(true);
    expect(headroom.mayFall?.toNumber(), testDate).toBeGreaterThan(0.1);
  }
});

const READINGS: Readonly<Record<string, ReadingOf>> = {
  'Senior leverage of Brenningsund': seniorLeverage,
  'Debt service cover of Brenningsund': debtServiceCover,
  'Fixed-charge cover of Tervanholt': fixedChargeCover,
  'Quick ratio of Sundrelle': quickRatio,
  'Minimum EBITDA of Sundrelle': (quarters, index) => (yearEbitda(quarters, index) ?? Number.NaN) * 1_000,
  'Gearing of Pelligrande': gearing,
  'Net leverage, rules at signing of Otterbrane': frozenLeverage,
  'Net leverage with leases of Halvorune': leverageWithLeases(2_000),
  'Net leverage in euro of Merrinstowe': leverageInEuro,
  'Net leverage of the revolver of Rastevolde': annualisedLeverage(15),
  'Tangible net worth of Cindrevall': (quarters, index) => tangibleNetWorth(quarters, index) * 1_000,
  'Loan to value of Nordvelle': loanToValue,
  'Debt yield of Nordvelle': debtYield,
  'Loan to value of Pinevarra': loanToValue,
  'Capital expenditure of Tervanholt': (quarters, index) => capexOfYear(quarters, index) * 1_000,
};

test.each(Object.entries(READINGS))('%s comes to the same by plain arithmetic', (begins, read) => {
  const found = further.find(([name]) => name.startsWith(begins));
  if (!found) throw new Error(`nobody has ${begins}`);
  const [, borrower, agreed] = found;
  for (const { testDate, tested } of testsBy(borrower, agreed)) {
    const index = borrower.quarters.findIndex(({ quarterEnd }) => quarterEnd === testDate);
    const expected = read(borrower.quarters, index) ?? Number.NaN;
    expect(Math.abs((tested?.toNumber() ?? Number.NaN) / expected - 1), testDate).toBeLessThan(1e-12);
  }
});

test('add-backs over their cap count for one facility and not for the other on the same accounts', () => {
  const borrower = book.find(({ name }) => name.startsWith('Norvaquel'));
  const [agreed] = borrower?.furtherCovenants ?? [];
  if (!borrower || !agreed) throw new Error('a further covenant expected');
  const latest = testsBy(borrower, agreed).at(-1);
  const ebitda = (yearEbitda(borrower.quarters, borrower.quarters.length - 1) ?? Number.NaN) * 1_000;
  // 20 % of EBITDA with them is a quarter of EBITDA before them.
  expect(latest?.earnings?.div(ebitda).toFixed(6)).toBe('1.250000');
  expect(latest?.bridge.some(({ kind }) => kind === 'disallowed')).toBe(true);
});

test('the limit of capital expenditure is exceeded by itself and kept with what was carried over', () => {
  const found = further.find(([name]) => name.startsWith('Capital expenditure'));
  if (!found) throw new Error('a limit expected');
  const latest = testsBy(found[1], found[2]).at(-1);
  const own = latest?.bridge.find(({ label }) => label === 'Limit of the year')?.amount;
  expect(own && latest?.tested?.gt(own) && latest.level?.gt(latest.tested)).toBe(true);
});
